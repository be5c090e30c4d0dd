const double = new Float64Array(1);
const halves = new Uint32Array(double.buffer);
const isLittleEndian = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;
const [LOW, HIGH] = isLittleEndian ? [0, 1] : [1, 0];

/** Upper and lower 32 bits of a double (IEEE 754: sign, exponent and the first of the fraction are in the upper). */
export function bitsOf(number: number): [high: number, low: number] {
  double[0] = number;
  return [halves[HIGH]!, halves[LOW]!];
}

export function doubleOf(high: number, low: number): number {
  halves[HIGH] = high;
  halves[LOW] = low;
  return double[0]!;
}
