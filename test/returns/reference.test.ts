import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { PlaneIndex } from '../../app/returns/reference.ts';
import { boardFile, type Mm } from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';

/** L1 … L5 with dielectrics of 0.1, 0.2, 0.3 and 0.6 mm between copper of 0.02 mm. */
const STACK: BoardFileInput['stackup'] = ['L1', 'L2', 'L3', 'L4', 'L5'].flatMap((name, i) => {
  const copper = { name, kind: 'copper' as const, thicknessMm: 0.02 };
  const thicknessMm = [0.1, 0.2, 0.3, 0.6][i];
  return thicknessMm === undefined
    ? [copper]
    : [copper, { name: `D${i + 1}`, kind: 'dielectric' as const, thicknessMm, epsilonR: 2 + i }];
});
const layer = (name: string) => STACK.findIndex((row) => row.name === name);
const box = (x1: number, y1: number, x2: number, y2: number): Mm[] => [
  [x1, y1],
  [x2, y1],
  [x2, y2],
  [x1, y2],
];
const indexOf = (planes: NonNullable<BoardFileInput['planes']>) =>
  new PlaneIndex(boardOf(boardFile({ stackup: STACK, planes })));
/** Reference of a trace from (10, 20) to (50, 20) mm. */
const referenceOn = (name: string, planes: NonNullable<BoardFileInput['planes']>, ownNet = 'S') =>
  indexOf(planes).referenceOf([0.01, 0.02], [0.05, 0.02], layer(name), ownNet);

