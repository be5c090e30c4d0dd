import { describe, expect, it } from 'vitest';
import type { Cable } from '../../app/board/board.ts';
import { emptyIncident } from '../../app/structure/incident.ts';
import { buildMesh } from '../../app/structure/mesh.ts';
import { PartialElements } from '../../app/structure/partials.ts';
import { rasterizePlanes } from '../../app/structure/sheet.ts';
import { StructureSolver } from '../../app/structure/structure-solver.ts';
import { type GroundPlane, wireFromCable } from '../../app/structure/wires.ts';
import { EPSILON0_F_PER_M } from '../../app/units/constants.ts';
import { solveDense } from '../support/dense-solve.ts';
import { expectClose } from '../support/expect-close.ts';
import { itNeedsNec2c } from '../support/it-needs-nec2c.ts';
import { runNec2c } from '../support/nec2c.ts';

const rectangle = (widthM: number, heightM: number) => ({
  ringM: [
    [0, 0],
    [widthM, 0],
    [widthM, heightM],
    [0, heightM],
  ] as const,
  cutoutsM: [],
});

/** G = 4πε0·P of a free plate, 1/m; C = Σ q/V with the whole plate at one potential. */
function plateCapacitanceF(widthM: number, heightM: number, cellsAcross: number): number {
  const cellM = heightM / cellsAcross;
  const columns = Math.round(widthM / cellM);
  const grid = { originXM: 0, originYM: 0, cellM, columns, rows: cellsAcross };
  const mesh = buildMesh(rasterizePlanes([rectangle(widthM, heightM)], grid, 0), [], null);
  const matrix = (size: number) => ({ size, re: new Float64Array(size * size), im: new Float64Array(size * size) });
  const nodes = matrix(mesh.nodeCount);
  new PartialElements(mesh).fill(1e-6, nodes, matrix(mesh.edgeCount));
  const charges = new Float64Array(mesh.nodeCount).fill(1);
  solveDense(nodes.re, charges);
  return 4 * Math.PI * EPSILON0_F_PER_M * charges.reduce((sum, value) => sum + value, 0);
}

describe('plate', () => {
  it('square: capacitance of the handbooks', () => {
    const sideM = 0.07;
    // C = 0.3667·4πε0·a (W. R. Smythe's and later numerical values; from memory, and in the design document).
    const expectedF = 0.3667 * 4 * Math.PI * EPSILON0_F_PER_M * sideM;
    const because = 'ten cells across; with plain squares (no crowding at edges) 1.5 % low';
    expectClose(plateCapacitanceF(sideM, sideM, 10), expectedF, { rel: 0.01, because });
  });

  it('near-disk: 8·ε0·√(A/π) for a compact plate, to a few per cent', () => {
    // Disk C = 8ε0·a (J. D. Jackson, Classical Electrodynamics, section 3.13); compact shapes of equal area are within a few per cent.
    const expectedF = 8 * EPSILON0_F_PER_M * Math.sqrt((0.09 * 0.07) / Math.PI);
    expectClose(plateCapacitanceF(0.09, 0.07, 7), expectedF, { rel: 0.05, because: 'a rectangle is no disk' });
  });
});

/** A piece of copper of one cell that carries the joint: small against everything. */
const CELL_M = 0.5e-3;
const RADIUS_M = 0.2e-3;

const cable = (name: string, endM: readonly [number, number, number], farEnd: 'open' | 'ground'): Cable => ({
  name,
  pointsM: [[CELL_M / 2, CELL_M / 2, 0], endM],
  radiusM: RADIUS_M,
  farEnd,
  seriesOhm: 0,
});

