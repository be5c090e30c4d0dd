import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Contributor, ResultPoint } from '../../app/estimate/result.ts';
import { inListOrder, MechanismList, mechanismText } from '../../app/report/mechanisms.ts';
import { mechanismLevels, radiationOf } from '../../app/report/radiation.ts';
import { bandsText, unsolvedText } from '../../app/report/rules-text.ts';
import { type RulingBand, rulingBands } from '../../app/report/ruling-bands.ts';
import { resultWith, sampleResult } from '../support/sample-result.ts';

const asIs = (name: string) => name;
const LIMIT_DB = 40;

const contributor = (kind: Contributor['kind'], name: string, viaDbuvPerM: Record<string, number>): Contributor => ({
  kind,
  name,
  levelDbuvPerM: Math.max(...Object.values(viaDbuvPerM)),
  viaDbuvPerM,
});

/** A reading whose level is that of its strongest path. */
function point(frequencyHz: number, contributors: readonly Contributor[]): ResultPoint {
  const levelDbuvPerM = Math.max(...contributors.map((each) => each.levelDbuvPerM));
  return {
    ...sampleResult().points[0]!,
    frequencyHz,
    levelDbuvPerM,
    limitDbuvPerM: LIMIT_DB,
    marginDb: LIMIT_DB - levelDbuvPerM,
    contributors,
  };
}

const net = (viaDbuvPerM: Record<string, number>) => [contributor('net', 'CLK', viaDbuvPerM)];
const bandsOf = (points: readonly ResultPoint[]) => rulingBands(radiationOf(resultWith(points)));
const words = (bands: readonly RulingBand[]) => bandsText(bands, 9, asIs);

describe('mechanisms of one reading', () => {
  it('add contributors as powers: two equal ones are 10·log10 2 = 3.01 dB more than one, ten are 10 dB more', () => {
    const levels = mechanismLevels(
      point(1e8, [
        contributor('net', 'A', { pair: 20, plane: 30, 'valve cable': 11 }),
        contributor('net', 'B', { pair: 20, plane: 20 }),
        ...Array.from({ length: 9 }, (_, i) => contributor('net', `N${i}`, { 'valve cable': 11 })),
      ]),
      new MechanismList(),
    );
    const named = new Map([...levels].map(([mechanism, db]) => [mechanismText(mechanism, asIs), db]));
    expect(named.get('trace pairs')).toBeCloseTo(20 + 10 * Math.log10(2), 9);
    expect(named.get('plane')).toBeCloseTo(10 * Math.log10(10 ** 3 + 10 ** 2), 9);
    expect(named.get('valve cable')).toBeCloseTo(21, 9);
  });

  it('keep loops, stated cables and driven cables of the same name apart', () => {
    const levels = mechanismLevels(
      point(1e8, [
        contributor('loop', 'L', { loop: 10, plane: 11, 'sensor cable': 12 }),
        contributor('cable', 'sensor cable', { 'sensor cable': 13 }),
        contributor('net', 'N', { pair: 14, loop: 15 }),
      ]),
      new MechanismList(),
    );
    // A net has no path "loop": there it is a cable of that name.
    expect([...levels.keys()].sort(inListOrder).map((each) => mechanismText(each, asIs))).toEqual([
      'trace pairs',
      'current loops',
      'plane',
      'loop',
      'sensor cable',
      'sensor cable (stated current)',
    ]);
  });
});

describe('lines that count', () => {
  it('are within 30 dB of the worst, rounded up to 10 dB, but at least all with 20 dB of margin', () => {
    const at = (excessDb: number, i: number) => point(1e8 + i * 1e6, net({ pair: LIMIT_DB + excessDb }));
    const near = radiationOf(resultWith([-3, -20, -33, -39.9, -40.1].map(at)));
    expect(near.countedMarginDb).toBe(40);
    expect(near.lines).toHaveLength(4);
    expect(near.uncountedLines).toBe(1);
    const far = radiationOf(resultWith([25, -3, -19.9, -20.1].map(at)));
    expect(far.countedMarginDb).toBe(20);
    expect(far.lines).toHaveLength(3);
  });

  it('are taken once a frequency, at the reading with the least margin, and without levels of nothing', () => {
    const silent = { ...point(2e8, net({ pair: 20 })), contributors: net({ pair: -Infinity }) };
    const strict = point(1e8, net({ pair: 35, plane: -Infinity }));
    const loose = { ...strict, detector: 'peak' as const, limitDbuvPerM: 60, marginDb: 25 };
    const { lines, mechanisms } = radiationOf(resultWith([loose, strict, silent]));
    expect(lines).toHaveLength(1);
    expect(lines[0]!.marginDb).toBe(5);
    expect([...lines[0]!.excessDb.values()]).toEqual([expect.closeTo(-5, 9)]);
    expect(mechanisms.map(({ kind }) => kind)).toEqual(['pair']);
  });

  it('say from where nothing is solved', () => {
    const solved = [1e8, 9e8].map((hz) => point(hz, net({ pair: 30, plane: 31 })));
    const above = [1.2e9, 1.1e9].map((hz) => point(hz, net({ pair: 30 })));
    const stated = point(1.05e9, [contributor('cable', 'C', { C: 30 })]);
    expect(radiationOf(resultWith(solved))).not.toHaveProperty('unsolvedFromHz');
    const partly = radiationOf(resultWith([...solved, ...above, stated]));
    expect(partly.unsolvedFromHz).toBe(1.1e9);
    expect(unsolvedText(partly)).toBe('planes and cables not solved from 1.1 GHz');
    const pairOnly = radiationOf(resultWith(above, { structure: 'pair-only' }));
    expect(pairOnly.unsolvedFromHz).toBe(0);
    expect(unsolvedText(pairOnly)).toBe('planes and cables not solved');
    expect(unsolvedText(radiationOf(resultWith(solved)))).toBe('');
  });
});

