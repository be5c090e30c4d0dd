import { describe, expect, it } from 'vitest';
import { byCode, byMessage, groupCaveats } from '../../app/report/caveat-groups.ts';
import { isItself, mainContributor, pathsOf } from '../../app/report/contributor-text.ts';
import { levelBar } from '../../app/report/figures/bars.ts';
import { rankDrivenNets } from '../../app/report/figures/rank-nets.ts';
import { modelText } from '../../app/report/model-text.ts';
import { chainLengthM, farEndText, waveformText } from '../../app/report/source-text.ts';
import { sampleResult } from '../support/sample-result.ts';
import { sampleResultBoard } from '../support/sample-result-board.ts';

describe('caveat groups', () => {
  const caveat = (where: string, fromHz: number, toHz: number, message = 'm') => ({
    code: 'c',
    message,
    where,
    fromHz,
    toHz,
  });

  it('gather places once, with the hull of the ranges', () => {
    const [group, ...others] = groupCaveats(
      [caveat('A', 4e8, 9e8), caveat('B', 2e8, 5e8), caveat('A', 3e8, 6e8)],
      byCode,
    );
    expect(others).toEqual([]);
    expect(group).toMatchObject({ count: 3, where: ['A', 'B'], fromHz: 2e8, toHz: 9e8 });
  });

  it('apply everywhere as soon as one of them does', () => {
    expect(groupCaveats([caveat('A', 4e8, 9e8), caveat('B', 0, 0)], byCode)[0]).toMatchObject({ fromHz: 0, toHz: 0 });
  });

  it('by message keep every message and range apart', () => {
    const list = [caveat('A', 1e8, 2e8), caveat('B', 1e8, 2e8), caveat('C', 1e8, 3e8), caveat('D', 1e8, 2e8, 'other')];
    expect(groupCaveats(list, byMessage).map(({ where }) => where)).toEqual([['A', 'B'], ['C'], ['D']]);
  });
});

describe('contributors', () => {
  it('are led by the strongest path, ties by name', () => {
    const contributor = {
      kind: 'net' as const,
      name: 'A',
      levelDbuvPerM: 30,
      viaDbuvPerM: { pair: 20, plane: 29, b: 25, a: 25 },
    };
    expect(pathsOf(contributor).map(({ name }) => name)).toEqual(['plane', 'a', 'b', 'pair']);
    const path = (name: string) => ({ name, levelDbuvPerM: 0 });
    expect(isItself({ ...contributor, kind: 'loop' }, path('loop'))).toBe(true);
    expect(isItself({ ...contributor, kind: 'cable' }, path('A'))).toBe(true);
    expect(isItself(contributor, path('pair'))).toBe(false);
    expect(mainContributor({ ...sampleResult().points[0]!, contributors: [] })).toBeUndefined();
  });

  it('rank driven nets by what they do against the limit, not by level alone', () => {
    const board = sampleResultBoard();
    const base = sampleResult();
    const point = base.points[0]!;
    const net = (name: string, levelDbuvPerM: number) => ({
      kind: 'net' as const,
      name,
      levelDbuvPerM,
      viaDbuvPerM: {},
    });
    const points = [
      { ...point, limitDbuvPerM: 47, contributors: [net('DATA1', 40), net('DATA0', 20)] },
      { ...point, limitDbuvPerM: 40, contributors: [net('SPI_SCK', 36), net('DATA1', 10)] },
    ];
    // Excess over the limit: SPI_SCK −4, DATA1 −7, DATA0 −27; CLK_25M does not occur.
    expect(rankDrivenNets(board, { ...base, points }).map(({ name }) => name)).toEqual([
      'SPI_SCK',
      'DATA1',
      'DATA0',
      'CLK_25M',
    ]);
  });
});

describe('bars', () => {
  const widthOf = (levelDb: number, topDb: number) =>
    Number(levelBar(levelDb, topDb, 'x').source.match(/class="x" width="([\d.]+)"/)![1]);

  it('are full at the top, half 20 dB and empty 40 dB below it', () => {
    expect(widthOf(42, 42)).toBe(100);
    expect(widthOf(22, 42)).toBe(50);
    expect(widthOf(2, 42)).toBe(0);
    expect(widthOf(-100, 42)).toBe(0);
    expect(widthOf(-Infinity, 42)).toBe(0);
  });
});

describe('words for sources', () => {
  it('describe waveforms with their units', () => {
    const texts = sampleResultBoard().waveforms.map(waveformText);
    expect(texts[0]).toBe('trapezoid 25 MHz, 0 V to 3.3 V, duty 50 %, rise 1 ns, fall 1 ns (10–90 %)');
    expect(texts[1]).toContain('random data 50 Mbit/s');
    expect(texts[2]).toBe('piecewise linear, 4 points, period 2 µs, 0 A to 1.8 A');
    const lines = [25e6, 75e6].map((frequencyHz) => ({ frequencyHz, amplitude: 1, phaseRad: 0 }));
    expect(waveformText({ kind: 'lines', name: 'x', quantity: 'V', lines })).toBe('2 listed lines, 25 MHz to 75 MHz');
  });

  it('measure chains open and closed', () => {
    const points = [
      [0, 0, 0],
      [3, 0, 0],
      [3, 4, 0],
    ] as const;
    expect(chainLengthM(points, false)).toBe(7);
    expect(chainLengthM(points, true)).toBe(12);
  });

  it('name a cable end', () => {
    expect(farEndText('open')).toBe('open');
    expect(farEndText('ground')).toBe('joined to ground');
    expect(farEndText({ resistanceOhm: 150 })).toBe('150 Ω to ground');
  });
});

describe('model', () => {
  it('says what is missing when planes and cables were not solved', () => {
    const solved = modelText(sampleResult());
    const pairOnly = modelText({ ...sampleResult(), structure: 'pair-only' });
    expect(solved.included.join(' ')).toContain('into the cables');
    expect(pairOnly.included.join(' ')).not.toContain('into the cables');
    expect(pairOnly.missing.join(' ')).toContain('switched off here');
  });
});
