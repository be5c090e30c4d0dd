import type { SampleColumns } from '../../board/convert-waveforms.ts';
import type { WaveformFile } from '../../board/waveform-file.ts';
import { countText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';
import { sameData } from './draft.ts';
import { joined, numberChange, numberText, sameNumber, type Words, wordChange } from './words.ts';

type Of<K extends WaveformFile['kind']> = Extract<WaveformFile, { kind: K }>;

/** A waveform with the content of the file it names. */
export interface SampledWaveform {
  readonly waveform: WaveformFile;
  readonly columns: SampleColumns | undefined;
}

/** What is different between two waveforms; undefined when nothing but the name is. */
export function waveformParts(before: SampledWaveform, after: SampledWaveform): Words {
  const [one, other] = [before.waveform, after.waveform];
  if (one.kind !== other.kind) return `${waveformWords(one)} → ${waveformWords(other)}`;
  return joined(
    [...kindParts(before, after), wordChange('clock domain', one.clockDomain, other.clockDomain, 'its own')],
    ', ',
  );
}

function kindParts(before: SampledWaveform, after: SampledWaveform): Words[] {
  const [one, other] = [before.waveform, after.waveform];
  switch (other.kind) {
    case 'trapezoid':
      return trapezoidParts(one as Of<'trapezoid'>, other);
    case 'random-data':
      return dataParts(one as Of<'random-data'>, other);
    case 'piecewise':
      return piecewiseParts(one as Of<'piecewise'>, other);
    case 'lines':
      return linesParts(one as Of<'lines'>, other);
    case 'samples':
      return samplesParts(one as Of<'samples'>, other, before.columns, after.columns);
  }
}

/** A waveform in a few words, for a change of kind. */
export function waveformWords(waveform: WaveformFile): string {
  switch (waveform.kind) {
    case 'trapezoid':
      return `trapezoid of ${numberText(waveform.frequencyMhz)} MHz`;
    case 'random-data':
      return `random data of ${numberText(waveform.bitRateMbps)} Mbit/s`;
    case 'piecewise':
      return `piecewise linear of period ${numberText(waveform.periodNs)} ns`;
    case 'samples':
      return `samples of ${shortName(waveform.file, 40)}`;
    case 'lines':
      return countText(waveform.lines.length, 'listed line');
  }
}

interface Levels {
  readonly lowV?: number | undefined;
  readonly highV?: number | undefined;
  readonly lowA?: number | undefined;
  readonly highA?: number | undefined;
}

const levelParts = (one: Levels, other: Levels): Words[] => [
  numberChange('low level', one.lowV, other.lowV, 'V'),
  numberChange('high level', one.highV, other.highV, 'V'),
  numberChange('low level', one.lowA, other.lowA, 'A'),
  numberChange('high level', one.highA, other.highA, 'A'),
];

interface Edges {
  readonly riseNs: number;
  readonly fallNs: number;
}

function edgeParts(one: Edges, other: Edges): Words[] {
  if (sameNumber(one.riseNs, one.fallNs) && sameNumber(other.riseNs, other.fallNs)) {
    return [numberChange('rise and fall time', one.riseNs, other.riseNs, 'ns')];
  }
  return [
    numberChange('rise time', one.riseNs, other.riseNs, 'ns'),
    numberChange('fall time', one.fallNs, other.fallNs, 'ns'),
  ];
}

const trapezoidParts = (one: Of<'trapezoid'>, other: Of<'trapezoid'>): Words[] => [
  numberChange('frequency', one.frequencyMhz, other.frequencyMhz, 'MHz'),
  ...levelParts(one, other),
  numberChange('duty cycle', one.dutyPercent, other.dutyPercent, '%'),
  ...edgeParts(one, other),
];

const dataParts = (one: Of<'random-data'>, other: Of<'random-data'>): Words[] => [
  numberChange('bit rate', one.bitRateMbps, other.bitRateMbps, 'Mbit/s'),
  ...levelParts(one, other),
  ...edgeParts(one, other),
  numberChange('sequence', one.sequenceBits, other.sequenceBits, 'bits'),
];

/** Span and steepest edge say what radiates; a change of neither is still a change of shape. */
function piecewiseParts(one: Of<'piecewise'>, other: Of<'piecewise'>): Words[] {
  const [was, is] = [shapeOf(one), shapeOf(other)];
  const parts = [
    numberChange('period', one.periodNs, other.periodNs, 'ns'),
    was.unit === is.unit ? undefined : wordChange('unit', was.unit, is.unit),
    numberChange('lowest value', was.low, is.low, is.unit),
    numberChange('highest value', was.high, is.high, is.unit),
    numberChange('steepest edge', was.steepest, is.steepest, `${is.unit}/ns`),
  ];
  if (joined(parts) !== undefined || samePairs(was.points, is.points)) return parts;
  return [`shape of ${was.points.length} → ${is.points.length} points, same span and steepest edge`];
}

function shapeOf({ pointsNsV, pointsNsA, periodNs }: Of<'piecewise'>) {
  const points = pointsNsV ?? pointsNsA ?? [];
  const first = points[0]!;
  // The last piece runs to the first point of the next period.
  const around = [...points, [first[0] + periodNs, first[1]] as const];
  let [low, high, steepest] = [Infinity, -Infinity, 0];
  for (const [i, [timeNs, value]] of points.entries()) {
    low = Math.min(low, value);
    high = Math.max(high, value);
    const next = around[i + 1]!;
    if (next[0] > timeNs) steepest = Math.max(steepest, Math.abs((next[1] - value) / (next[0] - timeNs)));
  }
  return { points, low, high, steepest, unit: pointsNsV === undefined ? 'A' : 'V' };
}

const samePairs = (one: readonly (readonly [number, number])[], other: readonly (readonly [number, number])[]) =>
  one.length === other.length && one.every(([x, y], i) => sameNumber(x, other[i]![0]) && sameNumber(y, other[i]![1]));

/** Names the line whose amplitude changed most, counts the others. */
function linesParts(one: Of<'lines'>, other: Of<'lines'>): Words[] {
  const was = new Map(one.lines.map((line) => [line.frequencyMhz, line]));
  const is = new Set(other.lines.map(({ frequencyMhz }) => frequencyMhz));
  const added = other.lines.filter(({ frequencyMhz }) => !was.has(frequencyMhz)).length;
  const removed = one.lines.filter(({ frequencyMhz }) => !is.has(frequencyMhz)).length;
  const amplitude = (line: Of<'lines'>['lines'][number]) => line.amplitudeV ?? line.amplitudeA ?? 0;
  const changed = other.lines.flatMap((line) => {
    const old = was.get(line.frequencyMhz);
    if (!old) return [];
    const isSame = sameNumber(amplitude(old), amplitude(line)) && sameNumber(old.phaseDeg, line.phaseDeg);
    return isSame ? [] : [{ old, line }];
  });
  const size = ({ old, line }: (typeof changed)[number]) => Math.abs(amplitude(line) - amplitude(old));
  const most = changed.reduce<(typeof changed)[number] | undefined>(
    (held, next) => (held === undefined || size(next) > size(held) ? next : held),
    undefined,
  );
  const unit = other.lines[0]?.amplitudeA === undefined ? 'V' : 'A';
  const at = most && `${numberText(most.line.frequencyMhz, 7)} MHz`;
  return [
    most &&
      (numberChange(`amplitude at ${at}`, amplitude(most.old), amplitude(most.line), unit) ??
        numberChange(`phase at ${at}`, most.old.phaseDeg, most.line.phaseDeg, '°')),
    changed.length > 1 ? `${countText(changed.length - 1, 'other line')} changed` : undefined,
    added > 0 ? `${countText(added, 'line')} added` : undefined,
    removed > 0 ? `${countText(removed, 'line')} removed` : undefined,
  ];
}

function samplesParts(
  one: Of<'samples'>,
  other: Of<'samples'>,
  was: SampleColumns | undefined,
  is: SampleColumns | undefined,
): Words[] {
  const isSameContent = sameData(was, is);
  return [
    wordChange('file', one.file, other.file),
    numberChange('period', one.periodNs, other.periodNs, 'ns'),
    isSameContent
      ? undefined
      : `other samples (${was?.values.length ?? 0} → ${countText(is?.values.length ?? 0, 'point')})`,
  ];
}
