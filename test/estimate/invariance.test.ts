import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import {
  type Choices,
  driveFile,
  drivenBoard,
  estimateOf,
  linesVoltage,
  type Mm,
  netFile,
} from '../support/estimates.ts';

type Mm3 = [number, number, number];

/** Nothing about it is symmetric: two nets, one with a via under a slotted plane, a loop that leans, a stated cable. */
const base: BoardFileInput = drivenBoard(
  [
    netFile('A'),
    {
      ...netFile('B', [
        [14, 35],
        [31, 35],
        [37, 41],
      ]),
      z0Ohm: 55,
    },
  ],
  [driveFile('A', 'w'), driveFile('B', 'v', { delayNs: 0.7 })],
  [
    linesVoltage('w', [
      [95, 1.5],
      [610, 1.5],
    ]),
    linesVoltage('v', [
      [95, 1.1],
      [610, 1.1],
    ]),
  ],
  {
    planes: [
      {
        layer: 'BOT',
        net: 'GND',
        cutoutsMm: [
          [
            [20, 5],
            [24, 5],
            [24, 18],
            [20, 18],
          ],
        ],
      },
    ],
    loops: [
      {
        name: 'L',
        waveform: 'i',
        pointsMm: [
          [55, 30, 1.3],
          [63, 31, 1.3],
          [62, 38, 4],
        ],
      },
    ],
    cables: [
      {
        name: 'c',
        pointsMm: [
          [70, 10, 0],
          [270, 40, 0],
          [290, 90, -300],
        ],
        commonModeUa: [
          [30, 0.4],
          [1000, 0.2],
        ],
      },
    ],
  },
);
base.waveforms!.push({
  name: 'i',
  kind: 'lines',
  lines: [
    { frequencyMhz: 95, amplitudeA: 0.02 },
    { frequencyMhz: 610, amplitudeA: 0.004 },
  ],
});

/** Every point of the board's file moved. */
function moved(file: BoardFileInput, map: (point: Mm) => Mm): BoardFileInput {
  const points = (list: readonly (readonly [number, number])[]) => list.map(([x, y]) => map([x, y]));
  const points3 = (list: readonly (readonly [number, number, number])[]) =>
    list.map(([x, y, z]): Mm3 => [...map([x, y]), z]);
  return {
    ...file,
    outline: file.outline!.map(({ pointsMm }) => ({ pointsMm: points(pointsMm) })),
    planes: file.planes!.map(({ cutoutsMm = [], ...plane }) => ({ ...plane, cutoutsMm: cutoutsMm.map(points) })),
    nets: file.nets.map((net) => ({
      ...net,
      traces: net.traces!.map((trace) => ({ ...trace, pointsMm: points(trace.pointsMm) })),
      pins: net.pins!.map((pin) => ({ ...pin, atMm: map([...pin.atMm] as Mm) })),
    })),
    loops: file.loops!.map((loop) => ({ ...loop, pointsMm: points3(loop.pointsMm) })),
    cables: file.cables!.map((cable) => ({ ...cable, pointsMm: points3(cable.pointsMm) })),
  };
}

/** Levels agree to the search's tolerance; angles too, turned as `turn` says (the maximum's top is flat: 0.05°). */
function expectSame(found: EstimateResult, expected: EstimateResult, turn: (deg: number) => number): void {
  expect(found.points).toHaveLength(expected.points.length);
  expect(expected.points.length).toBeGreaterThan(1);
  for (const [i, point] of found.points.entries()) {
    const other = expected.points[i]!;
    for (const key of ['levelDbuvPerM', 'horizontalDbuvPerM', 'verticalDbuvPerM', 'marginDb'] as const) {
      expect(Math.abs(point[key] - other[key]), key).toBeLessThan(1e-4);
    }
    expect(Math.abs(point.upperBoundDbuvPerM - other.upperBoundDbuvPerM)).toBeLessThan(0.01);
    expect(point.polarization).toBe(other.polarization);
    expect(Math.abs(point.antennaHeightM - other.antennaHeightM)).toBeLessThan(2e-3);
    const off = point.turntableDeg - turn(other.turntableDeg);
    expect(Math.abs(off - 360 * Math.round(off / 360)), 'turntable').toBeLessThan(0.05);
    expect(point.contributors.map(({ kind, name }) => [kind, name])).toEqual(
      other.contributors.map(({ kind, name }) => [kind, name]),
    );
  }
}

const orientations: Choices[] = [{ site: { orientation: 'flat' } }, { site: { orientation: 'upright' } }];

describe.each(orientations)('the same board elsewhere in its drawing ($site.orientation)', (choices) => {
  const expected = estimateOf(base, choices);

  it('shifted by any offset gives the same result', () => {
    const offset = fc.double({ min: -60_000, max: 60_000, noNaN: true });
    fc.assert(
      fc.property(offset, offset, (dx, dy) => {
        expectSame(
          estimateOf(
            moved(base, ([x, y]) => [x + dx, y + dy]),
            choices,
          ),
          expected,
          (deg) => deg,
        );
      }),
      { numRuns: 5, seed: 20261210 },
    );
  });
});

describe('a board drawn turned or mirrored', () => {
  const expected = estimateOf(base);

  it.each([
    [90, ([x, y]: Mm): Mm => [-y, x]],
    [180, ([x, y]: Mm): Mm => [-x, -y]],
    [270, ([x, y]: Mm): Mm => [y, -x]],
  ])('by %i°: the antenna’s azimuth turns with it', (angleDeg, map) => {
    expectSame(estimateOf(moved(base, map)), expected, (deg) => deg + angleDeg);
  });

  it('mirrored about the y axis: the azimuth φ becomes 180° − φ', () => {
    expectSame(estimateOf(moved(base, ([x, y]) => [100 - x, y])), expected, (deg) => 180 - deg);
  });
});

describe('upright', () => {
  /** The same places on the site, given on a board lying flat. */
  const layDown = (list: readonly (readonly [number, number, number])[]): Mm3[] =>
    // Upright: (x, c − z, y − y_min), c half the thickness; flat: (x, y − y_middle, z), y_middle = 22.
    list.map(([x, y, z]) => [x, 22 + 0.6 - z, y]);

  it('is the same geometry turned: loops and cables placed there by hand give the same levels', () => {
    const standing: BoardFileInput = { ...base, nets: [], drives: [], loads: [] };
    const lying: BoardFileInput = {
      ...standing,
      loops: standing.loops!.map((loop) => ({ ...loop, pointsMm: layDown(loop.pointsMm) })),
      cables: standing.cables!.map((cable) => ({ ...cable, pointsMm: layDown(cable.pointsMm) })),
    };
    const site = { measuredFrom: 'center' } as const;
    const upright = estimateOf(standing, { site: { ...site, orientation: 'upright' } });
    expectSame(upright, estimateOf(lying, { site }), (deg) => deg);
    expect(upright.points[0]!.levelDbuvPerM).not.toBeCloseTo(
      estimateOf(standing, { site }).points[0]!.levelDbuvPerM,
      1,
    );
  });
});
