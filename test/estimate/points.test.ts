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