describe('planes that carry a return', () => {
  it('the nearest below a surface trace: distance between facing surfaces, dielectrics between', () => {
    const { planes, gaps } = referenceOn('L1', [
      { layer: 'L3', net: 'GND' },
      { layer: 'L5', net: 'GND' },
    ]);
    expect(gaps).toEqual([]);
    expect(planes).toHaveLength(1);
    const [plane] = planes;
    expect(plane).toMatchObject({ layerIndex: layer('L3'), net: 'GND', share: 1 });
    // 0.1 + 0.02 (bare L2) + 0.2 mm.
    expect(plane!.heightM).toBeCloseTo(0.32e-3, 12);
    expect(plane!.traceZM - plane!.planeZM).toBeCloseTo(0.32e-3, 12);
    expect(plane!.rows.map(({ name }) => name)).toEqual(['D1', 'D2']);
  });

  it('the nearest above a trace on the underside', () => {
    const { planes } = referenceOn('L5', [
      { layer: 'L1', net: 'GND' },
      { layer: 'L4', net: 'GND' },
    ]);
    expect(planes).toHaveLength(1);
    expect(planes[0]!.layerIndex).toBe(layer('L4'));
    expect(planes[0]!.traceZM).toBeCloseTo(0.02e-3, 12);
    expect(planes[0]!.planeZM).toBeCloseTo(0.62e-3, 12);
  });

  it('between two planes the return splits in inverse proportion to the distances (physics 5.1)', () => {
    const { planes } = referenceOn('L3', [
      { layer: 'L2', net: 'GND' },
      { layer: 'L4', net: 'VCC' },
    ]);
    const share = (name: string) => planes.find(({ layerIndex }) => layerIndex === layer(name))!.share;
    // 0.2 mm to L2, 0.3 mm to L4: 0.6 and 0.4.
    expect(share('L2')).toBeCloseTo(0.6, 12);
    expect(share('L4')).toBeCloseTo(0.4, 12);
    expect(planes.map(({ net }) => net).sort()).toEqual(['GND', 'VCC']);
  });

  it('the trace’s own net and its own layer carry none', () => {
    const planes = [
      { layer: 'L1', net: 'GND' },
      { layer: 'L2', net: 'S' },
      { layer: 'L3', net: 'GND' },
    ];
    expect(referenceOn('L1', planes).planes.map(({ layerIndex }) => layerIndex)).toEqual([layer('L3')]);
    expect(referenceOn('L1', planes, 'T').planes.map(({ layerIndex }) => layerIndex)).toEqual([layer('L2')]);
  });

  it('a plane that covers half serves, one that covers less gives way to the next', () => {
    const planes = (toMm: number) => [
      { layer: 'L2', net: 'GND', pointsMm: box(0, 0, toMm, 40) },
      { layer: 'L3', net: 'GND' },
    ];
    // The trace is 40 mm long from x = 10: half of it is at 30.
    const half = referenceOn('L1', planes(30.001));
    expect(half.planes.map(({ layerIndex }) => layerIndex)).toEqual([layer('L2')]);
    expect(half.gaps).toHaveLength(1);
    expect(half.gaps[0]!.from).toBeCloseTo(20.001 / 40, 9);
    expect(half.gaps[0]!.to).toBe(1);
    const less = referenceOn('L1', planes(29.999));
    expect(less.planes.map(({ layerIndex }) => layerIndex)).toEqual([layer('L3')]);
    expect(less.gaps).toEqual([]);
  });

  it.each([
    ['L2', 'L4'],
    ['L4', 'L2'],
  ])('when none covers half, the one that covers most (%s, not %s), with its gap', (most, least) => {
    const { planes, gaps } = referenceOn('L3', [
      { layer: least, net: 'GND', pointsMm: box(10, 0, 14, 40) },
      { layer: most, net: 'GND', pointsMm: box(0, 0, 20, 40) },
    ]);
    expect(planes.map(({ layerIndex, share }) => [layerIndex, share])).toEqual([[layer(most), 1]]);
    expect(gaps.map(({ from, to }) => [from, to])).toEqual([[expect.closeTo(0.25, 9), 1]]);
  });

  it('no plane at all: all of the trace is a gap', () => {
    expect(referenceOn('L1', [])).toEqual({ planes: [], gaps: [{ from: 0, to: 1 }] });
    expect(referenceOn('L1', [{ layer: 'L2', net: 'GND', pointsMm: box(0, 30, 60, 40) }]).planes).toEqual([]);
  });

  it('areas of several nets on one layer: the net under most of the trace, a split between them as a gap', () => {
    const { planes, gaps } = referenceOn('L1', [
      { layer: 'L2', net: 'VCC', pointsMm: box(0, 0, 21.8, 40) },
      { layer: 'L2', net: 'GND', pointsMm: box(22, 0, 60, 40) },
    ]);
    expect(planes.map(({ net }) => net)).toEqual(['GND']);
    expect(gaps.map(({ from, to }) => [from, to])).toEqual([
      [expect.closeTo(11.8 / 40, 9), expect.closeTo(12 / 40, 9)],
    ]);
  });

  it('the gap is that of the nearer of two planes', () => {
    const cut = { layer: 'L4', net: 'GND', cutoutsMm: [box(30, 10, 32, 30)] };
    const nearCut = { layer: 'L2', net: 'GND', cutoutsMm: [box(40, 10, 41, 30)] };
    expect(referenceOn('L3', [{ layer: 'L2', net: 'GND' }, cut]).gaps).toEqual([]);
    expect(referenceOn('L3', [nearCut, cut]).gaps).toEqual([
      { from: expect.closeTo(0.75, 9), to: expect.closeTo(31 / 40, 9) },
    ]);
  });
});

describe('way around an opening', () => {
  const planes = indexOf([{ layer: 'L2', net: 'GND', cutoutsMm: [box(30, 12, 32, 25)] }]);

  it('distance to copper to either side, none past the last copper', () => {
    expect(planes.distanceToCopperM(layer('L2'), [0.031, 0.02], [0, 1])).toBeCloseTo(5e-3, 9);
    expect(planes.distanceToCopperM(layer('L2'), [0.031, 0.02], [0, -1])).toBeCloseTo(8e-3, 9);
    expect(planes.distanceToCopperM(layer('L2'), [0.1, 0.02], [1, 0])).toBe(Infinity);
    expect(planes.distanceToCopperM(layer('L3'), [0.031, 0.02], [0, 1])).toBe(Infinity);
  });
});
