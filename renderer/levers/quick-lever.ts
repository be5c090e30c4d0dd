import type { WaveformFile } from '../../app/board/waveform-file.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import { nsToS, pfToF, sToNs } from '../../app/units/convert.ts';
import type { QuantityForm } from '../../app/units/quantity-text.ts';
import type { SliderRange } from '../components/slider-scale.ts';

/** A change of sources that is estimated without solving anything again. */
export interface QuickLever {
  /** Stays while the value changes. */
  readonly key: string;
  readonly label: string;
  /** Names the step of undo: "Series resistor of CLK_25M". */
  readonly step: string;
  /** What else it moves. */
  readonly remark: string | null;
  /** SI. */
  readonly value: number;
  readonly form: QuantityForm;
  readonly range: SliderRange;
  /** What the model can take at most; typed values may lie beyond the slider. */
  readonly most: number;
  /** A usual change, to be tried beforehand; null where it is at its end. */
  readonly probe: { readonly label: string; readonly value: number } | null;
  readonly set: (sources: SourcesPart, value: number) => SourcesPart;
}

export interface Subject {
  readonly kind: 'net' | 'loop';
  readonly name: string;
}

type EdgedWaveform = Extract<WaveformFile, { kind: 'trapezoid' | 'random-data' }>;

const SHORTEST_EDGE_S = 0.1e-9;
const LONGEST_EDGE_S = 20e-9;
/** Ends of the sliders: the first that holds the value. Common parts lie within the first (common practice). */
const SERIES_ENDS_OHM = [220, 1000, 10e3, 1e6];
const DRIVER_ENDS_OHM = [100, 1000, 10e3, 1e6];
const LOAD_ENDS_F = [50e-12, 200e-12, 2e-9, 1e-6];
const SERIES_STEP_OHM = 33;
const DRIVER_STEP_OHM = 25;
const LOAD_STEP_F = 10e-12;
const PF_PER_F = 1e12;

/** 10–90 % times cover 0.8 of a linear ramp, and half of both ramps lies within the shorter plateau (as in the file's rules). */
const RAMP_SHARE_1090 = 0.8;

/** Everything quick that can be changed about one net or current loop; edges first, as they are usually the cheapest. */
export function quickLevers(sources: SourcesPart, { kind, name }: Subject): QuickLever[] {
  if (kind === 'loop') {
    const loops = (sources.loops ?? []).filter((loop) => loop.name === name);
    return loops.flatMap(({ waveform }) => edgeLevers(sources, waveform));
  }
  const drives = (sources.drives ?? [])
    .map((drive, index) => ({ drive, index }))
    .filter(({ drive }) => drive.net === name);
  const loads = (sources.loads ?? []).map((load, index) => ({ load, index })).filter(({ load }) => load.net === name);
  const at = (all: readonly unknown[], pin: string | undefined) =>
    all.length > 1 && pin !== undefined ? ` at ${pin}` : '';
  const waveforms = [...new Set(drives.map(({ drive }) => drive.waveform))];
  return [
    ...waveforms.flatMap((waveform) => edgeLevers(sources, waveform)),
    ...drives.flatMap(({ drive, index }) => [
      ohmLever(sources, index, 'seriesOhm', `Series resistor${at(drives, drive.pin)}`, name),
      ohmLever(sources, index, 'sourceOhm', `Driver resistance${at(drives, drive.pin)}`, name),
    ]),
    ...loads.map(({ load, index }) =>
      loadLever(load.capacitancePf ?? 0, index, `Load capacitance${at(loads, load.pin)}`, name),
    ),
  ];
}

