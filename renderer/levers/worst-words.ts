import type { ResultPoint } from '../../app/estimate/result.ts';
import { isItself, KIND_PHRASE, mainContributor, pathText } from '../../app/report/contributor-text.ts';
import { frequencyText, marginText } from '../i18n/format.ts';

export interface Worst {
  readonly frequencyHz: number;
  readonly marginDb: number;
}

/** Where the worst margin is and what makes it: "at 375 MHz by net CLK_25M through the valve cable". */
export function causeText(worst: Worst, points: readonly ResultPoint[]): string {
  const at = `at ${frequencyText(worst.frequencyHz)}`;
  const point = points.find(
    ({ frequencyHz, marginDb }) => frequencyHz === worst.frequencyHz && marginDb === worst.marginDb,
  );
  const main = point && mainContributor(point);
  if (!main) return at;
  const { contributor, path } = main;
  const through = path === undefined || isItself(contributor, path) ? '' : ` through the ${pathText(path.name)}`;
  return `${at} by ${KIND_PHRASE[contributor.kind]}${contributor.name}${through}`;
}

export const NO_CHANGE = 'no change';

/** "+3.2 dB", "−0.4 dB", "no change". */
export function changeText(changeDb: number): string {
  const text = marginText(Math.abs(changeDb));
  if (Number(text.replace(',', '.')) === 0) return NO_CHANGE;
  return `${changeDb > 0 ? '+' : '−'}${text} dB`;
}

/** What is read aloud when the worst margin has come to rest. */
export function spokenText(worst: Worst, points: readonly ResultPoint[], kept: Worst | null): string {
  const was = kept === null ? '' : `, it was ${marginText(kept.marginDb)} dB`;
  return `Worst margin ${marginText(worst.marginDb)} dB ${causeText(worst, points)}${was}`;
}
