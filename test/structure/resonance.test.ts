import { describe, expect } from 'vitest';
import { emptyIncident } from '../../app/structure/incident.ts';
import { buildMesh } from '../../app/structure/mesh.ts';
import { StructureSolver } from '../../app/structure/structure-solver.ts';
import { itNeedsNec2c } from '../support/it-needs-nec2c.ts';
import { type NecDeck, runNec2c } from '../support/nec2c.ts';
import { rectangle, sheetOf } from './support.ts';

const LENGTH_M = 0.15;
const WIDTH_M = 0.01;
/** On either side of the lowest resonance. */
const FREQUENCIES_HZ = [880e6, 930e6] as const;

/** Reactance of one volt over a current. */
const reactance = (re: number, im: number): number => -im / (re * re + im * im);

/** Where the reactance passes through zero, Hz, by linear interpolation. */
const resonance = ([low, high]: readonly number[]): number =>
  FREQUENCIES_HZ[0] + ((FREQUENCIES_HZ[1] - FREQUENCIES_HZ[0]) * low!) / (low! - high!);

/** Strip driven by 1 V across its middle. */
function ownReactance(cellsAcross: number, frequencyHz: number): number {
  const cellM = WIDTH_M / cellsAcross;
  const mesh = buildMesh(sheetOf([rectangle(LENGTH_M, WIDTH_M)], LENGTH_M, WIDTH_M, cellM), [], null);
  const solver = new StructureSolver(mesh);
  solver.setFrequency(frequencyHz, []);
  const incident = emptyIncident(mesh);
  const middle = Array.from({ length: mesh.xEdgeCount }, (_, e) => e).filter(
    (e) => Math.abs(mesh.edgeCentreM[3 * e]! - LENGTH_M / 2) < cellM / 4,
  );
  expect(middle).toHaveLength(cellsAcross);
  for (const e of middle) incident.emfRe[e] = 1;
  const { re, im } = solver.solve(incident);
  const total = (part: Float64Array): number => middle.reduce((sum, e) => sum + part[e]!, 0);
  return reactance(total(re), total(im));
}

/** The same strip as a wire grid: radius pitch/2π, outer wires half a pitch inside. */
async function gridReactances(rows: number): Promise<number[]> {
  const pitchM = WIDTH_M / rows;
  const columns = Math.round(LENGTH_M / pitchM);
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
      const actualHz = resonance(FREQUENCIES_HZ.map((hz) => ownReactance(cellsAcross, hz)));
      // Seen: 923.6 and 928.2 MHz. Both halves of the correction for edges (inductance, capacitance) move it by 1 % each.
      expect(Math.abs(actualHz / expectedHz - 1)).toBeLessThan(tolerance);
    }
  });
});
