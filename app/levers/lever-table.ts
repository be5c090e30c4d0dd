import type { Board, LinesWaveform, Waveform } from '../board/board.ts';
import type { JudgedRange } from '../estimate/plan.ts';
import { type FrequencyLines, spectrumTable } from '../estimate/spectrum-table.ts';
import { spectrumOf } from '../sources/spectrum.ts';

/**
 * Every frequency at which the sources can have a line while their fundamentals stay: also the harmonics that the present
 * edges and duty cycles cancel.
 */
export function leverTable(board: Board, { fromHz, toHz }: JudgedRange, extraHz: readonly number[]): FrequencyLines[] {
  const waveforms = board.waveforms.map((waveform) => allLines(waveform, fromHz, toHz));
  return spectrumTable({ ...board, waveforms }, fromHz, toHz, extraHz);
}

function allLines(waveform: Waveform, fromHz: number, toHz: number): LinesWaveform {
  const { frequenciesHz } = spectrumOf(waveform, fromHz, toHz);
  return {
    kind: 'lines',
    name: waveform.name,
    quantity: waveform.quantity,
    ...(waveform.clockDomain !== undefined && { clockDomain: waveform.clockDomain }),
    lines: Array.from(frequenciesHz, (frequencyHz) => ({ frequencyHz, amplitude: 1, phaseRad: 0 })),
  };
}
