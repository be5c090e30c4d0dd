import { describe, expect, it } from 'vitest';
import type { PointM } from '../../app/board/board.ts';
import { profileRatio } from '../../app/structure/edge-profile.ts';
import { emptyIncident } from '../../app/structure/incident.ts';
import { buildMesh } from '../../app/structure/mesh.ts';
import { PairCoupling } from '../../app/structure/pair-coupling.ts';
import type { PairPiece } from '../../app/structure/pair-piece.ts';
import { RegularField } from '../../app/structure/regular-field.ts';
import type { Sheet } from '../../app/structure/sheet.ts';
import { SheetLookup } from '../../app/structure/sheet-lookup.ts';
import { stripDensity } from '../../app/structure/strip-density.ts';
import { StructureSolver } from '../../app/structure/structure-solver.ts';
import { expectClose } from '../support/expect-close.ts';
import {
  decibels,
  drivenLine,
  type Element,
  FLAT_GROUND,
  maxima,
  meshElements,
  rectangle,
  rectangleRing,
  sheetOf,
  solvePairs,
  uniform,
} from './support.ts';

const CENTRE: PointM = [0.03, 0.02];
const plate = (cellM: number, cutouts: PointM[][] = []): Sheet =>
  sheetOf([rectangle(0.06, 0.04, cutouts)], 0.06, 0.04, cellM);
const piece = (fromM: PointM, toM: PointM, heightM: number): PairPiece => ({
  fromM,
  toM,
  heightM,
  side: 1,
  epsilonR: 1,
});

/** Maxima of pair and structure for one straight trace driven by 1 V into 220 Ω. */
function levels(sheet: Sheet, fromM: PointM, toM: PointM, heightM: number, frequencyHz: number) {
  const wave = drivenLine(frequencyHz, Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1]), 110, 220);
  const { pair, structure } = solvePairs(sheet, FLAT_GROUND, frequencyHz, [piece(fromM, toM, heightM)], [wave]);
  return maxima([...pair, ...structure], frequencyHz, CENTRE);
}

