/**
 * Packs numbers that come in columns, bit for bit. Many numbers of a result repeat another one near them (the level is
 * that of one polarisation), miss it by a rounding (a lone contributor), or are a difference (margin = limit − level):
 * those cost a code; the others are laid out plane by plane, highest byte first, for the compressor that follows.
 */

/** Numbers before the current one that it may repeat. */
const WINDOW = 12;
/** Largest distance, in units of the last place, that counts as a rounding. */
const NEAR = 127;
const RAW = 0;

export interface PackedNumbers {
  /** How each number was coded, column by column. */
  readonly codes: Uint8Array;
  /** Distances of those that miss by a rounding. */
  readonly offsets: Int8Array;
  /** The others: eight planes for each column. */
  readonly planes: Uint8Array;
}

/** Bits of one double as two halves. */
const double = new Float64Array(1);
const halves = new Uint32Array(double.buffer);
const isLittleEndian = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;
const [LOW, HIGH] = isLittleEndian ? [0, 1] : [1, 0];

/** What a number may repeat: the one before in its column, the difference of the last two, the last ones. */
class Guesses {
  readonly #last: number[] = [];
  readonly #window = new Float64Array(WINDOW);
  #seen = 0;

  /** Guesses count from 0; those not there yet are NaN, which no number of JSON is. */
  at(guess: number, column: number): number {
    if (guess === 0) return this.#last[column] ?? Number.NaN;
    if (guess === 1) return this.#back(1) - this.#back(2);
    return this.#back(guess - 1);
  }

  #back(steps: number): number {
    return steps > this.#seen ? Number.NaN : this.#window[(this.#seen - steps) % WINDOW]!;
  }

  add(number: number, column: number): void {
    this.#window[this.#seen++ % WINDOW] = number;
    this.#last[column] = number;
  }
}

const GUESSES = WINDOW + 2;
/** Codes: 0 as it is; 1 + 2g guess g exactly; 2 + 2g guess g with an offset. */
export const MOST_CODE = 2 * GUESSES;

interface PackedColumn {
  readonly codes: number[];
  readonly offsets: number[];
  readonly high: number[];
  readonly low: number[];
}

/** Takes numbers in the order of the walk. */
export class NumberPacker {
  readonly #columns: PackedColumn[] = [];
  readonly #guesses = new Guesses();

  add(number: number, column: number): void {
    this.#columns[column] ??= { codes: [], offsets: [], high: [], low: [] };
    const packed = this.#columns[column];
    double[0] = number;
    const [high, low] = [halves[HIGH]!, halves[LOW]!];
    let code = RAW;
    let offset = 0;
    for (let guess = 0; guess < GUESSES; guess++) {
      double[0] = this.#guesses.at(guess, column);
      if (halves[HIGH] !== high) continue;
      const distance = low - halves[LOW]!;
      if (distance === 0) {
        code = 1 + 2 * guess;
        break;
      }
      if (code === RAW && Math.abs(distance) <= NEAR) [code, offset] = [2 + 2 * guess, distance];
    }
    packed.codes.push(code);
    if (code === RAW) {
      packed.high.push(high);
      packed.low.push(low);
    } else if (code % 2 === 0) {
      packed.offsets.push(offset);
    }
    this.#guesses.add(number, column);
  }

  finish(): PackedNumbers {
    const columns = this.#columns;
    const planes = new Uint8Array(8 * columns.reduce((sum, { high }) => sum + high.length, 0));
    let at = 0;
    for (const { high, low } of columns) {
      for (const half of [high, low]) {
        for (const shift of [24, 16, 8, 0]) for (const bits of half) planes[at++] = bits >>> shift;
      }
    }
    return {
      codes: Uint8Array.from(columns.flatMap(({ codes }) => codes)),
      offsets: Int8Array.from(columns.flatMap(({ offsets }) => offsets)),
      planes,
    };
  }
}

/** Gives the numbers back in the order of the walk. Throws RangeError when the parts do not fit together. */
export class NumberUnpacker {
  readonly #packed: PackedNumbers;
  readonly #cursors: { code: number; offset: number; plane: number; readonly raws: number }[] = [];
  readonly #guesses = new Guesses();

  /** `counts`: how many numbers each column holds. */
  constructor(packed: PackedNumbers, counts: readonly number[]) {
    this.#packed = packed;
    let [code, offset, plane] = [0, 0, 0];
    for (const count of counts) {
      const codes = packed.codes.subarray(code, code + count);
      const raws = codes.reduce((sum, item) => sum + (item === RAW ? 1 : 0), 0);
      const offsets = codes.reduce((sum, item) => sum + (item !== RAW && item % 2 === 0 ? 1 : 0), 0);
      this.#cursors.push({ code, offset, plane, raws });
      code += count;
      offset += offsets;
      plane += 8 * raws;
    }
    const fits = code === packed.codes.length && offset === packed.offsets.length && plane === packed.planes.length;
    if (!fits || packed.codes.some((item) => item > MOST_CODE)) throw new RangeError('numbers do not fit their shape');
  }

  next(column: number): number {
    const cursor = this.#cursors[column]!;
    const code = this.#packed.codes[cursor.code++]!;
    const number = code === RAW ? this.#raw(cursor) : this.#guessed(code, column, cursor);
    this.#guesses.add(number, column);
    return number;
  }

  #raw(cursor: { plane: number; readonly raws: number }): number {
    const { planes } = this.#packed;
    const byte = (plane: number) => planes[cursor.plane + plane * cursor.raws]!;
    const half = (from: number) =>
      ((byte(from) << 24) | (byte(from + 1) << 16) | (byte(from + 2) << 8) | byte(from + 3)) >>> 0;
    halves[HIGH] = half(0);
    halves[LOW] = half(4);
    cursor.plane++;
    return double[0]!;
  }

  #guessed(code: number, column: number, cursor: { offset: number }): number {
    double[0] = this.#guesses.at((code - 1) >> 1, column);
    if (code % 2 === 0) halves[LOW] = halves[LOW]! + this.#packed.offsets[cursor.offset++]!;
    return double[0]!;
  }
}
