import type { SourcesPart } from '../../app/project/board-parts.ts';
import { editSources } from '../state/document.ts';

export type DriveFile = NonNullable<SourcesPart['drives']>[number];
export type LoadFile = NonNullable<SourcesPart['loads']>[number];
export type WaveformFile = NonNullable<SourcesPart['waveforms']>[number];

/** Edits of the sources by what the user meant; each is one step to undo. */

export function editDrive(index: number, label: string, patch: Partial<DriveFile>, mergeKey?: string): void {
  editSources(
    label,
    (sources) => ({
      ...sources,
      drives: (sources.drives ?? []).map((drive, i) => (i === index ? { ...drive, ...patch } : drive)),
    }),
    mergeKey,
  );
}

export function editLoad(index: number, label: string, patch: Partial<LoadFile>): void {
  editSources(label, (sources) => ({
    ...sources,
    loads: (sources.loads ?? []).map((load, i) => (i === index ? { ...load, ...patch } : load)),
  }));
}

export const removeDrive = (index: number, label: string): void =>
  editSources(label, (sources) => ({ ...sources, drives: (sources.drives ?? []).filter((_, i) => i !== index) }));

export const removeLoad = (index: number, label: string): void =>
  editSources(label, (sources) => ({ ...sources, loads: (sources.loads ?? []).filter((_, i) => i !== index) }));

/** A driver of 25 Ω and no series resistor: a common CMOS output, to be replaced by what the data sheet says. */
const TYPICAL_SOURCE_OHM = 25;

/** Drives nets with a waveform; a net that is driven already keeps its driver and gets the waveform. */
export function driveNets(nets: readonly string[], waveform: string): void {
  const label = nets.length === 1 ? `Drive ${nets[0]} with ${waveform}` : `Drive ${nets.length} nets with ${waveform}`;
  editSources(label, (sources) => {
    const wanted = new Set(nets);
    const drives = (sources.drives ?? []).map((drive) => (wanted.has(drive.net) ? { ...drive, waveform } : drive));
    const driven = new Set(drives.map(({ net }) => net));
    const added = nets
      .filter((net) => !driven.has(net))
      .map(
        (net): DriveFile => ({
          net,
          waveform,
          sourceOhm: TYPICAL_SOURCE_OHM,
          seriesOhm: 0,
          delayNs: 0,
          inverted: false,
        }),
      );
    return { ...sources, drives: [...drives, ...added] };
  });
}

export function leaveNets(nets: readonly string[]): void {
  const label = nets.length === 1 ? `Do not drive ${nets[0]}` : `Do not drive ${nets.length} nets`;
  const gone = new Set(nets);
  editSources(label, (sources) => ({
    ...sources,
    drives: (sources.drives ?? []).filter(({ net }) => !gone.has(net)),
    loads: (sources.loads ?? []).filter(({ net }) => !gone.has(net)),
  }));
}

export function addLoad(net: string, pin: string): void {
  editSources(`Load on ${net}`, (sources) => ({
    ...sources,
    loads: [...(sources.loads ?? []), { net, pin, capacitancePf: 5 }],
  }));
}

export function editWaveform(index: number, label: string, waveform: WaveformFile, mergeKey?: string): void {
  editSources(
    label,
    (sources) => ({ ...sources, waveforms: (sources.waveforms ?? []).map((old, i) => (i === index ? waveform : old)) }),
    mergeKey,
  );
}

/** Another name, also where it is used. */
export function renameWaveform(index: number, name: string): void {
  editSources(`Name of ${name}`, (sources) => {
    const old = sources.waveforms?.[index]?.name;
    const renamed = <T extends { readonly waveform: string }>(list: readonly T[] | undefined) =>
      list?.map((entry) => (entry.waveform === old ? { ...entry, waveform: name } : entry));
    const drives = renamed(sources.drives);
    const loops = renamed(sources.loops);
    return {
      ...sources,
      waveforms: (sources.waveforms ?? []).map((waveform, i) => (i === index ? { ...waveform, name } : waveform)),
      ...(drives && { drives }),
      ...(loops && { loops }),
    };
  });
}

export function addWaveform(kind: 'trapezoid' | 'random-data'): string {
  let name = kind === 'trapezoid' ? 'clock' : 'data';
  editSources('Add a waveform', (sources) => {
    const names = new Set((sources.waveforms ?? []).map((waveform) => waveform.name));
    const stem = name;
    for (let number = 2; names.has(name); number++) name = `${stem} ${number}`;
    const levels = { lowV: 0, highV: 3.3, riseNs: 1, fallNs: 1 };
    const waveform: WaveformFile =
      kind === 'trapezoid'
        ? { name, kind, frequencyMhz: 25, dutyPercent: 50, ...levels }
        : { name, kind, bitRateMbps: 100, sequenceBits: 127, ...levels };
    return { ...sources, waveforms: [...(sources.waveforms ?? []), waveform] };
  });
  return name;
}

export const removeWaveform = (index: number, name: string): void =>
  editSources(`Remove ${name}`, (sources) => ({
    ...sources,
    waveforms: (sources.waveforms ?? []).filter((_, i) => i !== index),
  }));
