/**
 * Harmonics: numbers that are, bit for bit, a whole factor times one of few bases. A spectrum's frequencies are; levels are
 * not, which is found out soon.
 */
export interface Multiples {
  readonly bases: readonly number[];
  /** For each number: which base, −1 for none, and the factor. */
  readonly baseOf: readonly number[];
  readonly factors: readonly number[];
}

export const MOST_BASES = 8;
export const MOST_FACTOR = 65535;
/** A base that explains fewer numbers costs more than it saves. */
const LEAST_EXPLAINED = 8;
/** The lowest number that is explained may itself be a harmonic, up to this one. */
const MOST_ORDER = 256;
const PROBES = 64;
/** Numbers without a base after which the search ends: such a column holds no harmonics. */
const MOST_FAILURES = 4;

const NONE: Multiples = { bases: [], baseOf: [], factors: [] };

const factorOf = (number: number, base: number): number => {
  const factor = Math.round(number / base);
  return factor >= 1 && factor <= MOST_FACTOR && factor * base === number ? factor : 0;
};

/** Greedy: the base under the lowest number left that explains most of those left. */
export function findMultiples(numbers: readonly number[]): Multiples {
  if (numbers.length < LEAST_EXPLAINED) return NONE;
  const bases: number[] = [];
  let left = [...new Set(numbers)].filter((number) => number > 0).sort((one, other) => one - other);
  for (let failures = 0; failures < MOST_FAILURES && bases.length < MOST_BASES && left.length >= LEAST_EXPLAINED; ) {
    const base = bestBase(left);
    if (base === undefined) {
      failures++;
      left = left.slice(1);
    } else {
      bases.push(base);
      left = left.filter((number) => factorOf(number, base) === 0);
    }
  }
  if (bases.length === 0) return NONE;
  const baseOf = numbers.map((number) => bases.findIndex((base) => factorOf(number, base) > 0));
  return {
    bases,
    baseOf,
    factors: numbers.map((number, i) => (baseOf[i]! < 0 ? 0 : factorOf(number, bases[baseOf[i]!]!))),
  };
}

/** `numbers` rise. A base that explains none of some others is not tried on all. */
function bestBase(numbers: readonly number[]): number | undefined {
  const step = Math.ceil(numbers.length / PROBES);
  const probes = numbers.filter((_, i) => i > 0 && i % step === 0);
  let best: number | undefined;
  let most = LEAST_EXPLAINED - 1;
  for (let order = 1; order <= MOST_ORDER; order++) {
    const base = numbers[0]! / order;
    if (!probes.some((number) => factorOf(number, base) > 0)) continue;
    const explained = numbers.filter((number) => factorOf(number, base) > 0).length;
    if (explained > most) [best, most] = [base, explained];
  }
  return best;
}