function edgeLevers(sources: SourcesPart, name: string): QuickLever[] {
  const waveform = (sources.waveforms ?? []).find((candidate) => candidate.name === name);
  if (waveform?.kind !== 'trapezoid' && waveform?.kind !== 'random-data') return [];
  const { riseNs, fallNs } = waveform;
  const users = new Set([
    ...(sources.drives ?? []).filter((drive) => drive.waveform === name).map(({ net }) => net),
    ...(sources.loops ?? []).filter((loop) => loop.waveform === name).map((loop) => loop.name),
  ]);
  const value = nsToS(riseNs);
  const most = nsToS(longestRiseNs(waveform));
  const end = Math.max(Math.min(most, LONGEST_EDGE_S), 1.01 * SHORTEST_EDGE_S);
  const remarks = [
    ...(riseNs !== fallNs && riseNs > 0 ? [`fall time in proportion, now ${Number(fallNs.toPrecision(3))} ns`] : []),
    ...(users.size > 1 ? [`waveform ${name}, of ${users.size} nets and loops`] : []),
  ];
  const doubled = Math.min(2 * value, most);
  return [
    {
      key: `edges ${name}`,
      label: 'Rise and fall time',
      step: `Rise and fall time of ${name}`,
      remark: remarks.length > 0 ? remarks.join('; ') : null,
      value,
      form: { unit: 's', barePrefix: 'n' },
      range: { min: SHORTEST_EDGE_S, max: end, scale: 'logarithmic' },
      most,
      probe:
        value > 0 && doubled > 1.2 * value
          ? { label: `×${Number((doubled / value).toPrecision(2))}`, value: doubled }
          : null,
      set: (before, riseS) => withEdges(before, name, sToNs(riseS)),
    },
  ];
}

/** Fall time over rise time; a waveform without a rise gets equal edges. */
const fallPerRise = ({ riseNs, fallNs }: EdgedWaveform): number => (riseNs > 0 ? fallNs / riseNs : 1);

/** Longest rise time at which both ramps still fit, ns. */
function longestRiseNs(waveform: EdgedWaveform): number {
  const plateauNs =
    waveform.kind === 'trapezoid'
      ? ((1000 / waveform.frequencyMhz) * Math.min(waveform.dutyPercent, 100 - waveform.dutyPercent)) / 100
      : 1000 / waveform.bitRateMbps;
  return (2 * RAMP_SHARE_1090 * plateauNs) / (1 + fallPerRise(waveform));
}

const withEdges = (sources: SourcesPart, name: string, riseNs: number): SourcesPart => ({
  ...sources,
  waveforms: (sources.waveforms ?? []).map((waveform) => {
    if (waveform.name !== name || (waveform.kind !== 'trapezoid' && waveform.kind !== 'random-data')) return waveform;
    return { ...waveform, riseNs: tidy(riseNs), fallNs: tidy(riseNs * fallPerRise(waveform)) };
  }),
});

/** Without the last bits of a conversion of units. */
const tidy = (value: number): number => Number(value.toPrecision(12));

const rangeTo = (ends: readonly number[], value: number): SliderRange => ({
  min: 0,
  max: ends.find((end) => value <= end) ?? value,
  scale: 'linear',
});

function ohmLever(
  sources: SourcesPart,
  index: number,
  part: 'seriesOhm' | 'sourceOhm',
  label: string,
  net: string,
): QuickLever {
  const value = sources.drives![index]![part];
  const isSeries = part === 'seriesOhm';
  const stepOhm = isSeries ? SERIES_STEP_OHM : DRIVER_STEP_OHM;
  return {
    key: `${part} ${index}`,
    label,
    step: `${label} of ${net}`,
    remark: null,
    value,
    form: { unit: 'Ω' },
    range: rangeTo(isSeries ? SERIES_ENDS_OHM : DRIVER_ENDS_OHM, value),
    most: 1e6,
    probe: { label: `+${stepOhm} Ω`, value: value + stepOhm },
    set: (before, ohm) => ({
      ...before,
      drives: (before.drives ?? []).map((drive, i) => (i === index ? { ...drive, [part]: ohm } : drive)),
    }),
  };
}

function loadLever(capacitancePf: number, index: number, label: string, net: string): QuickLever {
  const value = pfToF(capacitancePf);
  return {
    key: `load ${index}`,
    label,
    step: `${label} of ${net}`,
    remark: null,
    value,
    form: { unit: 'F', barePrefix: 'p' },
    range: rangeTo(LOAD_ENDS_F, value),
    most: 1e-6,
    probe: { label: '+10 pF', value: value + LOAD_STEP_F },
    set: (before, farad) => ({
      ...before,
      loads: (before.loads ?? []).map((load, i) =>
        i === index ? { ...load, capacitancePf: tidy(farad * PF_PER_F) } : load,
      ),
    }),
  };
}
