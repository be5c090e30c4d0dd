import { dbText } from '../../compare/run-text.ts';
import type { BandChange, BandState, Comparison, LineChange } from '../../compare/types.ts';
import { bandText, countText, frequencyText } from '../format.ts';
import { DETECTOR_SHORT } from '../text-table.ts';

/** Words that text and page share. */

/** "1010 readings: 929 better, 76 worse, 5 unchanged; 1 gone". */
export function countsText({ counts, lines }: Comparison): string {
  const moved = `${counts.better} better, ${counts.worse} worse, ${counts.unchanged} unchanged`;
  const oneSided = [
    ...(counts.new > 0 ? [`${counts.new} new`] : []),
    ...(counts.gone > 0 ? [`${counts.gone} gone`] : []),
  ];
  return `${countText(lines.length, 'reading')}: ${[moved, ...oneSided].join('; ')}`;
}

/** "3 newly over the limit, 2 newly under it, none still over". */
export function crossingsText({ counts }: Comparison): string {
  const number = (count: number) => (count === 0 ? 'none' : String(count));
  return `Limit: ${number(counts.newlyOver)} newly over, ${number(counts.newlyUnder)} no longer over, ${number(counts.stillOver)} still over`;
}

export const bandName = ({ detector, fromHz, toHz }: Pick<BandChange, 'detector' | 'fromHz' | 'toHz'>): string =>
  `${DETECTOR_SHORT[detector]} ${bandText(fromHz, toHz)}`;

/** "3.1 dB at 44 MHz". */
export const stateText = ({ worst }: Pick<BandState, 'worst'>): string =>
  worst ? `${dbText(worst.marginDb)} at ${frequencyText(worst.frequencyHz)}` : 'no line';

/** What to say of a line beside its numbers; empty where there is nothing. */
export function lineStanding({ status, crossing }: Pick<LineChange, 'status' | 'crossing'>): string {
  const words = [
    ...(status === 'new' || status === 'gone' ? [status] : []),
    ...(crossing === 'newly-over' ? ['NOW OVER'] : []),
    ...(crossing === 'still-over' ? ['STILL OVER'] : []),
    ...(crossing === 'newly-under' && status !== 'gone' ? ['now under'] : []),
  ];
  return words.join(', ');
}

/** Readings worth a row: those that changed, the worst first. */
export const changedLines = ({ lines }: Comparison): LineChange[] =>
  lines.filter(({ status }) => status !== 'unchanged');
