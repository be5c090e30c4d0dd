import type { Board } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { clockDomainOf } from '../sources/clock.ts';
import { applyDrive, type LineSpectrum, spectrumOf } from '../sources/spectrum.ts';
import { drivenNets } from './scene.ts';

/** A source's spectral line: its peak phasor (V or A) and the domain within which phasors add. */
export interface SourceLine {
  readonly kind: 'net' | 'loop';
  /** Net or loop name. */
  readonly name: string;
  /** Index among the drives of its net (0 for loops). */
  readonly driveIndex: number;
  readonly domain: string;
  readonly re: number;
  readonly im: number;
}

/** All lines of one frequency. */
export interface FrequencyLines {
  readonly frequencyHz: number;
  readonly lines: readonly SourceLine[];
}

/** Lines weaker than this, relative to the strongest of their waveform, are rounding (even harmonics at 50 % duty). */
const NEGLIGIBLE = 1e-10;
/** Frequencies closer than this, relative, are one: harmonics of different waveforms that meet. */
const SAME_FREQUENCY = 1e-9;

/**
 * Every spectral line of the board's drives (on nets with traces) and loops between two frequencies, grouped by
 * frequency, ascending.
 * `extraHz` are frequencies that must appear even without lines (points of stated cable currents).
 */
export function spectrumTable(
  board: Board,
  fromHz: number,
  toHz: number,
  extraHz: readonly number[],
): FrequencyLines[] {
  const waveforms = new Map(board.waveforms.map((waveform) => [waveform.name, waveform]));
  const spectra = new Map<string, LineSpectrum>();
  const all: { frequencyHz: number; line: SourceLine | null }[] = extraHz
    .filter((hz) => hz >= fromHz && hz <= toHz)
    .map((frequencyHz) => ({ frequencyHz, line: null }));

  const addSource = (
    source: { waveform: string; delayS: number; isInverted: boolean },
    key: Pick<SourceLine, 'kind' | 'name' | 'driveIndex'>,
    driveKey: string,
  ) => {
    const waveform = waveforms.get(source.waveform);
    if (!waveform) throw inputError(`waveform of ${driveKey}`, 'one of the named waveforms', source.waveform);
    const spectrum = spectra.get(waveform.name) ?? spectrumOf(waveform, fromHz, toHz);
    spectra.set(waveform.name, spectrum);
    const { frequenciesHz, phasors } = applyDrive(spectrum, source);
    const domain = `clock ${clockDomainOf(waveform, driveKey)}`;
    const strongest = strongestOf(phasors);
    for (let i = 0; i < frequenciesHz.length; i++) {
      const re = phasors[2 * i]!;
      const im = phasors[2 * i + 1]!;
      if (Math.hypot(re, im) <= NEGLIGIBLE * strongest) continue;
      all.push({ frequencyHz: frequenciesHz[i]!, line: { ...key, domain, re, im } });
    }
  };

  const modelled = new Set(drivenNets(board).map(({ name }) => name));
  const driveCounts = new Map<string, number>();
  for (const drive of board.drives) {
    if (!modelled.has(drive.net)) continue;
    const driveIndex = driveCounts.get(drive.net) ?? 0;
    driveCounts.set(drive.net, driveIndex + 1);
    addSource(drive, { kind: 'net', name: drive.net, driveIndex }, JSON.stringify([drive.net, drive.pin]));
  }
  for (const loop of board.loops) addSource(loop, { kind: 'loop', name: loop.name, driveIndex: 0 }, loop.name);

  all.sort((one, other) => one.frequencyHz - other.frequencyHz);
  const table: { frequencyHz: number; lines: SourceLine[] }[] = [];
  for (const { frequencyHz, line } of all) {
    let last = table.at(-1);
    if (!last || frequencyHz > last.frequencyHz * (1 + SAME_FREQUENCY)) {
      last = { frequencyHz, lines: [] };
      table.push(last);
    }
    if (line) last.lines.push(line);
  }
  return table;
}

function strongestOf(phasors: Float64Array): number {
  let strongest = 0;
  for (let i = 0; i < phasors.length; i += 2) strongest = Math.max(strongest, Math.hypot(phasors[i]!, phasors[i + 1]!));
  return strongest;
}
