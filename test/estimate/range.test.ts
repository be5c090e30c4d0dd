import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
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

const cispr = (distanceM: number) =>
  chooseLimits({ standard: 'CISPR 32', class: 'B', distanceM, convertDistance: false });
const clock = (frequencyMhz: number): BoardFileInput =>
  drivenBoard(
    [netFile('A')],
    [driveFile('A', 'c')],
    [{ name: 'c', kind: 'trapezoid', frequencyMhz, lowV: 0, highV: 1, dutyPercent: 40, riseNs: 0.5, fallNs: 0.5 }],
  );
/** The standard's own rule: no upper end asked for. */
const byRule = (distanceM = 3): Choices => ({
  request: { limits: cispr(distanceM), maxHz: undefined as never },
  site: { distanceM },
});
const frequenciesMhz = (file: BoardFileInput, choices: Choices) =>
  [...new Set(estimateOf(file, choices).points.map(({ frequencyHz }) => Math.round(frequencyHz / 1e3) / 1e3))].sort(
    (a, b) => a - b,
  );

describe('judged range', () => {
  // CISPR 32 table 1 (from memory): up to 108 MHz → 1 GHz, to 500 MHz → 2 GHz, to 1 GHz → 5 GHz.
  it.each([
    [108, 1e9],
    [109, 2e9],
    [500, 2e9],
    [501, 5e9],
  ])('a clock of %f MHz is measured to %f Hz', (clockMhz, maxHz) => {
    const { limit, points } = estimateOf(clock(clockMhz), byRule());
    expect(limit.maxHz).toBe(maxHz);
    expect(limit.maxRule).toMatch(/highest clock/);
    const highest = Math.max(...points.map(({ frequencyHz }) => frequencyHz));
    expect(highest).toBeLessThanOrEqual(maxHz);
    expect(highest).toBeGreaterThan(maxHz - 1.001e6 * clockMhz);
  });

  it('waveforms that drive nothing are no clocks; loops are', () => {
    const unused = {
      name: 'x',
      kind: 'trapezoid' as const,
      frequencyMhz: 700,
      lowV: 0,
      highV: 1,
      dutyPercent: 50,
      riseNs: 0.2,
      fallNs: 0.2,
    };
    const file = clock(50);
    expect(estimateOf({ ...file, waveforms: [...file.waveforms!, unused] }, byRule()).limit.maxHz).toBe(1e9);
    const loop: BoardFileInput = {
      ...file,
      waveforms: [...file.waveforms!, { name: 'i', kind: 'lines', lines: [{ frequencyMhz: 300, amplitudeA: 1e-3 }] }],
      loops: [
        {
          name: 'L',
          waveform: 'i',
          pointsMm: [
            [1, 1, 1],
            [5, 1, 1],
            [5, 5, 1],
          ],
        },
      ],
    };
    expect(estimateOf(loop, byRule()).limit.maxHz).toBe(2e9);
  });

  it('at 10 m no line goes above 1 GHz: the range ends there and says so', () => {
    const { limit, points } = estimateOf(clock(300), byRule(10));
    expect(limit.maxHz).toBe(1e9);
    expect(limit.maxRule).toMatch(/ends at 1000 MHz, where the limit lines end/);
    expect(Math.max(...points.map(({ frequencyHz }) => frequencyHz))).toBe(900e6);
    expect(points.every(({ detector, limitDbuvPerM }) => detector === 'quasi-peak' && limitDbuvPerM < 40)).toBe(true);
  });

  it('both ends belong to it; the user’s end replaces the rule', () => {
    const tones = drivenBoard(
      [netFile('A')],
      [driveFile('A', 'w')],
      [
        linesVoltage('w', [
          [29.9, 1],
          [30, 1],
          [230, 1],
          [999.9, 1],
          [1000, 1],
          [1000.1, 1],
        ]),
      ],
    );
    const limits = cispr(3);
    expect(frequenciesMhz(tones, { request: { limits, maxHz: 1e9 } })).toEqual([30, 230, 999.9, 1000]);
    expect(frequenciesMhz(tones, { request: { limits, maxHz: 230e6 } })).toEqual([30, 230]);
    expect(frequenciesMhz(tones, { request: { limits, maxHz: 229.9e6 } })).toEqual([30]);
    expect(estimateOf(tones, { request: { limits, maxHz: 230e6 } }).limit.maxRule).toMatch(/set by the user/);
    expect(appFailure(() => estimateOf(tones, { request: { limits, maxHz: 30e6 } })).message).toMatch(
      /max-mhz must be above 30 MHz/,
    );
    // Past the last limit line there is nothing to judge.
    expect(estimateOf(tones, { request: { limits, maxHz: 40e9 } }).limit.maxHz).toBe(6e9);
  });

  it('at 230 MHz the tighter limit holds', () => {
    const tones = drivenBoard(
      [netFile('A')],
      [driveFile('A', 'w')],
      [
        linesVoltage('w', [
          [230, 1],
          [230.1, 1],
        ]),
      ],
    );
    const result = estimateOf(tones, { request: { limits: cispr(3) } });
    expect(pointAt(result, 230e6).limitDbuvPerM).toBe(40);
    expect(pointAt(result, 230.1e6).limitDbuvPerM).toBe(47);
  });
});

