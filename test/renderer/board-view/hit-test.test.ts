import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Net, Plane } from '../../../app/board/board.ts';
import { distanceM, indexCopper } from '../../../renderer/board-view/copper-index.ts';
import { hitCopper, type LayerSight } from '../../../renderer/board-view/hit-test.ts';
import { drawingOrder, sightOf } from '../../../renderer/board-view/layer-sight.ts';
import { indexPieces, nearestPiece } from '../../../renderer/board-view/pick.ts';

/** Oracle: places on a small board drawn by hand; the index against looking at every piece. */

const trace = (layerIndex: number, ...pointsM: [number, number][]) => ({ layerIndex, widthM: 0.2e-3, pointsM });
const net = (name: string, parts: Partial<Net>): Net => ({ name, traces: [], vias: [], pins: [], ...parts });

const NETS: readonly Net[] = [
  net('UPPER', { traces: [trace(0, [0, 0], [0.01, 0])] }),
  net('LOWER', { traces: [trace(2, [0.005, -0.005], [0.005, 0.005])] }),
  net('VIA', {
    vias: [{ atM: [0.008, 0.003], fromLayerIndex: 0, toLayerIndex: 2, drillM: 0.3e-3 }],
    pins: [{ name: 'U1.1', atM: [0.002, 0.003], layerIndex: 0 }],
  }),
];
const square = (half: number): [number, number][] => [
  [-half, -half],
  [half, -half],
  [half, half],
  [-half, half],
];
const PLANES: readonly Plane[] = [{ layerIndex: 2, net: 'GND', ringM: square(0.02), cutoutsM: [square(0.001)] }];
const INDEX = indexCopper(NETS);
const TOP: LayerSight = { isShown: () => true, activeLayer: 0, isFromBottom: false };
const hit = (xM: number, yM: number, sight = TOP, reachM = 0.2e-3) => hitCopper(INDEX, PLANES, [xM, yM], reachM, sight);

describe('what lies under the pointer', () => {
  it('is the upper trace where two cross, the lower one from below or when it is the active layer', () => {
    expect(hit(0.005, 0)?.net).toBe('UPPER');
    expect(hit(0.005, 0, { ...TOP, activeLayer: 2 })?.net).toBe('LOWER');
    expect(hit(0.005, 0, { ...TOP, activeLayer: -1, isFromBottom: true })?.net).toBe('LOWER');
  });

  it('is nothing of a hidden layer', () => {
    const onlyLower = { ...TOP, isShown: (layer: number) => layer === 2 };
    expect(hit(0.005, 0, onlyLower)?.net).toBe('LOWER');
    expect(hit(0.002, 0, onlyLower)?.net).toBe('GND');
    expect(hit(0.002, 0, { ...TOP, isShown: () => false })).toBeNull();
  });

  it('counts from the copper’s edge: half the width and the reach, not more', () => {
    // Width 0.2 mm and reach 0.2 mm: 0.29 mm from the middle line is near enough, 0.31 mm is not.
    expect(hit(0.002, 0.29e-3)?.net).toBe('UPPER');
    expect(hit(0.002, 0.31e-3)?.net).toBe('GND');
  });

  it('names vias and pins, and copper under the pointer before nearer middles beside it', () => {
    expect(hit(0.008, 0.003)?.piece?.kind).toBe('via');
    expect(hit(0.002, 0.003)?.piece?.name).toBe('U1.1');
    // On the lower trace (0.08 mm off its middle), 0.15 mm beyond the upper trace's edge.
    expect(hit(0.00508, 0.25e-3)?.net).toBe('LOWER');
  });

  it('is the plane where there is nothing else, and nothing in its cutout', () => {
    expect(hit(-0.01, 0.01)?.net).toBe('GND');
    expect(hit(-0.01, 0.01)?.piece).toBeUndefined();
    expect(hit(-0.0005, 0.0006)).toBeNull();
    expect(hit(0.03, 0)).toBeNull();
  });

  it('is nothing on a board without copper', () => {
    expect(hitCopper(indexCopper([]), [], [0, 0], 1, TOP)).toBeNull();
  });
});

describe('distance from a straight piece', () => {
  it('is to the line beside it and to the end beyond it', () => {
    const piece = { fromM: [0, 0], toM: [4, 0] };
    expect(distanceM([1, 3], piece)).toBeCloseTo(3, 12);
    // 3-4-5 triangle beyond the end.
    expect(distanceM([7, 4], piece)).toBeCloseTo(5, 12);
    expect(distanceM([1, 1], { fromM: [0, 0], toM: [0, 0] })).toBeCloseTo(Math.SQRT2, 12);
  });
});

describe('the nearest coloured piece', () => {
  const pointsM = fc.tuple(fc.double({ min: 0, max: 0.1, noNaN: true }), fc.double({ min: 0, max: 0.1, noNaN: true }));

  it('is the one that looking at all of them finds', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(pointsM, pointsM), { minLength: 1, maxLength: 40 }), pointsM, (ends, at) => {
        const pieces = ends.map(([from, to], i) => ({
          net: `N${i}`,
          layer: i % 3 === 0 ? 'hidden' : 'TOP',
          fromM: [...from, 0] as [number, number, number],
          toM: [...to, 0] as [number, number, number],
          levelDbuvPerM: -i,
          currentRmsA: 0,
        }));
        const found = nearestPiece(
          indexPieces(pieces, ({ layer }) => layer === 'TOP'),
          at,
          0.02,
        );
        const distances = pieces.map((piece) => (piece.layer === 'TOP' ? distanceM(at, piece) : Infinity));
        const least = Math.min(...distances);
        if (least >= 0.02) expect(found).toBeNull();
        else expect(distances[found!]).toBe(least);
      }),
      { seed: 11, numRuns: 200 },
    );
  });
});

describe('layers', () => {
  const LAYERS = [
    { index: 0, name: 'TOP' },
    { index: 2, name: 'IN' },
    { index: 4, name: 'BOT' },
  ];

  it('are drawn from the far side, the active one last', () => {
    const all = { hidden: [], active: null };
    expect(drawingOrder(LAYERS, sightOf(LAYERS, all, false))).toEqual([4, 2, 0]);
    expect(drawingOrder(LAYERS, sightOf(LAYERS, all, true))).toEqual([0, 2, 4]);
    expect(drawingOrder(LAYERS, sightOf(LAYERS, { hidden: [], active: 'IN' }, false))).toEqual([4, 0, 2]);
  });

  it('that are hidden or of another board are left out', () => {
    expect(drawingOrder(LAYERS, sightOf(LAYERS, { hidden: ['TOP'], active: 'TOP' }, false))).toEqual([4, 2]);
    expect(sightOf(LAYERS, { hidden: ['TOP'], active: 'gone' }, false).activeLayer).toBe(2);
    expect(drawingOrder(LAYERS, sightOf(LAYERS, { hidden: ['TOP', 'IN', 'BOT'], active: null }, false))).toEqual([]);
  });
});
