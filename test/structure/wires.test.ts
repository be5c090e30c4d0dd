import { describe, expect, it } from 'vitest';
import type { Cable, Point3M } from '../../app/board/board.ts';
import { emptyIncident } from '../../app/structure/incident.ts';
import { buildMesh, type Mesh } from '../../app/structure/mesh.ts';
import { cellAtIndex } from '../../app/structure/sheet.ts';
import { seriesImpedanceAt } from '../../app/structure/structure-model.ts';
import { StructureSolver } from '../../app/structure/structure-solver.ts';
import { wireFromCable } from '../../app/structure/wires.ts';
import { expectClose } from '../support/expect-close.ts';
import { ETA0_OHM, FLAT_GROUND, fieldAt, meshElements, rectangle, sheetOf } from './support.ts';

const sheet = sheetOf([rectangle(0.06, 0.04)], 0.06, 0.04, 5e-3, 1.5e-3);

const cable = (pointsM: Point3M[], farEnd: Cable['farEnd'] = 'open'): Cable => ({
  name: 'lead',
  pointsM,
  radiusM: 1e-3,
  farEnd,
  seriesOhm: 0,
});
const wireOf = (one: Cable) => wireFromCable(one, 'cable', sheet, FLAT_GROUND, 0.02);

describe('a cable as a wire', () => {
  const bent = cable([
    [0.06, 0.0225, 0],
    [0.3, 0.0225, 0],
    [0.3, 0.0225, -0.5],
  ]);

  it('starts at the sheet’s height, keeps corners and length, grows from the joint', () => {
    const { pieces, nodes, jointM } = wireOf(bent);
    expect(jointM).toEqual([0.06, 0.0225, 1.5e-3]);
    const lengths = pieces.map(({ filament: { from, to } }) =>
      Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]),
    );
    expectClose(
      lengths.reduce((sum, l) => sum + l, 0),
      Math.hypot(0.24, 1.5e-3) + 0.5,
      { rel: 1e-12, because: 'corners kept' },
    );
    expect(lengths[0]!).toBeLessThan(6e-3);
    expect(Math.max(...lengths)).toBeLessThan(0.02 + 1e-9);
    for (let i = 1; i < lengths.length; i++) expect(lengths[i]! / lengths[i - 1]!).toBeLessThan(1.6);
    for (const [i, { filament }] of pieces.slice(1).entries()) expect(filament.from).toEqual(pieces[i]!.filament.to);
    expect(pieces.some(({ filament }) => Math.hypot(filament.to[0] - 0.3, filament.to[2]) < 1e-12)).toBe(true);
    // Open: a node at either end of every piece.
    expect(nodes).toHaveLength(pieces.length + 1);
  });

  it('charges lie on the halves beside each node, every half once', () => {
    const { nodes } = wireOf(bent);
    const total = nodes
      .flatMap(({ halves }) => halves)
      .reduce((sum, { from, to }) => sum + Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]), 0);
    expectClose(total, Math.hypot(0.24, 1.5e-3) + 0.5, { rel: 1e-12, because: 'halves make up the wire' });
    expect(nodes.filter(({ halves }) => halves.length === 2)).toHaveLength(1);
  });

  it('a grounded end has no charge of its own; a resistance lies in the last piece', () => {
    const down = cable(
      [
        [0.06, 0.0225, 0],
        [0.3, 0.0225, 0],
        [0.3, 0.0225, -0.8],
      ],
      'ground',
    );
    const { nodes, pieces } = wireOf(down);
    expect(nodes).toHaveLength(pieces.length);
    expect(pieces.at(-1)!.toNode).toBe(-1);
    expect(pieces.at(-1)!.filament.to[2]).toBe(-0.8);
    expect(wireOf({ ...down, farEnd: { resistanceOhm: 150 } }).endOhm).toBe(150);
  });

  it('joins the cells within three quarters of a cell, else the nearest within two cells', () => {
    const at = (x: number, y: number): number[] => [
      ...wireOf(
        cable([
          [x, y, 0],
          [x + 0.5, y, 0],
        ]),
      ).jointCells,
    ];
    expect(at(0.06, 0.0225)).toEqual([cellAtIndex(sheet, 11, 4)]);
    expect(at(0.06, 0.025)).toEqual([cellAtIndex(sheet, 11, 4), cellAtIndex(sheet, 11, 5)]);
    expect(at(0.03, 0.02)).toHaveLength(4);
    expect(at(0.066, 0.0226)).toEqual([cellAtIndex(sheet, 11, 4)]);
    expect(() => at(0.068, 0.0225)).toThrow(/within two cells/);
  });

  it('refuses ends that miss the ground, a site without one, and pieces without length', () => {
    const short = cable(
      [
        [0.06, 0.0225, 0],
        [0.3, 0.0225, -0.79],
      ],
      'ground',
    );
    expect(() => wireOf(short)).toThrow(/within 1 mm of the ground/);
    expect(() => wireFromCable(short, 'cable', sheet, null, 0.02)).toThrow(/without ground plane/);
    expect(() =>
      wireOf(
        cable([
          [0.06, 0.0225, 0],
          [0.3, 0, 0],
          [0.3, 0, 0],
        ]),
      ),
    ).toThrow(/apart/);
  });
});

