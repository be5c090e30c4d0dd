/** Quantities as engineers type and read them: `3n3`, `3.3 ns`, `25M`, `25 MHz`, `4k7`, `1e6`, `3,3 ns`. */

/** Powers of ten by their sign. `meg` and the two micro signs are what keyboards and other tools give. */
const PREFIXES: ReadonlyMap<string, number> = new Map([
  ['f', -15],
  ['p', -12],
  ['n', -9],
  ['u', -6],
  ['µ', -6],
  ['μ', -6],
  ['m', -3],
  ['', 0],
  ['k', 3],
  ['K', 3],
  ['M', 6],
  ['meg', 6],
  ['Meg', 6],
  ['G', 9],
  ['T', 12],
]);

/** Other ways to write a unit; the R of `4R7` too. */
const SAME_UNITS: ReadonlyMap<string, readonly string[]> = new Map([
  ['Ω', ['Ω', 'Ω', 'ohm', 'ohms', 'Ohm', 'Ohms', 'R']],
  ['Hz', ['Hz', 'hz', 'HZ']],
  ['bit/s', ['bit/s', 'bps', 'b/s', 'bit']],
  ['%', ['%', 'percent']],
  ['°', ['°', 'deg']],
]);

export interface QuantityForm {
  /** SI unit: 's', 'Hz', 'Ω', 'F', 'V', 'A', 'm' …, or a unit without prefixes: 'dB', '%', '°'. */
  readonly unit: string;
  /** Prefix that a plain number takes: with 'n' in seconds, `3` is 3 ns. A number with an exponent is always in the unit itself. */
  readonly barePrefix?: string;
  /** In units that take no prefixes (dB, %): `5m` is then no number. */
  readonly hasNoPrefix?: boolean;
}

export type ParsedQuantity =
  | { readonly ok: true; readonly value: number }
  /** What must be typed instead, for the field's message. */
  | { readonly ok: false; readonly message: string };

const NUMBER = /^([-+−]?)(\d+(?:[.,]\d*)?|[.,]\d+)(e[-+−]?\d+)?(.*)$/i;
const LETTER_AS_POINT = /^([a-zA-Zµμ]+)(\d+)$/;

const no = (message: string): ParsedQuantity => ({ ok: false, message });

/**
 * Reads a quantity in SI. A decimal comma counts as a point; spaces do not count; `4k7` and `4R7` set the sign in place of
 * the point. Grouped digits (`1,000`) are refused where they could mean either.
 */
export function parseQuantity(text: string, form: QuantityForm): ParsedQuantity {
  const compact = text.replaceAll(/\s/g, '');
  const example = exampleOf(form);
  if (compact === '') return no(`a number, for example ${example}`);
  const parts = NUMBER.exec(compact);
  if (parts === null) return no(`a number, for example ${example}; not ${JSON.stringify(text)}`);
  const [, sign, digits, exponent, rest] = parts as unknown as [string, string, string, string | undefined, string];
  if (/^[1-9]\d{0,2},\d{3}$/.test(digits))
    return no(`without thousands separators: ${digits.replace(',', '')} or ${digits.replace(',', '.')}`);
  const mantissa = digits.replace(',', '.');
  const signed = (factor: number) => (sign === '-' || sign === '−' ? -factor : factor);

  const inPlace = LETTER_AS_POINT.exec(rest);
  if (inPlace !== null && exponent === undefined && !/[.,]/.test(digits)) {
    const power = powerOf(inPlace[1]!, form);
    if (power !== null) return { ok: true, value: signed(scaled(`${mantissa}.${inPlace[2]}`, power)) };
  }
  if (rest === '') {
    const power = exponent === undefined ? PREFIXES.get(form.barePrefix ?? '')! : 0;
    return { ok: true, value: signed(scaled(mantissa + plain(exponent), power)) };
  }
  const power = powerOf(rest, form);
  if (power === null)
    return no(`a quantity in ${form.unit}, for example ${example}; ${JSON.stringify(rest)} is not known here`);
  return { ok: true, value: signed(scaled(mantissa + plain(exponent), power)) };
}

const plain = (exponent: string | undefined): string => (exponent ?? '').replace('−', '-');

/** Through the decimal text: 3.3 n is the double nearest to 3.3e-9, not a product that is off by a rounding. */
function scaled(decimal: string, power: number): number {
  const [mantissa, exponent] = decimal.toLowerCase().split('e');
  return Number(`${mantissa}e${Number(exponent ?? 0) + power}`);
}

/** Power of ten of a prefix, a unit, or both together; null when it is neither. */
function powerOf(text: string, { unit, hasNoPrefix }: QuantityForm): number | null {
  const units = SAME_UNITS.get(unit) ?? [unit];
  if (units.includes(text)) return 0;
  if (hasNoPrefix) return null;
  const prefix = PREFIXES.get(text);
  if (prefix !== undefined) return prefix;
  const ending = units.find((name) => name !== '' && text.endsWith(name));
  return ending === undefined ? null : (PREFIXES.get(text.slice(0, -ending.length)) ?? null);
}

function exampleOf({ unit, barePrefix, hasNoPrefix }: QuantityForm): string {
  if (hasNoPrefix) return `6 ${unit}`;
  return `3.3 ${barePrefix ?? ''}${unit}`;
}

const SHOWN_PREFIXES: readonly (readonly [power: number, sign: string])[] = [
  [12, 'T'],
  [9, 'G'],
  [6, 'M'],
  [3, 'k'],
  [0, ''],
  [-3, 'm'],
  [-6, 'µ'],
  [-9, 'n'],
  [-12, 'p'],
  [-15, 'f'],
];

/** The SI value with the prefix that leaves 1 to 999 before the point; digits as needed, at most `digits` significant ones. */
export function formatQuantity(
  value: number,
  form: QuantityForm,
  options: { digits?: number; decimal?: string } = {},
): string {
  const { digits = 12, decimal = '.' } = options;
  const rounded = Number(value.toPrecision(digits));
  const magnitude = Math.abs(rounded);
  const isPlain = form.hasNoPrefix || rounded === 0 || !Number.isFinite(rounded);
  const fitting = SHOWN_PREFIXES.find(([power]) => magnitude >= 10 ** power * (1 - 1e-12)) ?? SHOWN_PREFIXES.at(-1)!;
  const [power, sign] = isPlain ? [0, rounded === 0 ? (form.barePrefix ?? '') : ''] : fitting;
  const number = String(Number((rounded / 10 ** power).toPrecision(digits)));
  return `${number.replace('-', '−').replace('.', decimal)} ${sign}${form.unit}`.trim();
}
