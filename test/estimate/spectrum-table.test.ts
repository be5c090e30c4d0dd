import { describe, expect, it } from 'vitest';
import { spectrumTable } from '../../app/estimate/spectrum-table.ts';
import { driveFile, drivenBoard, linesVoltage, netFile } from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';

const clock = (name: string, frequencyMhz: number, clockDomain?: string) => ({
  name,
  kind: 'trapezoid' as const,
  frequencyMhz,
  lowV: 0,
  highV: 2,
  dutyPercent: 50,
  riseNs: 1,
  fallNs: 1,
  ...(clockDomain !== undefined && { clockDomain }),
});
const tableOf = (file: Parameters<typeof boardOf>[0], fromHz = 30e6, toHz = 200e6, extraHz: number[] = []) =>
  spectrumTable(boardOf(file), fromHz, toHz, extraHz);
const mhz = (table: ReturnType<typeof tableOf>) => table.map(({ frequencyHz }) => Math.round(frequencyHz / 1e3) / 1e3);

describe('table of spectral lines', () => {
  it('harmonics in the range, ascending; even ones of a clock of 50 % are rounding and left out', () => {
    const table = tableOf(drivenBoard([netFile('A')], [driveFile('A', 'c')], [clock('c', 20)]));
    expect(mhz(table)).toEqual([60, 100, 140, 180]);
    // 2A/(nπ)·sinc(n t_r/T), t_r = 1.25 ns: C. R. Paul, Introduction to EMC (from memory), A = 2 V.
    for (const [i, n] of [3, 5, 7, 9].entries()) {
      const x = Math.PI * n * 1.25e-9 * 20e6;
      const { re, im } = table[i]!.lines[0]!;
      expect(Math.hypot(re, im)).toBeCloseTo((4 / (n * Math.PI)) * (Math.sin(x) / x), 9);
    }
  });

  it('harmonics of two clocks that meet are one frequency; each drive keeps its line and place', () => {
    // 7 × 12 = 84 = 3 × 28 MHz, computed by different products.
    const nets = [netFile('A'), netFile('B')];
    const extra = { ...netFile('A').pins![1]!, name: 'U7.A' };
    const file = drivenBoard(
      [{ ...nets[0]!, pins: [...nets[0]!.pins!, extra] }, nets[1]!],
      [driveFile('A', 'c'), driveFile('B', 'd'), { ...driveFile('A', 'd'), pin: 'U7.A' }],
      [clock('c', 12), clock('d', 28)],
      { loads: [] },
    );
    const table = tableOf(file, 80e6, 90e6);
    expect(mhz(table)).toEqual([84]);
    expect(table[0]!.lines.map(({ name, driveIndex, domain }) => [name, driveIndex, domain])).toEqual([
      ['A', 0, 'clock c'],
      ['B', 0, 'clock d'],
      ['A', 1, 'clock d'],
    ]);
  });

  it('named domains are shared, random data is a domain of its own on every drive unless it names one', () => {
    const random = {
      name: 'r',
      kind: 'random-data' as const,
      bitRateMbps: 100,
      lowV: 0,
      highV: 1,
      riseNs: 1,
      fallNs: 1,
      sequenceBits: 7,
    };
    const domains = (waveforms: Parameters<typeof drivenBoard>[2]) =>
      tableOf(
        drivenBoard(
          [netFile('A'), netFile('B')],
          [driveFile('A', waveforms[0]!.name), driveFile('B', waveforms.at(-1)!.name)],
          waveforms,
        ),
        41e6,
        45e6,
      )[0]!.lines.map(({ domain }) => domain);
    expect(new Set(domains([random])).size).toBe(2);
    expect(domains([{ ...random, clockDomain: 'main' }])).toEqual(['clock main', 'clock main']);
    expect(
      new Set(
        domains([
          { ...random, clockDomain: 'main' },
          { ...random, name: 's', clockDomain: 'main' },
        ]),
      ).size,
    ).toBe(1);
  });

  it('delay and inversion turn the phasor: e^(−j2πf·delay), and −1', () => {
    const lines = (more: object) =>
      tableOf(drivenBoard([netFile('A')], [driveFile('A', 'w', more)], [linesVoltage('w', [[125, 2]])]))[0]!.lines[0]!;
    // A quarter period of 125 MHz is 2 ns.
    for (const [more, re, im] of [
      [{}, 2, 0],
      [{ delayNs: 2 }, 0, -2],
      [{ inverted: true }, -2, 0],
      [{ delayNs: 2, inverted: true }, 0, 2],
    ] as const) {
      const line = lines(more);
      expect(line.re).toBeCloseTo(re, 9);
      expect(line.im).toBeCloseTo(im, 9);
    }
  });

  it('extra frequencies are there once, with the lines of the same frequency if any', () => {
    const file = drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[50, 1]])]);
    const table = tableOf(file, 30e6, 200e6, [10e6, 30e6, 50e6 * (1 + 1e-12), 90e6, 201e6]);
    expect(mhz(table)).toEqual([30, 50, 90]);
    expect(table.map(({ lines }) => lines.length)).toEqual([0, 1, 0]);
  });
});
