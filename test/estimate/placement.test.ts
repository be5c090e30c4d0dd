import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { appFailure } from '../support/app-failure.ts';
import {
  boardFile,
  type Choices,
  driveFile,
  drivenBoard,
  estimateOf,
  linesVoltage,
  netFile,
  pointAt,
} from '../support/estimates.ts';

type Mm3 = [number, number, number];

const loopBoard = (pointsMm: Mm3[]): BoardFileInput =>
  boardFile({
    loops: [{ name: 'L', pointsMm, waveform: 'i' }],
    waveforms: [{ name: 'i', kind: 'lines', lines: [{ frequencyMhz: 90, amplitudeA: 1 }] }],
  });
const loopAt = (zMm: number, xMm = 30): BoardFileInput =>
  loopBoard([
    [xMm, 10, zMm],
    [xMm + 6, 10, zMm],
    [xMm + 6, 17, zMm],
  ]);
const refusal = (file: BoardFileInput, choices?: Choices) => appFailure(() => estimateOf(file, choices)).message;

describe('what does not fit on the site is refused', () => {
  it('a loop under the ground plane; in free space it is none', () => {
    expect(refusal(loopAt(-810))).toMatch(/loop L must be above the ground plane.*10\.0 mm below it/);
    expect(estimateOf(loopAt(-810), { site: { kind: 'free-space' } }).points).toHaveLength(1);
    expect(estimateOf(loopAt(-790)).points).toHaveLength(1);
  });

  it('a loop under the ground plane of an upright board: y below y_min − 800 mm', () => {
    const low = loopBoard([
      [30, -805, 1],
      [36, -805, 1],
      [36, -795, 1],
    ]);
    expect(refusal(low, { site: { orientation: 'upright' } })).toMatch(/loop L must be above the ground plane/);
    expect(estimateOf(low).points).toHaveLength(1);
  });

  it('a loop as far out as the antenna', () => {
    expect(refusal(loopAt(1, 3200))).toMatch(/loop L must be within 3\.04 m of the turntable axis.*3\.1/);
  });

  it('a net as far out as the antenna', () => {
    const far = drivenBoard(
      [
        netFile('FAR', [
          [10, 10],
          [3300, 10],
        ]),
      ],
      [driveFile('FAR', 'w')],
      [linesVoltage('w', [[90, 1]])],
      {
        planes: [
          {
            layer: 'BOT',
            net: 'GND',
            pointsMm: [
              [0, 0],
              [3400, 0],
              [3400, 20],
              [0, 20],
            ],
          },
        ],
      },
    );
    expect(refusal(far)).toMatch(/net FAR must be within 3\.04 m of the turntable axis/);
  });

  it('a board or cable that reaches the antenna', () => {
    const cable = (xMm: number) =>
      boardFile({
        cables: [
          {
            name: 'c',
            pointsMm: [
              [70, 22, 0],
              [xMm, 22, 0],
            ],
            commonModeUa: [[90, 5]],
          },
        ],
      });
    expect(refusal(cable(3040), { site: { measuredFrom: 'center' } })).toMatch(/distance must be more than.*3\.0/);
    // From the boundary there is always room.
    expect(estimateOf(cable(3040)).site.boundaryRadiusM).toBeCloseTo(3.005, 9);
  });
});

describe('driven nets without a trace', () => {
  const dot = { name: 'DOT', pins: [{ name: 'U1.DOT', atMm: [5, 5] as [number, number], layer: 'TOP' }] };
  const tones = [linesVoltage('w', [[90, 1]]), linesVoltage('v', [[120, 1]])];

  it('radiate nothing by themselves and do not stop the others', () => {
    const alone = estimateOf(drivenBoard([netFile('A')], [driveFile('A', 'w')], tones));
    const both = estimateOf(
      drivenBoard([netFile('A'), dot], [driveFile('A', 'w'), driveFile('DOT', 'v')], tones, {
        loads: [{ net: 'A', pin: 'U2.A', resistanceOhm: 75 }],
      }),
    );
    expect(both.points).toEqual(alone.points);
  });

  it('their waveform still counts as a clock of the board', () => {
    const { limit } = estimateOf(
      drivenBoard(
        [netFile('A'), dot],
        [driveFile('A', 'w'), driveFile('DOT', 'c')],
        [
          ...tones,
          { name: 'c', kind: 'trapezoid', frequencyMhz: 150, lowV: 0, highV: 1, dutyPercent: 50, riseNs: 1, fallNs: 1 },
        ],
        { loads: [] },
      ),
      { request: { maxHz: undefined as never } },
    );
    expect(limit.maxHz).toBe(2e9);
  });

  it('alone are no source', () => {
    expect(refusal(drivenBoard([dot], [driveFile('DOT', 'w')], tones, { loads: [] }))).toMatch(
      /drives must be on at least one net with a trace.*DOT/,
    );
  });
});

describe('distance', () => {
  const file = loopAt(1);

  it('from the boundary adds the radius of outline and cables, from the centre it does not', () => {
    const radiusM = Math.hypot(35, 22) / 1e3;
    const fromBoundary = pointAt(estimateOf(file, { site: { distanceM: 3 } }), 90e6);
    const fromCentre = pointAt(estimateOf(file, { site: { distanceM: 3 + radiusM, measuredFrom: 'center' } }), 90e6);
    expect(fromBoundary).toEqual(fromCentre);
    expect(pointAt(estimateOf(file, { site: { measuredFrom: 'center' } }), 90e6).levelDbuvPerM).toBeGreaterThan(
      fromBoundary.levelDbuvPerM,
    );
  });
});