describe('a pair over a plain plane', () => {
  it.each([
    ['middle', 20.3, 0.2],
    ['middle', 20.3, 5],
    ['quarter', 31, 1.5],
    ['1.5 mm from the edge', 38.5, 0.2],
    ['1.5 mm from the edge', 38.5, 5],
  ])('%s (y = %f mm, h = %f mm): cells of 5 and 2.5 mm within 1 dB at 100 and 700 MHz', (_, yMm, hMm) => {
    // Without the crowding at edges the outer case changes by 5 dB and more.
    for (const frequencyHz of [100e6, 700e6]) {
      const [coarse, fine] = [5e-3, 2.5e-3].map((cellM) =>
        levels(plate(cellM), [0.01, yMm / 1e3], [0.051, yMm / 1e3], hMm / 1e3, frequencyHz),
      );
      expect(Math.abs(decibels(coarse!.horizontal / fine!.horizontal))).toBeLessThan(1);
      expect(Math.abs(decibels(coarse!.vertical / fine!.vertical))).toBeLessThan(0.2);
    }
  });

  it('is proportional to h for small h and smooth up to the cell size', () => {
    const over = (hMm: number): number =>
      levels(plate(5e-3), [0.01, 0.0143], [0.051, 0.0143], hMm / 1e3, 400e6).horizontal / hMm;
    const slopes = [0.1, 0.2, 0.5, 1, 2, 3.5, 5].map(over);
    expectClose(slopes[1]!, slopes[0]!, { rel: 1e-3, because: 'h/cell = 0.04: terms in h² are left out' });
    for (let i = 1; i < slopes.length; i++) expect(Math.abs(decibels(slopes[i]! / slopes[i - 1]!))).toBeLessThan(0.3);
  });

  it('does not jump where the trace crosses from one row of cells to the next', () => {
    const at = (yMm: number) => levels(plate(5e-3), [0.01, yMm / 1e3], [0.051, yMm / 1e3], 1e-3, 400e6);
    expectClose(at(15.001).horizontal, at(14.999).horizontal, { rel: 1e-3, because: '2 µm apart' });
    const steps = [26, 27, 28, 29, 30, 31, 32, 33, 34].map((yMm) => decibels(at(yMm).horizontal));
    for (let i = 1; i < steps.length; i++) expect(steps[i]! - steps[i - 1]!).toBeGreaterThan(0);
    for (let i = 1; i < steps.length; i++) expect(steps[i]! - steps[i - 1]!).toBeLessThan(2);
  });

  it('does not care how the trace is cut, which way it is drawn, or on which side it lies', () => {
    const frequencyHz = 600e6;
    const sheet = plate(5e-3);
    const solve = (pieces: PairPiece[], waves: Parameters<typeof solvePairs>[4]) =>
      solvePairs(sheet, FLAT_GROUND, frequencyHz, pieces, waves).structure;
    const whole = drivenLine(frequencyHz, 0.041, 110, 220);
    const reference = solve([piece([0.01, 0.013], [0.051, 0.013], 1e-3)], [whole]);
    const shift = (sM: number) => {
      const turn = (re: number, im: number, angle: number) => [
        re * Math.cos(angle) - im * Math.sin(angle),
        re * Math.sin(angle) + im * Math.cos(angle),
      ];
      const [fr, fi] = turn(whole.forwardReA, whole.forwardImA, -whole.gammaImPerM * sM);
      const [br, bi] = turn(whole.backwardReA, whole.backwardImA, whole.gammaImPerM * sM);
      return { ...whole, forwardReA: fr!, forwardImA: fi!, backwardReA: br!, backwardImA: bi! };
    };
    const cut = solve(
      [piece([0.01, 0.013], [0.0234, 0.013], 1e-3), { ...piece([0.0234, 0.013], [0.051, 0.013], 1e-3), side: -1 }],
      [whole, shift(0.0134)],
    );
    const end = shift(0.041);
    const reversed = solve(
      [piece([0.051, 0.013], [0.01, 0.013], 1e-3)],
      [
        {
          ...whole,
          forwardReA: -end.backwardReA,
          forwardImA: -end.backwardImA,
          backwardReA: -end.forwardReA,
          backwardImA: -end.forwardImA,
        },
      ],
    );
    const size = Math.max(...reference.map(({ re, im }) => Math.hypot(re, im)));
    for (const [i, { re, im }] of reference.entries()) {
      // The cut falls inside a half-cell stretch, whose weights are taken at its middle.
      expect(Math.hypot(cut[i]!.re - re, cut[i]!.im - im)).toBeLessThan(0.01 * size);
      expect(Math.hypot(reversed[i]!.re - re, reversed[i]!.im - im)).toBeLessThan(1e-6 * size);
    }
  });

  it('a trace along y on the turned plane gives the turned currents', () => {
    const one = solvePairs(plate(5e-3), null, 500e6, [piece([0.01, 0.0313], [0.051, 0.0221], 1e-3)], [uniform(1)]);
    const turned = sheetOf([rectangle(0.04, 0.06)], 0.04, 0.06, 5e-3);
    const other = solvePairs(
      turned,
      null,
      500e6,
      [piece([0.04 - 0.0313, 0.01], [0.04 - 0.0221, 0.051], 1e-3)],
      [uniform(1)],
    );
    const size = Math.max(...one.structure.map(({ re, im }) => Math.hypot(re, im)));
    for (const { atM, vectorM, re, im } of one.structure) {
      const twin = other.structure.find(
        (element) => Math.hypot(element.atM[0] - (0.04 - atM[1]), element.atM[1] - atM[0]) < 1e-6,
      )!;
      const sign = Math.sign(-vectorM[1] * twin.vectorM[0] + vectorM[0] * twin.vectorM[1]);
      expect(Math.hypot(twin.re * sign - re, twin.im * sign - im)).toBeLessThan(1e-9 * size);
    }
  });
});

