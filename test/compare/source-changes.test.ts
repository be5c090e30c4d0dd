import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { emptyResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';
import { BOARD, said, TRAPEZOID, type Waveform, withCable, withWave } from './kiln-board.ts';

/** Sentences are compared with ones written by hand; lengths, areas and slopes in them follow from the drawn points. */

describe('sources in words', () => {
  it.each<[string, Partial<BoardFileInput>, string[]]>([
    ['one edge', withWave({ riseNs: 3 }), ['CLK_25M: rise time 1 → 3 ns']],
    ['both edges', withWave({ riseNs: 3, fallNs: 3 }), ['CLK_25M: rise and fall time 1 → 3 ns']],
    [
      'levels, duty, frequency',
      withWave({ highV: 1.8, dutyPercent: 48, frequencyMhz: 24 }),
      ['CLK_25M: frequency 25 → 24 MHz, high level 3.3 → 1.8 V, duty cycle 50 → 48 %'],
    ],
    ['clock domain', withWave({ clockDomain: 'main' }), ['CLK_25M: clock domain its own → main']],
    [
      'kind',
      { waveforms: [{ name: 'clk', kind: 'random-data', bitRateMbps: 50, lowV: 0, highV: 3.3, riseNs: 1, fallNs: 1 }] },
      ['CLK_25M: trapezoid of 25 MHz → random data of 50 Mbit/s'],
    ],
    [
      'numbers that differ in the sixth digit',
      withWave({ frequencyMhz: 25.0001 }),
      ['CLK_25M: frequency 25 → 25.0001 MHz'],
    ],
    ['series resistor', { drives: [{ ...BOARD.drives[0], seriesOhm: 33 }] }, ['CLK_25M: series resistor none → 33 Ω']],
    [
      'source resistance with another prefix',
      { drives: [{ ...BOARD.drives[0], sourceOhm: 1200 }] },
      ['CLK_25M: source resistance 25 Ω → 1.2 kΩ'],
    ],
    [
      'inverted and late',
      { drives: [{ ...BOARD.drives[0], delayNs: 2, inverted: true }] },
      ['CLK_25M: delay 0 → 2 ns; now inverted'],
    ],
    ['another pin of the net', { drives: [{ ...BOARD.drives[0], pin: 'U1.5' }] }, ['CLK_25M: driver pin Y1.3 → U1.5']],
    ['drive gone', { drives: [] }, ['CLK_25M: drive removed at Y1.3']],
    ['load', { loads: [{ ...BOARD.loads[0], capacitancePf: 8 }] }, ['CLK_25M: load at U1.5: capacitance 5 → 8 pF']],
    [
      'load added',
      { loads: [...BOARD.loads, { net: 'DATA', pin: 'U2.1', resistanceOhm: 50 }] },
      ['DATA: load added at U2.1 (50 Ω)'],
    ],
  ])('%s', (_name, change, expected) => expect(said(change)).toEqual(expected));

  it('says another waveform with what is different about it, and a mere renaming not at all', () => {
    const slow = { ...TRAPEZOID, name: 'slow', riseNs: 3, fallNs: 3 } as Waveform;
    const drives = [{ ...BOARD.drives[0], waveform: 'slow' }];
    expect(said({ drives, waveforms: [TRAPEZOID, slow] })).toEqual([
      'CLK_25M: waveform clk → slow (rise and fall time 1 → 3 ns)',
    ]);
    expect(said({ drives, waveforms: [{ ...TRAPEZOID, name: 'slow' } as Waveform] })).toEqual([]);
  });

  it('names what feeds several nets once', () => {
    const drives = [BOARD.drives[0], { net: 'DATA', pin: 'U2.1', waveform: 'clk' }];
    expect(said({ ...withWave({ riseNs: 2 }), drives }, { drives })).toEqual(['CLK_25M and DATA: rise time 1 → 2 ns']);
  });

  it('says listed lines and steepest edges by number', () => {
    const lines = (amplitudeV: number) =>
      ({
        name: 'clk',
        kind: 'lines',
        lines: [
          { frequencyMhz: 50, amplitudeV },
          { frequencyMhz: 75, amplitudeV: 0.2 },
        ],
      }) as Waveform;
    expect(said({ waveforms: [lines(0.5)] }, { waveforms: [lines(1)] })).toEqual([
      'CLK_25M: amplitude at 50 MHz 1 → 0.5 V',
    ]);
    // Slopes 12 V/5 ns and 12 V/20 ns.
    const edge = (timeNs: number) =>
      ({
        name: 'clk',
        kind: 'piecewise',
        periodNs: 2000,
        pointsNsV: [
          [0, 0],
          [timeNs, 12],
          [900, 12],
          [930, 0],
        ],
      }) as Waveform;
    expect(said({ waveforms: [edge(20)] }, { waveforms: [edge(5)] })).toEqual([
      'CLK_25M: steepest edge 2.4 → 0.6 V/ns',
    ]);
  });

  it('compares the content of sample files, also of one called like a property of objects', () => {
    const waveforms: Waveform[] = [{ name: 'clk', kind: 'samples', file: '__proto__', periodNs: 40 }];
    const run = (samples: object) =>
      storedRun({ ...(BOARD as BoardFileInput), waveforms }, emptyResult(), {
        samples: JSON.parse(JSON.stringify(samples)),
      });
    const columns = (peakV: number) => JSON.parse(`{"__proto__":{"timesS":[0,1e-8],"values":[0,${peakV}]}}`) as object;
    const texts = compareRuns(run(columns(1)), run(columns(2))).changes.map(({ text }) => text);
    expect(texts).toEqual(['CLK_25M: other samples (2 → 2 points)']);
  });
});

describe('loops and cables in words', () => {
  const loop = (heightMm: number, xMm = 0) => ({
    name: 'converter loop',
    pointsMm: [
      [xMm, 0, 1.6],
      [xMm + 6, 0, 1.6],
      [xMm + 6, heightMm, 1.6],
      [xMm, heightMm, 1.6],
    ] as [number, number, number][],
    waveform: 'i',
  });
  const current: Waveform = { name: 'i', kind: 'lines', lines: [{ frequencyMhz: 50, amplitudeA: 1 }] };
  const loops = (...list: ReturnType<typeof loop>[]) => ({ waveforms: [TRAPEZOID, current], loops: list });

  it('gives area and length around, or how far a loop moved', () => {
    expect(said(loops(loop(2)), loops(loop(4)))).toEqual([
      'converter loop: area 24 → 12 mm², length around 20 → 16 mm',
    ]);
    expect(said(loops(loop(4, 3)), loops(loop(4)))).toEqual(['converter loop: moved by 3 mm']);
    expect(said(loops(loop(4, 0.006)), loops(loop(4)))).toEqual(['converter loop: moved by 6 µm']);
    expect(said(loops(), loops(loop(4)))).toEqual(['current loop converter loop removed (24 mm²)']);
  });

  it.each<[string, object, string[]]>([
    [
      'length',
      {
        pointsMm: [
          [80, 25, 0],
          [180, 25, 0],
          [180, 25, -200],
        ],
      },
      ['valve cable: length 700 → 300 mm'],
    ],
    ['far end', { farEnd: { resistanceOhm: 150 } }, ['valve cable: far end open → 150 Ω to ground']],
    // |80 + j60| = 100.
    [
      'ferrite',
      {
        seriesImpedance: [
          [10, 5, 12],
          [30, 20, 40],
          [100, 80, 60],
          [300, 90, 10],
          [1000, 40, -30],
        ],
      },
      ['ferrite at the connector of valve cable: none → table of 5 rows (about 100 Ω at 100 MHz)'],
    ],
    [
      'stated current',
      {
        commonModeUa: [
          [30, 5],
          [300, 2],
        ],
      },
      ['valve cable: stated current: solved for → at most 5 µA at 30 MHz'],
    ],
  ])('cable: %s', (_name, change, expected) => expect(said(withCable(change))).toEqual(expected));

  it('names cables that come and go', () => {
    expect(said({ cables: [] })).toEqual(['cable valve cable removed (700 mm, open)']);
  });
});
