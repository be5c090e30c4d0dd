import type { BoardFile } from '../../board/board-file.ts';
import { frequencyText, quantityText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';
import { type Draft, draft, pairUp, sameData, wideDraft } from './draft.ts';
import { invertedText, waveformReference } from './drive-changes.ts';
import { chainLengthMm, lengthChange, loopAreaMm2, movedText, sameChain } from './place-text.ts';
import type { WaveformSets } from './waveform-changes.ts';
import { joined, lengthMmText, numberChange, numberText, ohmChange, type Words, wordChange } from './words.ts';

type Loop = NonNullable<BoardFile['loops']>[number];
type Cable = NonNullable<BoardFile['cables']>[number];

export function loopChanges(before: BoardFile, after: BoardFile, sets: WaveformSets): Draft[] {
  return pairUp(before.loops, after.loops, ({ name }) => name).flatMap(({ one, other }) => {
    const { name } = (other ?? one)!;
    const subject = { loops: [name] };
    if (!one) return [draft('loop', `current loop ${shortName(name)} added (${areaText(other!)})`, subject)];
    if (!other) return [draft('loop', `current loop ${shortName(name)} removed (${areaText(one)})`, subject)];
    const parts = joined([
      sizeText(one, other),
      waveformReference(one, other, sets),
      numberChange('delay', one.delayNs, other.delayNs, 'ns'),
      invertedText(one.inverted, other.inverted),
    ]);
    return parts === undefined ? [] : [draft('loop', `${shortName(name)}: ${parts}`, subject)];
  });
}

const areaText = ({ pointsMm }: Loop): string => `${numberText(loopAreaMm2(pointsMm))} mm²`;

/** Area and length around are what radiates; a loop that only moved says so. */
function sizeText(one: Loop, other: Loop): Words {
  if (sameChain(one.pointsMm, other.pointsMm)) return undefined;
  const isSame = (was: number, is: number) => Math.abs(was - is) < 1e-3;
  const [wasMm2, isMm2] = [loopAreaMm2(one.pointsMm), loopAreaMm2(other.pointsMm)];
  const size = joined(
    [
      isSame(wasMm2, isMm2) ? undefined : numberChange('area', wasMm2, isMm2, 'mm²'),
      lengthChange('length around', chainLengthMm(one.pointsMm, true), chainLengthMm(other.pointsMm, true)),
    ],
    ', ',
  );
  return size ?? movedText(one.pointsMm, other.pointsMm);
}

/** A solved cable is part of the antenna that every net drives; one with a stated current acts by itself. */
export function cableChanges(before: BoardFile, after: BoardFile): Draft[] {
  return pairUp(before.cables, after.cables, ({ name }) => name).flatMap(({ one, other }) => {
    const { name } = (other ?? one)!;
    const isSolved = [one, other].some((cable) => cable && cable.commonModeUa === undefined);
    const say = isSolved ? wideDraft : draft;
    const subject = { cables: [name] };
    if (!one) return [say('cable', `cable ${shortName(name)} added (${cableText(other!)})`, subject)];
    if (!other) return [say('cable', `cable ${shortName(name)} removed (${cableText(one)})`, subject)];
    const at = seriesParts(one, other);
    const parts = joined([lengthText(one, other), ...restParts(one, other)]);
    return [
      ...(parts === undefined ? [] : [say('cable', `${shortName(name)}: ${parts}`, subject)]),
      ...(at === undefined ? [] : [say('cable', `ferrite at the connector of ${shortName(name)}: ${at}`, subject)]),
    ];
  });
}

const cableText = (cable: Cable): string =>
  `${lengthMmText(chainLengthMm(cable.pointsMm))} mm, ${farEndText(cable)}${cable.commonModeUa ? ', stated current' : ''}`;

function lengthText(one: Cable, other: Cable): Words {
  if (sameChain(one.pointsMm, other.pointsMm)) return undefined;
  const [wasMm, isMm] = [chainLengthMm(one.pointsMm), chainLengthMm(other.pointsMm)];
  return lengthChange('length', wasMm, isMm) ?? movedText(one.pointsMm, other.pointsMm);
}

const restParts = (one: Cable, other: Cable): Words[] => [
  numberChange('radius', one.radiusMm, other.radiusMm, 'mm'),
  wordChange('far end', farEndText(one), farEndText(other)),
  ohmChange('series resistance at the connector', one.seriesOhm || undefined, other.seriesOhm || undefined),
  currentParts(one, other),
];

function farEndText({ farEnd }: Cable): string {
  if (typeof farEnd === 'object') return `${quantityText(farEnd.resistanceOhm, 'Ω')} to ground`;
  return farEnd === 'open' ? 'open' : 'joined to ground';
}

function seriesParts(one: Cable, other: Cable): Words {
  if (sameData(one.seriesImpedance, other.seriesImpedance)) return undefined;
  return `${tableText(one.seriesImpedance)} → ${tableText(other.seriesImpedance)}`;
}

/** The row nearest to 100 MHz, where ferrites are specified. */
const NAMED_MHZ = 100;

/** "table of 5 rows (about 100 Ω at 100 MHz)": magnitude of one of its rows. */
function tableText(rows: Cable['seriesImpedance']): string {
  if (rows === undefined) return 'none';
  const octaves = (mhz: number) => Math.abs(Math.log(mhz / NAMED_MHZ));
  const [mhz, resistanceOhm, reactanceOhm] = rows.reduce((held, row) =>
    octaves(row[0]) < octaves(held[0]) ? row : held,
  );
  const magnitude = quantityText(Number(Math.hypot(resistanceOhm, reactanceOhm).toPrecision(3)), 'Ω');
  return `table of ${rows.length} ${rows.length === 1 ? 'row' : 'rows'} (about ${magnitude} at ${frequencyText(mhz * 1e6)})`;
}

/** The stated current, by its strongest row; other rows are only said to have changed. */
function currentParts(one: Cable, other: Cable): Words {
  if (sameData(one.commonModeUa, other.commonModeUa)) return undefined;
  const text = ({ commonModeUa }: Cable): string => {
    if (!commonModeUa) return 'solved for';
    const [mhz, microamperes] = commonModeUa.reduce((held, row) => (row[1] > held[1] ? row : held));
    return `at most ${numberText(microamperes)} µA at ${frequencyText(mhz * 1e6)}`;
  };
  const [was, is] = [text(one), text(other)];
  return was === is ? `stated current: other values, still ${is}` : `stated current: ${was} → ${is}`;
}
