import { describe, expect, it } from 'vitest';
import type { Contributor, EstimateResult, ResultPoint } from '../../app/estimate/result.ts';
import { causesOf, emittersOf, worstWithout } from '../../app/report/causes.ts';
import { resultWith, sampleResult } from '../support/sample-result.ts';

const base = sampleResult().points[0]!;

const net = (name: string, levelDbuvPerM: number, viaDbuvPerM: Record<string, number>): Contributor => ({
  kind: 'net',
  name,
  levelDbuvPerM,
  viaDbuvPerM,
});

const point = (
  mhz: number,
  levelDbuvPerM: number,
  limitDbuvPerM: number,
  contributors: Contributor[],
): ResultPoint => ({
  ...base,
  frequencyHz: mhz * 1e6,
  levelDbuvPerM,
  limitDbuvPerM,
  marginDb: limitDbuvPerM - levelDbuvPerM,
  contributors,
});

/** 100 MHz: A 30 by the cable and 20 by the pair, B 10; 300 MHz: B 38 by the plane under the higher limit. */
const result: EstimateResult = resultWith([
  point(100, 30.5, 40, [net('A', 30.4, { 'long cable': 30, pair: 20 }), net('B', 10, { plane: 10 })]),
  point(300, 38, 47, [net('B', 38, { plane: 38 })]),
]);

describe('causes', () => {
  it('are one contributor by one path, at the line where it comes nearest to the limit by itself', () => {
    expect(
      causesOf(result).map(({ contributor, path, point: at, ownMarginDb }) => [
        contributor.name,
        path,
        at.frequencyHz / 1e6,
        ownMarginDb,
      ]),
    ).toEqual([
      ['B', 'plane', 300, 9],
      ['A', 'long cable', 100, 10],
      ['A', 'pair', 100, 20],
    ]);
  });

  it('do not mix kinds, nor names that are made to look alike', () => {
    const loop: Contributor = { kind: 'loop', name: 'A', levelDbuvPerM: 5, viaDbuvPerM: { loop: 5 } };
    const mixed = resultWith([
      point(100, 30, 40, [net('A', 30, { 'x plane': 30 }), net('A x', 20, { plane: 20 }), loop]),
    ]);
    expect(causesOf(mixed)).toHaveLength(3);
    expect(emittersOf(mixed).map(({ contributor }) => `${contributor.kind} ${contributor.name}`)).toEqual([
      'net A',
      'net A x',
      'loop A',
    ]);
  });

  it('gather into emitters by their own level', () => {
    expect(
      emittersOf(result).map(({ contributor, ownMarginDb }) => [contributor.name, Math.round(ownMarginDb * 10) / 10]),
    ).toEqual([
      ['B', 9],
      ['A', 9.6],
    ]);
  });

  it('leave what their share of the power leaves', () => {
    const [plane, cable, pair] = causesOf(result);
    // Without A by the cable: 10^3 of 10^3 + 10^2 + 10^1 goes, 110/1110 stays: −10.04 dB, margin 9.5 + 10.04; 300 MHz then leads.
    expect(worstWithout(result, [cable!])).toEqual({ frequencyHz: 300e6, marginDb: 9 });
    const left = worstWithout(result, [plane!, cable!])!;
    expect(left.frequencyHz).toBe(100e6);
    // Both gone: only the pair's 10^2 of 1110 stays.
    expect(left.marginDb).toBeCloseTo(9.5 + 10 * Math.log10(1110 / 100), 9);
    // A weak one hardly matters.
    expect(worstWithout(result, [plane!, pair!])!.marginDb).toBeCloseTo(9.5 + 10 * Math.log10(1110 / 1000), 9);
    expect(worstWithout(result, [])).toEqual({ frequencyHz: 300e6, marginDb: 9 });
  });

  it('may leave nothing', () => {
    expect(worstWithout(result, causesOf(result))).toBeUndefined();
    expect(causesOf(resultWith([]))).toEqual([]);
    // A reading without contributors cannot lose any.
    const bare = resultWith([point(100, 30, 40, [])]);
    expect(worstWithout(bare, [])).toEqual({ frequencyHz: 100e6, marginDb: 10 });
  });
});
