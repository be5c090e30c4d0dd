import type { BoardFile } from '../../board/board-file.ts';
import { quantityText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';
import { type Draft, draft, pairUp } from './draft.ts';
import type { WaveformSets } from './waveform-changes.ts';
import { waveformParts, waveformWords } from './waveform-parts.ts';
import { joined, numberChange, numberText, ohmChange, type Words, wordChange } from './words.ts';

type Drive = NonNullable<BoardFile['drives']>[number];
type Load = NonNullable<BoardFile['loads']>[number];

/** Drives by net and pin; a drive that only moved to another pin of its net is one drive. */
export function driveChanges(before: BoardFile, after: BoardFile, sets: WaveformSets): Draft[] {
  return pairByPin(before.drives, after.drives).flatMap(({ one, other }) => {
    const { net } = (other ?? one)!;
    const said = (text: Words) =>
      text === undefined ? [] : [draft('drive', `${shortName(net)}: ${text}`, { nets: [net] })];
    if (!one) return said(`drive added${atPin(other!)} (${waveformOf(other!, sets.after)})`);
    if (!other) return said(`drive removed${atPin(one)}`);
    return said(
      joined([
        wordChange('driver pin', one.pin, other.pin, 'chosen by the program'),
        waveformReference(one, other, sets),
        ohmChange('source resistance', one.sourceOhm, other.sourceOhm),
        ohmChange('series resistor', one.seriesOhm || undefined, other.seriesOhm || undefined),
        numberChange('delay', one.delayNs, other.delayNs, 'ns'),
        invertedText(one.inverted, other.inverted),
      ]),
    );
  });
}

const atPin = ({ pin }: { pin?: string | undefined }): string => (pin === undefined ? '' : ` at ${shortName(pin)}`);

export const invertedText = (was: boolean, is: boolean): Words =>
  was === is ? undefined : is ? 'now inverted' : 'no longer inverted';

function waveformOf({ waveform }: { waveform: string }, set: WaveformSets['after']): string {
  const found = set.get(waveform);
  return found ? waveformWords(found.waveform) : `waveform ${shortName(waveform)}`;
}

/** Another waveform, and what is different about it. */
export function waveformReference(
  before: { readonly waveform: string },
  after: { readonly waveform: string },
  sets: WaveformSets,
): Words {
  const was = sets.renames.get(before.waveform) ?? before.waveform;
  if (was === after.waveform) return undefined;
  const [one, other] = [sets.before.get(was), sets.after.get(after.waveform)];
  const parts = one && other && waveformParts(one, other);
  return `waveform ${shortName(before.waveform)} → ${shortName(after.waveform)}${parts ? ` (${parts})` : ''}`;
}

export function loadChanges(before: BoardFile, after: BoardFile): Draft[] {
  return pairByPin(before.loads, after.loads).flatMap(({ one, other }) => {
    const { net } = (other ?? one)!;
    const at = one && other && one.pin !== other.pin ? '' : atPin((other ?? one)!);
    const said = (text: Words) =>
      text === undefined ? [] : [draft('load', `${shortName(net)}: ${text}`, { nets: [net] })];
    if (!one) return said(`load added${at} (${loadText(other!)})`);
    if (!other) return said(`load removed${at} (${loadText(one)})`);
    const parts = joined(
      [
        wordChange('pin', one.pin, other.pin, 'chosen by the program'),
        ohmChange('resistance', one.resistanceOhm, other.resistanceOhm, 'open'),
        numberChange('capacitance', one.capacitancePf ?? 0, other.capacitancePf ?? 0, 'pF'),
      ],
      ', ',
    );
    return said(parts && `load${at}: ${parts}`);
  });
}

const loadText = ({ resistanceOhm, capacitancePf }: Load): string =>
  [
    resistanceOhm === undefined ? 'no resistance' : quantityText(resistanceOhm, 'Ω'),
    ...(capacitancePf ? [`${numberText(capacitancePf)} pF`] : []),
  ].join(', ');

/** First by net and pin, then what is left of a net in order. */
function pairByPin<T extends Drive | Load>(before: readonly T[] | undefined, after: readonly T[] | undefined) {
  const exact = pairUp(before, after, ({ net, pin }) => JSON.stringify([net, pin]));
  const both = exact.filter(({ one, other }) => one && other);
  const left = exact.flatMap(({ one, other }) => (one && !other ? [one] : []));
  const right = exact.flatMap(({ one, other }) => (other && !one ? [other] : []));
  return [...both, ...pairUp(left, right, ({ net }) => net)];
}