describe('two ways to one answer', () => {
  it('a loop standing on the plane: as a pair, and by its own regular field', () => {
    const height = 1.6e-3;
    const [from, to]: [PointM, PointM] = [
      [0.0183, 0.0263],
      [0.0402, 0.0263],
    ];
    for (const frequencyHz of [100e6, 700e6]) {
      const pair = solvePairs(plate(2.5e-3), FLAT_GROUND, frequencyHz, [piece(from, to, height)], [uniform(1)]);
      const mesh = buildMesh(plate(2.5e-3), [], FLAT_GROUND);
      const solver = new StructureSolver(mesh);
      solver.setFrequency(frequencyHz, []);
      const corners = [
        [...from, 0],
        [...from, height],
        [...to, height],
        [...to, 0],
      ] as [number, number, number][];
      const filaments = corners.flatMap((a, i) => {
        const b = corners[(i + 1) % 4]!;
        const count = Math.ceil(Math.hypot(b[0] - a[0], b[1] - a[1]) / 1e-3) || 1;
        const at = (t: number) =>
          [0, 1, 2].map((axis) => a[axis]! + t * (b[axis]! - a[axis]!)) as [number, number, number];
        return Array.from({ length: count }, (_, k) => ({ from: at(k / count), to: at((k + 1) / count) }));
      });
      const incident = emptyIncident(mesh);
      const edges = Array.from({ length: mesh.edgeCount }, (_, e) => e);
      new RegularField(mesh, filaments, edges, []).addTo(incident, frequencyHz, (_, out) => out.set([1, 0, 0, 0]));
      const { re, im } = solver.solve(incident);
      const loop = filaments.map(
        ({ from: a, to: b }): Element => ({
          atM: [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2, (a[2] + b[2]) / 2],
          vectorM: [b[0] - a[0], b[1] - a[1], b[2] - a[2]],
          re: 1,
          im: 0,
        }),
      );
      const one = maxima([...pair.pair, ...pair.structure], frequencyHz, CENTRE);
      const other = maxima([...loop, ...meshElements(mesh, re, im)], frequencyHz, CENTRE);
      // One takes the sheet's density from neighbouring cells, the other the loop's field on whole cells.
      expect(Math.abs(decibels(one.horizontal / other.horizontal))).toBeLessThan(0.3);
      expect(Math.abs(decibels(one.vertical / other.vertical))).toBeLessThan(0.3);
    }
  });
});

describe('crowding towards edges', () => {
  it('couples like the return inductance of a strip, µ0 h/(2π √(w² − u²)), times the strip’s current', () => {
    // Facts file 7.7 (derived there by conformal mapping). Factor × density = (1/π)/√(w² − u²) per cell for small h.
    const cells = 14;
    for (const at of [0.4, 1.1, 2.6, 5, 7, 12.2]) {
      const cell = Math.floor(at);
      const flux = profileRatio(at, 1e-4, cell, 0, cells) * stripDensity(cells, cell);
      expectClose(flux, 1 / (Math.PI * Math.sqrt(49 - (at - 7) ** 2)), { rel: 1e-5, because: 'h/w = 1e-5' });
    }
    // Over the very edge it stays finite: √(h/2…) law of the half plane, Im √(2jh/w) / … from arcsin near 1.
    const edge = profileRatio(0, 0.01, 0, 0, 2000) * stripDensity(2000, 0) * Math.PI;
    expectClose(edge, Math.sqrt(0.01 / 1000) / 0.01, { rel: 0.01, because: 'Im arcsin(1 + jε) → √ε' });
  });

  it('discrete densities: whole current once, symmetric, exact away from the edges', () => {
    for (const count of [1, 2, 5, 16, 48, 90]) {
      const density = Array.from({ length: count }, (_, i) => stripDensity(count, i));
      const because = 'beyond 48 cells pieced together';
      expectClose(
        density.reduce((sum, one) => sum + one, 0),
        1,
        { rel: 0.01, because },
      );
      for (const [i, one] of density.entries()) expect(one).toBeCloseTo(density[count - 1 - i]!, 9);
    }
    const middle = stripDensity(40, 20);
    expectClose(middle, 1 / (Math.PI * 20), { rel: 0.01, because: 'twenty cells from either edge' });
  });
});

