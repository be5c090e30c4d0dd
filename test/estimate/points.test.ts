import { describe, expect, it } from 'vitest';
import type { LineLevel } from '../../app/estimate/line-level.ts';
import { judge } from '../../app/estimate/points.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { limitSet } from '../support/estimates.ts';

const cispr32 = chooseLimits({ standard: 'CISPR 32', class: 'B', distanceM: 3, convertDistance: false });

/** Peak phasor of a level in dBµV/m rms: 40 dBµV/m is 100 µV/m rms, 141.4 µV/m peak. */
const peakOf = (levelDb: number): number => Math.SQRT2 * 1e-6 * 10 ** (levelDb / 20);

const line = (frequencyHz: number, levelDb: number, upperBoundDb = levelDb): LineLevel => ({
  frequencyHz,
  polarization: 'vertical',
  antennaHeightM: 1.3,
  turntableDeg: 70,
  fieldVPerM: peakOf(levelDb),
  horizontalVPerM: peakOf(levelDb - 7),
  verticalVPerM: peakOf(levelDb),
  upperBoundVPerM: peakOf(upperBoundDb),
  statedCablesVPerM: 0,
  contributors: [],
  isRough: false,
});

const near = (actual: number | undefined, expected: number) => expect(actual).toBeCloseTo(expected, 9);

describe('points from lines', () => {
  it('read rms of a peak phasor, margin = limit − level, both polarisations and the upper bound', () => {
    const [point] = judge([line(100e6, 31, 35)], cispr32).points;
    near(point!.levelDbuvPerM, 31);
    expect(point!.limitDbuvPerM).toBe(40);
    near(point!.marginDb, 9);
    near(point!.horizontalDbuvPerM, 24);
    near(point!.verticalDbuvPerM, 31);
    near(point!.upperBoundDbuvPerM, 35);
    expect(point).toMatchObject({ detector: 'quasi-peak', antennaHeightM: 1.3, turntableDeg: 70, frequencyHz: 100e6 });
  });

  it('come worst margin first, ties by frequency', () => {
    const levels = [line(40e6, 30), line(60e6, 38), line(80e6, 30), line(300e6, 45), line(500e6, 37)];
    const { points } = judge(levels, cispr32);
    // Margins: 10, 2, 10, 2, 10 dB (40 dBµV/m to 230 MHz, 47 above).
    expect(points.map(({ frequencyHz }) => frequencyHz / 1e6)).toEqual([60, 300, 40, 80, 500]);
  });

  it.each([
    [230e6, 40],
    [230e6 * (1 + 1e-12), 40],
    [230.001e6, 47],
  ])('at %f Hz, at or above the step, the limit is %f', (frequencyHz, limitDb) => {
    expect(judge([line(frequencyHz, 30)], cispr32).points[0]!.limitDbuvPerM).toBe(limitDb);
  });

  it('1 GHz is judged by every line that ends or begins there; above only average and peak', () => {
    const detectors = (hz: number) =>
      judge([line(hz, 30)], limitSet())
        .points.map(({ detector }) => detector)
        .sort();
    expect(detectors(1e9)).toEqual(['average', 'peak', 'quasi-peak']);
    expect(detectors(1.001e9)).toEqual(['average', 'peak']);
    expect(judge([line(29e6, 30), line(6.1e9, 30)], limitSet()).points).toEqual([]);
  });
});

describe('several lines in the bandwidth', () => {
  it('below 1 GHz: within 60 kHz to either side; quasi-peak is their linear sum and each is said to share', () => {
    const levels = [line(100e6, 30), line(100.05e6, 30), line(100.2e6, 30)];
    const { points, sharedHz } = judge(levels, cispr32);
    expect(sharedHz).toEqual([100e6, 100.05e6]);
    const at = (hz: number) => points.find(({ frequencyHz }) => frequencyHz === hz)!;
    near(at(100e6).levelDbuvPerM, 30 + 20 * Math.log10(2));
    near(at(100.05e6).levelDbuvPerM, 30 + 20 * Math.log10(2));
    near(at(100.2e6).levelDbuvPerM, 30);
  });

  it('above 1 GHz: within 0.5 MHz; average is the sum of powers, peak the linear sum', () => {
    const levels = [line(1.2e9, 30), line(1.2004e9, 30), line(1.2008e9, 30)];
    const middle = judge(levels, cispr32).points.filter(({ frequencyHz }) => frequencyHz === 1.2004e9);
    const level = (detector: string) => middle.find((point) => point.detector === detector)!.levelDbuvPerM;
    near(level('average'), 30 + 10 * Math.log10(3));
    near(level('peak'), 30 + 20 * Math.log10(3));
  });

  it('the bandwidth widens at 1 GHz: a line just above still takes those just below', () => {
    const levels = [line(999.8e6, 30), line(999.9e6, 30), line(1000e6, 30), line(1000.25e6, 30)];
    const above = judge(levels, cispr32).points.find(
      ({ frequencyHz, detector }) => frequencyHz === 1000.25e6 && detector === 'peak',
    );
    // 999.75 to 1000.75 MHz holds all four.
    near(above!.levelDbuvPerM, 30 + 20 * Math.log10(4));
  });

  it('the upper bound is never below the level', () => {
    const levels = [line(1.2e9, 30, 31), line(1.2004e9, 30, 33), line(1.2008e9, 30)];
    for (const { levelDbuvPerM, upperBoundDbuvPerM } of judge(levels, cispr32).points) {
      expect(upperBoundDbuvPerM).toBeGreaterThanOrEqual(levelDbuvPerM);
    }
    const [middle] = judge(levels, cispr32).points.filter(({ frequencyHz }) => frequencyHz === 1.2004e9);
    near(middle!.upperBoundDbuvPerM, 20 * Math.log10(10 ** (31 / 20) + 10 ** (33 / 20) + 10 ** (30 / 20)));
  });
});

