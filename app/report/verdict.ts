import type { EstimateResult, ResultPoint, Verdict } from '../estimate/result.ts';
import { NO_CLASS } from '../limits/limit-line.ts';
import { amountText, countText, frequencyText, levelText, marginText, trimmed } from './format.ts';

/** What a reading is worth: over the limit, under it but short of the required margin, or fine. */
export type Standing = 'over' | 'short' | 'fine';

export function standingOfMargin(marginDb: number, requiredMarginDb: number): Standing {
  if (marginDb < 0) return 'over';
  return marginDb < requiredMarginDb ? 'short' : 'fine';
}

export const standingOf = (point: ResultPoint, requiredMarginDb: number): Standing =>
  standingOfMargin(point.marginDb, requiredMarginDb);

/** The standing whose mark a whole verdict carries: neither clearly over nor clearly fine is half filled. */
export const VERDICT_STANDING: Readonly<Record<Verdict, Standing>> = {
  exceeds: 'over',
  'falls-short': 'short',
  'within-uncertainty': 'short',
  meets: 'fine',
};

export type StandingCounts = Readonly<Record<Standing, number>>;

export function countStandings(result: EstimateResult): StandingCounts {
  const counts = { over: 0, short: 0, fine: 0 };
  for (const point of result.points) counts[standingOf(point, result.limit.requiredMarginDb)]++;
  return counts;
}

/** The verdict in the words every surface uses. */
export function verdictText(result: Pick<EstimateResult, 'worst' | 'limit' | 'verdict'>): string {
  const { worst, limit } = result;
  if (worst === null) return 'no line in the judged range';
  const at = `at ${frequencyText(worst.frequencyHz)}`;
  switch (result.verdict) {
    case 'exceeds':
      return `exceeds by ${amountText(-worst.marginDb)} ${at}`;
    case 'falls-short':
      return `falls short of the required ${trimmed(limit.requiredMarginDb, 1)} dB by ${amountText(limit.requiredMarginDb - worst.marginDb)} ${at}`;
    case 'within-uncertainty':
      return `within uncertainty (±${levelText(limit.labUncertaintyDb)} dB)`;
    case 'meets':
      return `meets with ${levelText(worst.marginDb)} dB`;
  }
}

/** The limit in a few words: "CISPR 32 class B at 3 m". */
export function limitName({ limit }: EstimateResult): string {
  const className = limit.class === NO_CLASS ? '' : ` class ${limit.class}`;
  return `${limit.standard}${className} at ${trimmed(limit.distanceM, 2)} m`;
}

/** One line under the verdict: worst margin and where. */
export function worstText(result: EstimateResult): string {
  const { worst } = result;
  if (worst === null)
    return `no emission line of this board lies in the judged range, up to ${frequencyText(result.limit.maxHz)}`;
  return `worst margin ${marginText(worst.marginDb)} dB at ${frequencyText(worst.frequencyHz)}`;
}

/** "214 lines", or "260 readings of 214 lines" where several detectors judge one frequency. */
export function readingsText(points: readonly ResultPoint[]): string {
  const lineCount = new Set(points.map(({ frequencyHz }) => frequencyHz)).size;
  const lines = countText(lineCount, 'line');
  return lineCount === points.length ? lines : `${countText(points.length, 'reading')} of ${lines}`;
}

/** "3 over the limit, 5 short of the required 6 dB, 206 fine". */
export function standingsText(result: EstimateResult): string {
  const counts = countStandings(result);
  const { requiredMarginDb } = result.limit;
  const parts = [`${counts.over} over the limit`];
  if (requiredMarginDb > 0) parts.push(`${counts.short} short of the required ${trimmed(requiredMarginDb, 1)} dB`);
  parts.push(`${counts.fine} fine`);
  return parts.join(', ');
}