/** Plane and cable driven by 1 V in the cable's first piece. */
function driven(
  one: Cable,
  frequencyHz: number,
  seriesOhm = 0,
): { mesh: Mesh; re: Float64Array; im: Float64Array; first: number } {
  const mesh = buildMesh(sheet, [wireOf(one)], FLAT_GROUND);
  const solver = new StructureSolver(mesh);
  const first = mesh.wireEdgeStart[0]!;
  const { endOhm, pieces } = mesh.wires[0]!;
  const series = [{ edge: first, re: seriesOhm, im: 0 }];
  if (endOhm > 0) series.push({ edge: first + pieces.length - 1, re: endOhm, im: 0 });
  solver.setFrequency(frequencyHz, series);
  const incident = emptyIncident(mesh);
  incident.emfRe[first] = 1;
  return { mesh, ...solver.solve(incident), first };
}

describe('plane with a driven cable', () => {
  const open = cable([
    [0.06, 0.0225, 0],
    [0.7, 0.0225, 0],
    [0.7, 0.3, -0.3],
  ]);

  it.each([60e6, 150e6, 400e6, 900e6])(
    'power from the source is the power through a half sphere, %f Hz',
    (frequencyHz) => {
      const { mesh, re, im, first } = driven(open, frequencyHz);
      const inputW = re[first]! / 2;
      const elements = meshElements(mesh, re, im);
      // Poynting's law far away over the ground: ∮ |E|²/(2η0) r² dΩ, Gauss in cos θ, equal steps around.
      const radiusM = 400;
      const steps = 24;
      let radiatedW = 0;
      for (let i = 0; i < steps; i++) {
        const cosine = (i + 0.5) / steps;
        for (let a = 0; a < 2 * steps; a++) {
          const angle = (Math.PI * a) / steps;
          const sine = Math.sqrt(1 - cosine * cosine);
          const e = fieldAt(elements, FLAT_GROUND, frequencyHz, [
            radiusM * sine * Math.cos(angle),
            radiusM * sine * Math.sin(angle),
            FLAT_GROUND.positionM + radiusM * cosine,
          ]);
          const square = e.reduce((sum, v) => sum + v * v, 0);
          radiatedW += ((square / (2 * ETA0_OHM)) * radiusM ** 2 * (2 * Math.PI)) / steps / (2 * steps);
        }
      }
      // Midpoint rule over some lobes and the retardation between centres; e^(−jkR) times the static mean would miss by 6 %.
      expectClose(radiatedW, inputW, { rel: 0.015, because: 'power balance' });
    },
  );

  it('answers the same between two places (reciprocity)', () => {
    const mesh = buildMesh(sheet, [wireOf(open)], FLAT_GROUND);
    const solver = new StructureSolver(mesh);
    solver.setFrequency(330e6, []);
    const answer = (driveAt: number, readAt: number): [number, number] => {
      const incident = emptyIncident(mesh);
      incident.emfRe[driveAt] = 1;
      const { re, im } = solver.solve(incident);
      return [re[readAt]!, im[readAt]!];
    };
    const [far, near] = [mesh.edgeCount - 3, 17];
    const [one, other] = [answer(far, near), answer(near, far)];
    expect(Math.hypot(one[0] - other[0], one[1] - other[1])).toBeLessThan(1e-9 * Math.hypot(...one));
  });

  it('a series resistance much larger than the antenna sets the current', () => {
    const { re, im, first } = driven(open, 120e6, 1e6);
    expectClose(re[first]!, 1e-6, { rel: 0.01, because: 'some kΩ of the antenna beside 1 MΩ' });
    expect(Math.abs(im[first]!)).toBeLessThan(2e-8);
  });

  it('a resistance at the far end tends to the grounded end for small values', () => {
    const down: Point3M[] = [
      [0.06, 0.0225, 0],
      [0.3, 0.0225, 0],
      [0.3, 0.0225, -0.8],
    ];
    const grounded = driven(cable(down, 'ground'), 90e6);
    const small = driven(cable(down, { resistanceOhm: 1e-6 }), 90e6);
    const large = driven(cable(down, { resistanceOhm: 1e7 }), 90e6);
    expectClose(small.re[small.first]!, grounded.re[grounded.first]!, { rel: 1e-6, because: '1 µΩ' });
    const last = large.mesh.edgeCount - 1;
    expect(Math.hypot(large.re[last]!, large.im[last]!)).toBeLessThan(1e-6);
    expect(Math.hypot(grounded.re[last]!, grounded.im[last]!)).toBeGreaterThan(1e-4);
  });
});

describe('impedance at the connector', () => {
  const row = (frequencyHz: number, resistanceOhm: number, reactanceOhm: number) => ({
    frequencyHz,
    resistanceOhm,
    reactanceOhm,
  });
  const core = { ...cable([[0, 0, 0]]), seriesOhm: 5, seriesImpedance: [row(10e6, 20, 40), row(1000e6, 220, -60)] };

  it('is linear over log frequency between rows and held at the ends, with the resistance added', () => {
    expect(seriesImpedanceAt(core, 1e6)).toEqual({ re: 25, im: 40 });
    expect(seriesImpedanceAt(core, 2e9)).toEqual({ re: 225, im: -60 });
    const middle = seriesImpedanceAt(core, 100e6);
    expectClose(middle.re, 125, { rel: 1e-12, because: 'half way on the log scale' });
    expectClose(middle.im, -10, { rel: 1e-12, because: 'half way on the log scale' });
    expect(seriesImpedanceAt({ ...core, seriesImpedance: [] }, 1e8)).toEqual({ re: 5, im: 0 });
  });
});