describe('slots', () => {
  const slotted = (cellM: number, widthM: number, lengthM = 0.02): Sheet =>
    plate(cellM, [rectangleRing(0.03 - widthM / 2, 0.02 - lengthM / 2, 0.03 + widthM / 2, 0.02 + lengthM / 2)]);
  const from: PointM = [0.01, 0.0213];
  const to: PointM = [0.051, 0.0213];

  it('an opening that is none changes nothing: filament left out, current injected, trace alone over it', () => {
    const frequencyHz = 700e6;
    const wave = drivenLine(frequencyHz, 0.041, 110, 220);
    for (const cellM of [10e-3, 5e-3, 2.5e-3]) {
      const cut = slotted(cellM, 0.2e-3);
      const whole = plate(cellM);
      const mesh = buildMesh(whole, [], FLAT_GROUND);
      const solver = new StructureSolver(mesh);
      solver.setFrequency(frequencyHz, []);
      const level = (sheet: Sheet) => {
        // The coupling sees `sheet`, the solver the whole plane.
        const lookup = Object.assign(new SheetLookup(mesh), { mesh: { ...mesh, sheet } });
        const pieces = [piece(from, to, 3e-3)];
        const coupling = new PairCoupling(lookup, pieces, 'pieces');
        const incident = emptyIncident(mesh);
        coupling.addTo(incident, frequencyHz, [wave]);
        const { re, im } = solver.solve(incident);
        const { pair } = solvePairs(sheet, FLAT_GROUND, frequencyHz, pieces, [wave]);
        return { gaps: coupling.gaps.length, ...maxima([...pair, ...meshElements(mesh, re, im)], frequencyHz, CENTRE) };
      };
      const [one, other] = [level(whole), level(cut)];
      expect([one.gaps, other.gaps]).toEqual([0, 1]);
      expect(Math.abs(decibels(other.horizontal / one.horizontal))).toBeLessThan(0.15);
      expect(Math.abs(decibels(other.vertical / one.vertical))).toBeLessThan(0.05);
    }
  });

  it('do not care where a trace bends over them: before, on or behind their line', () => {
    const sheet = slotted(5e-3, 0.4e-3);
    const over = (bendMm: number) => {
      const bend: PointM = [bendMm / 1e3, 0.0213];
      const pieces = [piece(from, bend, 1.5e-3), piece(bend, [0.051, 0.0243], 1.5e-3)];
      const { pair, structure } = solvePairs(sheet, FLAT_GROUND, 700e6, pieces, [uniform(1), uniform(1)]);
      return decibels(maxima([...pair, ...structure], 700e6, CENTRE).horizontal);
    };
    // Seen: 0.3 dB where the bend lies between the slot and the nearest cells' centres, 0.02 dB farther away; with the return kept
    // across the slot at the bend it would be 3.7 dB.
    for (const bendMm of [29.9, 30.1]) expect(Math.abs(over(30) - over(bendMm))).toBeLessThan(0.35);
    for (const bendMm of [26, 34]) expect(Math.abs(over(30) - over(bendMm))).toBeLessThan(0.05);
  });

  it('radiate more the longer and the wider they are', () => {
    const level = (widthM: number, lengthM: number) =>
      levels(slotted(2.5e-3, widthM, lengthM), from, to, 1.5e-3, 700e6).horizontal;
    const none = levels(plate(2.5e-3), from, to, 1.5e-3, 700e6).horizontal;
    const series = [none, level(0.2e-3, 0.01), level(0.2e-3, 0.02), level(0.2e-3, 0.03)];
    for (let i = 1; i < series.length; i++) expect(series[i]!).toBeGreaterThan(series[i - 1]!);
    const widths = [0.2e-3, 0.6e-3, 1.5e-3].map((widthM) => level(widthM, 0.03));
    for (let i = 1; i < widths.length; i++) expect(widths[i]!).toBeGreaterThan(widths[i - 1]!);
  });

  it('keep their level when cells are halved', () => {
    const [coarse, fine] = [5e-3, 2.5e-3].map((cellM) => levels(slotted(cellM, 0.4e-3, 0.03), from, to, 3e-3, 700e6));
    // A slot of six cells; with cut links alone it would change by 2.4 dB.
    expect(Math.abs(decibels(coarse!.horizontal / fine!.horizontal))).toBeLessThan(1.2);
  });
});