describe('bands', () => {
  it('change where the strongest mechanism changes, at a round number between two lines', () => {
    const points = Array.from({ length: 39 }, (_, i) => 25e6 * (i + 2)).map((hz) =>
      point(
        hz,
        net({
          'valve cable': hz <= 200e6 ? 40 : 20,
          plane: hz <= 200e6 || hz > 625e6 ? 20 : 40,
          pair: hz > 625e6 ? 40 : 10,
        }),
      ),
    );
    expect(words(bandsOf(points))).toBe('50–210 MHz valve cable; 210–640 MHz plane; 640 MHz–1 GHz trace pairs');
  });

  it('pass over weak lines between strong ones and over a short change by a few dB, and count both', () => {
    const points = Array.from({ length: 60 }, (_, i) => 10e6 * (i + 4)).map((hz) => {
      const isEven = Math.round(hz / 10e6) % 2 === 0;
      if (isEven) return point(hz, net({ plane: 25, cable: 20 }));
      const isBrief = hz > 300e6 && hz < 330e6;
      return point(hz, net({ plane: isBrief ? 42 : 30, cable: 40 }));
    });
    const [band, ...others] = bandsOf(points);
    expect(others).toEqual([]);
    expect(band!.mechanism).toEqual({ kind: 'cable', name: 'cable' });
    expect(band!.lines).toHaveLength(60);
    // Odd multiples of 10 MHz less the one at 310 MHz.
    expect(band!.ruledCount).toBe(29);
  });

  it('are the cheapest division there is: compared with all divisions', () => {
    const names = ['pair', 'plane', 'cable'];
    const levels = fc.array(fc.tuple(...names.map(() => fc.integer({ min: 20, max: 40 }))), {
      minLength: 1,
      maxLength: 6,
    });
    fc.assert(
      fc.property(levels, (rows) => {
        // One line in the middle of each sixth of an octave.
        const points = rows.map((row, i) =>
          point(2 ** (26 + (i + 0.5) / 6), net(Object.fromEntries(names.map((name, n) => [name, row[n]!])))),
        );
        const cost = (choice: readonly number[]) =>
          choice.reduce(
            (sum, n, i) => sum + Math.max(...rows[i]!) - rows[i]![n]! + (i > 0 && choice[i - 1] !== n ? 6 : 0),
            0,
          );
        const all = Array.from({ length: names.length ** rows.length }, (_, code) =>
          rows.map((_, i) => Math.floor(code / names.length ** i) % names.length),
        );
        const bands = bandsOf(points);
        const found = bands.flatMap(({ mechanism: { kind, name }, lines }) =>
          lines.map(() => names.indexOf(name || kind)),
        );
        expect(cost(found)).toBeCloseTo(Math.min(...all.map(cost)), 9);
      }),
      { seed: 81, numRuns: 60 },
    );
  });

  it('hold every line once, in order, with edges of at most three digits between their lines', () => {
    const lines = fc.uniqueArray(
      fc.tuple(
        fc.integer({ min: 30_000, max: 1_000_000 }),
        fc.integer({ min: 25, max: 45 }),
        fc.integer({ min: 25, max: 45 }),
      ),
      {
        selector: ([kHz]) => kHz,
        minLength: 1,
        maxLength: 40,
      },
    );
    fc.assert(
      fc.property(lines, (list) => {
        const bands = bandsOf(list.map(([kHz, plane, pair]) => point(kHz * 1e3, net({ plane, pair }))));
        const sorted = list.map(([kHz]) => kHz * 1e3).sort((one, other) => one - other);
        expect(bands.flatMap((band) => band.lines.map(({ frequencyHz }) => frequencyHz))).toEqual(sorted);
        for (const [i, band] of bands.entries()) {
          const next = bands[i + 1];
          if (!next) continue;
          expect(band.mechanism).not.toBe(next.mechanism);
          expect(band.toHz).toBe(next.fromHz);
          // Three digits: within half a unit of the third, 0.5 % at worst.
          expect(band.toHz).toBeGreaterThan(band.lines.at(-1)!.frequencyHz * 0.995);
          expect(band.toHz).toBeLessThan(next.lines[0]!.frequencyHz * 1.005);
          expect(Number(band.toHz.toPrecision(3))).toBe(band.toHz);
        }
      }),
      { seed: 82, numRuns: 80 },
    );
  });

  it('are named up to a number, the rest counted; none without lines', () => {
    const bands = bandsOf([
      point(50e6, net({ plane: 40, pair: 10 })),
      point(100e6, net({ plane: 10, pair: 40 })),
      point(200e6, net({ plane: 40, pair: 10 })),
    ]);
    expect(bandsText(bands, 2, asIs)).toBe('50–70 MHz plane; 70–140 MHz trace pairs; 1 more band above');
    expect(bandsOf([])).toEqual([]);
  });
});