/** Impedance seen by a source in the first piece of the first cable, or in its last (at the ground), Ω. */
function impedanceOhm(cables: readonly Cable[], ground: GroundPlane | null, at: 'first' | 'last', frequencyHz: number) {
  const grid = { originXM: 0, originYM: 0, cellM: CELL_M, columns: 1, rows: 1 };
  const sheet = rasterizePlanes([rectangle(CELL_M, CELL_M)], grid, 0);
  const mesh = buildMesh(
    sheet,
    cables.map((one) => wireFromCable(one, one.name, sheet, ground, 10e-3)),
    ground,
  );
  const solver = new StructureSolver(mesh);
  solver.setFrequency(frequencyHz, []);
  const edge = at === 'first' ? mesh.wireEdgeStart[0]! : mesh.wireEdgeStart[0]! + mesh.wires[0]!.pieces.length - 1;
  const incident = emptyIncident(mesh);
  incident.emfRe[edge] = 1;
  const { re, im } = solver.solve(incident);
  const size = re[edge]! ** 2 + im[edge]! ** 2;
  return { re: re[edge]! / size, im: -im[edge]! / size };
}

const ARM_M = 0.25;
const dipole = (frequencyHz: number) =>
  impedanceOhm(
    [cable('A', [ARM_M, CELL_M / 2, 0], 'open'), cable('B', [CELL_M - ARM_M, CELL_M / 2, 0], 'open')],
    null,
    'first',
    frequencyHz,
  );
const monopole = (frequencyHz: number) =>
  impedanceOhm(
    [cable('A', [CELL_M / 2, CELL_M / 2, -ARM_M], 'ground')],
    { axis: 2, positionM: -ARM_M },
    'last',
    frequencyHz,
  );

describe('thin-wire antennas made of cables', () => {
  it('dipole: resonant at 0.47–0.48 wavelengths with about 72 Ω', () => {
    // Handbook values for length/radius of about 1000, from memory (C. A. Balanis, Antenna Theory, section 9.3).
    const [low, high] = [0.47, 0.483].map((part) => dipole((part * 299_792_458) / (2 * ARM_M)));
    expect(low!.im).toBeLessThan(0);
    expect(high!.im).toBeGreaterThan(0);
    expectClose((low!.re + high!.re) / 2, 72, { rel: 0.05, because: 'handbooks give 70 to 73 Ω' });
  });

  it('monopole on the ground: half the dipole', () => {
    const frequencyHz = 295e6;
    const whole = dipole(frequencyHz);
    const half = monopole(frequencyHz);
    const because = 'law: image; the copper cell sits at the tip of one and in the middle of the other';
    expectClose(half.re, whole.re / 2, { rel: 0.05, because });
    expectClose(half.im, whole.im / 2, { rel: 0.05, floor: 40, because });
  });

  itNeedsNec2c('both agree with a thin-wire moment method', async () => {
    const frequenciesHz = [250e6, 285e6, 300e6, 330e6];
    const wires = (toM: number, ground: 'perfect' | 'none', segment: number, segments: number) =>
      runNec2c({
        wires: [{ tag: 1, segments, fromM: [0, 0, 0], toM: [0, 0, toM], radiusM: RADIUS_M }],
        ground,
        sources: [{ tag: 1, segment, voltageRe: 1 }],
        frequenciesHz,
      });
    const because = 'gap of one segment here, of one piece there; a copper cell of 0.5 mm';
    for (const { frequencyHz, sources } of await wires(2 * ARM_M - CELL_M, 'none', 51, 101)) {
      const own = dipole(frequencyHz);
      expectClose(own.re, sources[0]!.impedanceOhm.re, { rel: 0.03, because });
      expectClose(own.im, sources[0]!.impedanceOhm.im, { rel: 0.03, floor: 100, because });
    }
    for (const { frequencyHz, sources } of await wires(ARM_M, 'perfect', 1, 51)) {
      const own = monopole(frequencyHz);
      expectClose(own.re, sources[0]!.impedanceOhm.re, { rel: 0.03, because });
      expectClose(own.im, sources[0]!.impedanceOhm.im, { rel: 0.03, floor: 50, because });
    }
  });
});
