import { describe, expect } from 'vitest';
import { STRIP_LENGTH_M, STRIP_WIDTH_M, stripReactanceOhm, zeroCrossingHz } from '../../app/validate/structure-laws.ts';
import { itNeedsNec2c } from '../support/it-needs-nec2c.ts';
import { type NecDeck, runNec2c } from '../support/nec2c.ts';

/** On either side of the lowest resonance. */
const FREQUENCIES_HZ = [880e6, 930e6] as const;

/** Reactance of one volt over a current. */
const reactance = (re: number, im: number): number => -im / (re * re + im * im);

const resonance = (reactances: readonly number[]): number =>
  zeroCrossingHz(FREQUENCIES_HZ, [reactances[0]!, reactances[1]!]);

/** The same strip as a wire grid: radius pitch/2π, outer wires half a pitch inside. */
async function gridReactances(rows: number): Promise<number[]> {
  const pitchM = STRIP_WIDTH_M / rows;
  const columns = Math.round(STRIP_LENGTH_M / pitchM);
  const wires: NecDeck['wires'][number][] = [];
  const sources: NecDeck['sources'][number][] = [];
  const add = (x1: number, y1: number, x2: number, y2: number): void => {
    wires.push({
      tag: wires.length + 1,
      segments: 1,
      fromM: [x1 * pitchM, y1 * pitchM, 0],
      toM: [x2 * pitchM, y2 * pitchM, 0],
      radiusM: pitchM / (2 * Math.PI),
    });
  };
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      if (column + 1 < columns) add(column, row, column + 1, row);
      if (column + 1 === columns / 2) sources.push({ tag: wires.length, segment: 1, voltageRe: 1 });
      if (row + 1 < rows) add(column, row, column, row + 1);
    }
  }
  const results = await runNec2c({ wires, ground: 'none', sources, frequenciesHz: FREQUENCIES_HZ });
  return results.map((result) =>
    reactance(
      result.sources.reduce((sum, { currentA }) => sum + currentA.re, 0),
      result.sources.reduce((sum, { currentA }) => sum + currentA.im, 0),
    ),
  );
}

describe('lowest resonance of a plate', () => {
  itNeedsNec2c('strip of 150 × 10 mm: as a converged wire grid has it, with two and four cells across', async () => {
    const [coarse, fine] = [resonance(await gridReactances(2)), resonance(await gridReactances(4))];
    // 944 and 934 MHz; eight rows give 931.5: the error falls with the square of the pitch.
    const expectedHz = fine - (coarse - fine) / 3;
    for (const [cellsAcross, tolerance] of [
      [2, 0.01],
      [4, 0.005],
    ] as const) {
      const actualHz = resonance(FREQUENCIES_HZ.map((hz) => stripReactanceOhm(cellsAcross, hz)));
      // Seen: 923.6 and 928.2 MHz. Both halves of the correction for edges (inductance, capacitance) move it by 1 % each.
      expect(Math.abs(actualHz / expectedHz - 1)).toBeLessThan(tolerance);
    }
  });
});