describe('1 GHz', () => {
  const loop = (frequencyMhz: number): BoardFileInput =>
    boardFile({
      waveforms: [{ name: 'i', kind: 'lines', lines: [{ frequencyMhz, amplitudeA: 1e-3 }] }],
      loops: [
        {
          name: 'L',
          waveform: 'i',
          pointsMm: [
            [33, 20, 1],
            [37, 20, 1],
            [37, 24, 1],
            [33, 24, 1],
          ],
        },
      ],
    });
  const at = (frequencyMhz: number, kind: 'ground-plane' | 'free-space') =>
    pointAt(estimateOf(loop(frequencyMhz), { site: { kind }, request: { maxHz: 2e9 } }), frequencyMhz * 1e6)
      .levelDbuvPerM;

  it('itself is measured over the ground plane, a rounded harmonic too; above it in free space', () => {
    const over = at(1000, 'ground-plane');
    const free = at(1000, 'free-space');
    // Facts 5.3: +4.8 dB of the height scan at 1 GHz, 3 m, horizontal.
    expect(over - free).toBeGreaterThan(4);
    expect(over - free).toBeLessThan(5.5);
    expect(at(1000 * (1 + 2 ** -52), 'ground-plane')).toBeCloseTo(over, 6);
    expect(at(1000.01, 'ground-plane')).toBe(at(1000.01, 'free-space'));
  });
});

describe('stated cables bring their own frequencies', () => {
  const cable: NonNullable<BoardFileInput['cables']>[number] = {
    name: 'c',
    pointsMm: [
      [70, 22, 0],
      [470, 22, 0],
    ],
    commonModeUa: [
      [20, 3],
      [30, 3],
      [88, 3],
      [1000, 3],
      [1100, 3],
    ],
  };

  it('its points in the range, and every line of the board', () => {
    const file = drivenBoard(
      [netFile('A')],
      [driveFile('A', 'w')],
      [
        linesVoltage('w', [
          [120, 1],
          [88, 1],
        ]),
      ],
      { cables: [cable] },
    );
    expect(frequenciesMhz(file, {})).toEqual([30, 88, 120, 1000]);
    const { points } = estimateOf(file);
    const names = (mhz: number) =>
      points
        .find(({ frequencyHz }) => frequencyHz === mhz * 1e6)!
        .contributors.map(({ kind }) => kind)
        .sort();
    expect([30, 88, 120, 1000].map(names)).toEqual([['cable'], ['cable', 'net'], ['cable', 'net'], ['cable']]);
  });

  it('counts once in a bandwidth, however many lines of the board are in it', () => {
    // 1 Mbit/s over 127 bits: a line every 7.9 kHz, 15 in 120 kHz, of a microvolt.
    const file = drivenBoard(
      [netFile('A')],
      [driveFile('A', 'd')],
      [
        {
          name: 'd',
          kind: 'random-data',
          bitRateMbps: 1,
          lowV: 0,
          highV: 1e-6,
          riseNs: 1,
          fallNs: 1,
          sequenceBits: 127,
        },
      ],
      { cables: [cable] },
    );
    for (const { levelDbuvPerM, contributors } of estimateOf(file, { request: { maxHz: 30.3e6 } }).points) {
      expect(contributors[0]!.name).toBe('c');
      expect(Math.abs(levelDbuvPerM - contributors[0]!.levelDbuvPerM)).toBeLessThan(1e-6);
    }
  });

  it('adds as a power', () => {
    const net = drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[88, 40]])]);
    const [both, alone] = [{ ...net, cables: [cable] }, boardFile({ cables: [cable] })].map((file) =>
      pointAt(estimateOf(file, { site: { measuredFrom: 'center' } }), 88e6),
    );
    const [first, second] = both!.contributors.map(({ levelDbuvPerM }) => 10 ** (levelDbuvPerM / 10));
    expect(both!.levelDbuvPerM).toBeCloseTo(10 * Math.log10(first! + second!), 9);
    expect(both!.levelDbuvPerM).toBeGreaterThan(alone!.levelDbuvPerM);
  });
});
