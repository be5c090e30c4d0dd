/** One row of the published table of trust: an outside value against what this program's own kernels compute. */
export interface Check {
  /** Stable kebab-case id, for example `nsa-h-3m-h1-1m-30mhz`. */
  readonly id: string;
  readonly source: string;
  /** 'seen' when the value was read in the source, 'from memory' when recalled, 'derived' when computed from definitions,
   * 'common practice' for a rule of thumb of the trade, 'reference solver' for a general solver's answer. */
  readonly sourceStatus: 'seen' | 'from memory' | 'derived' | 'common practice' | 'reference solver';
  readonly quantity: string;
  readonly unit: string;
  readonly expected: number;
  readonly computed: number;
  readonly difference: number;
  readonly tolerance: number;
  /** 'info' rows are shown beside the program's answer and never fail. */
  readonly status: 'pass' | 'fail' | 'info';
}

interface CheckInput extends Omit<Check, 'difference' | 'status'> {
  readonly isInformation?: boolean;
}

/** Completes a row: difference = computed − expected; passes when |difference| ≤ tolerance (NaN fails). */
export function check({ isInformation = false, ...row }: CheckInput): Check {
  const difference = row.computed - row.expected;
  const isWithin = Math.abs(difference) <= row.tolerance;
  return { ...row, difference, status: isInformation ? 'info' : isWithin ? 'pass' : 'fail' };
}