describe('a stated cable current is what a receiver saw of the cable, so it counts once in a bandwidth', () => {
  /** Lines of a board and a cable of 34 dBµV/m at each: powers. */
  const cableDb = 34;
  const withCable = (frequencyHz: number, ownDb: number): LineLevel => {
    const totalDb = 10 * Math.log10(10 ** (ownDb / 10) + 10 ** (cableDb / 10));
    const linearDb = 20 * Math.log10(10 ** (ownDb / 20) + 10 ** (cableDb / 20));
    return { ...line(frequencyHz, totalDb, linearDb), statedCablesVPerM: peakOf(cableDb) };
  };

  it('lines add, the cable is added to them as a power', () => {
    const { points } = judge([withCable(1.2e9, 20), withCable(1.2003e9, 26), withCable(1.2006e9, 23)], cispr32);
    const middle = (detector: string) =>
      points.find((point) => point.frequencyHz === 1.2003e9 && point.detector === detector)!;
    const linear = 10 ** (20 / 20) + 10 ** (26 / 20) + 10 ** (23 / 20);
    const power = 10 ** (20 / 10) + 10 ** (26 / 10) + 10 ** (23 / 10);
    const cable = 10 ** (cableDb / 20);
    near(middle('peak').levelDbuvPerM, 20 * Math.log10(Math.hypot(linear, cable)));
    near(middle('average').levelDbuvPerM, 10 * Math.log10(power + cable ** 2));
    expect(middle('peak').upperBoundDbuvPerM).toBeGreaterThanOrEqual(20 * Math.log10(linear + cable) - 1e-9);
    expect(middle('peak').upperBoundDbuvPerM).toBeLessThan(20 * Math.log10(linear + cable) + 0.01);
  });

  it('fifteen weak lines beside a strong cable read the cable', () => {
    const levels = Array.from({ length: 15 }, (_, i) => withCable(100e6 + 8e3 * i, -60));
    const [middle] = judge(levels, cispr32).points.filter(({ frequencyHz }) => frequencyHz === 100.056e6);
    // 15 lines of −60 dBµV/m are −36.5 dBµV/m.
    expect(Math.abs(middle!.levelDbuvPerM - cableDb)).toBeLessThan(1e-6);
  });

  it('at a point of its own beside a line it is no line of the board', () => {
    // The parts are summed apart from the total: rounding differs.
    const own = { ...line(100.02e6, cableDb), statedCablesVPerM: peakOf(cableDb) * (1 - 2 ** -50) };
    const { points, sharedHz } = judge([withCable(100e6, 30), own], cispr32);
    const both = 10 * Math.log10(10 ** (30 / 10) + 10 ** (cableDb / 10));
    for (const { levelDbuvPerM } of points) expect(levelDbuvPerM).toBeCloseTo(both, 6);
    expect(sharedHz).toEqual([]);
  });
});

describe('no field at all', () => {
  it('is a finite level: JSON has no −∞', () => {
    const silent: LineLevel = {
      ...line(100e6, 0),
      fieldVPerM: 0,
      horizontalVPerM: 0,
      verticalVPerM: 0,
      upperBoundVPerM: 0,
    };
    const [point] = judge([silent], cispr32).points;
    const { levelDbuvPerM, marginDb, horizontalDbuvPerM, verticalDbuvPerM, upperBoundDbuvPerM } = JSON.parse(
      JSON.stringify(point),
    );
    for (const level of [levelDbuvPerM, horizontalDbuvPerM, verticalDbuvPerM, upperBoundDbuvPerM]) {
      expect(level).toBe(-200);
    }
    expect(marginDb).toBe(240);
  });
});
