import { describe, expect, it } from 'vitest';
import type { Detector } from '../../app/estimate/result.ts';
import { chooseLimits } from '../../app/limits/choose.ts';

/**
 * Every limit, typed in a second time from the tables of the standards (as collected in the project's fact sheet), read back
 * inside each band and at its edges, where the tighter neighbour holds. Levels in dBµV/m.
 */
type Band = readonly [fromMhz: number, toMhz: number, level: number];
interface Table {
  readonly standard: string;
  readonly class: string;
  readonly distanceM: number;
  readonly detector: Detector;
  readonly status: 'seen' | 'from memory';
  readonly bands: readonly Band[];
  /** [MHz, level] at the inner edges. */
  readonly edges: readonly (readonly [number, number])[];
  readonly siteKind?: 'free-space';
}

const table = (
  [standard, className, distanceM, detector, status]: [string, string, number, Detector, Table['status']],
  bands: readonly Band[],
  edges: Table['edges'],
): Table => ({ standard, class: className, distanceM, detector, status, bands, edges });

const b = (...numbers: number[]): Band => numbers as unknown as Band;
const e = (...numbers: number[]) => numbers as unknown as readonly [number, number];
const QP = 'quasi-peak';
const AV = 'average';
const PK = 'peak';
const MEM = 'from memory';

const TABLES: readonly Table[] = [
  table(['CISPR 32', 'A', 10, QP, 'seen'], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['CISPR 32', 'A', 3, QP, 'seen'], [b(30, 230, 50), b(230, 1000, 57)], [e(230, 50)]),
  table(['CISPR 32', 'B', 10, QP, 'seen'], [b(30, 230, 30), b(230, 1000, 37)], [e(230, 30)]),
  table(['CISPR 32', 'B', 3, QP, 'seen'], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['CISPR 32', 'A', 3, AV, MEM], [b(1000, 3000, 56), b(3000, 6000, 60)], [e(3000, 56)]),
  table(['CISPR 32', 'A', 3, PK, MEM], [b(1000, 3000, 76), b(3000, 6000, 80)], [e(3000, 76)]),
  table(['CISPR 32', 'B', 3, AV, 'seen'], [b(1000, 3000, 50), b(3000, 6000, 54)], [e(3000, 50)]),
  table(['CISPR 32', 'B', 3, PK, 'seen'], [b(1000, 3000, 70), b(3000, 6000, 74)], [e(3000, 70)]),
  // µV/m 90, 150, 210, 300 and 100, 150, 200, 500, in decibels to three places.
  table(
    ['FCC 15.109', 'A', 10, QP, 'seen'],
    [b(30, 88, 39.085), b(88, 216, 43.522), b(216, 960, 46.444), b(960, 1000, 49.542)],
    [e(88, 39.085), e(216, 43.522), e(960, 46.444)],
  ),
  table(
    ['FCC 15.109', 'B', 3, QP, 'seen'],
    [b(30, 88, 40), b(88, 216, 43.522), b(216, 960, 46.021), b(960, 1000, 53.979)],
    [e(88, 40), e(216, 43.522), e(960, 46.021)],
  ),
  table(['FCC 15.109', 'A', 10, AV, 'seen'], [b(1000.001, 40000, 49.542)], []),
  table(['FCC 15.109', 'A', 10, PK, 'seen'], [b(1000.001, 40000, 69.542)], []),
  table(['FCC 15.109', 'B', 3, AV, 'seen'], [b(1000.001, 40000, 53.979)], []),
  table(['FCC 15.109', 'B', 3, PK, 'seen'], [b(1000.001, 40000, 73.979)], []),
  table(['CISPR 11', 'A', 10, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['CISPR 11', 'A up to 20 kVA', 3, QP, MEM], [b(30, 230, 50), b(230, 1000, 57)], [e(230, 50)]),
  table(['CISPR 11', 'A over 20 kVA', 10, QP, MEM], [b(30, 230, 50), b(230, 1000, 50)], [e(230, 50)]),
  table(['CISPR 11', 'A > 20 kVA', 3, QP, MEM], [b(30, 230, 60), b(230, 1000, 60)], [e(230, 60)]),
  table(['CISPR 11', 'B', 10, QP, MEM], [b(30, 230, 30), b(230, 1000, 37)], [e(230, 30)]),
  table(['CISPR 11', 'B', 3, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['CISPR 14-1', '', 10, QP, MEM], [b(30, 230, 30), b(230, 1000, 37)], [e(230, 30)]),
  table(['CISPR 14-1', '', 3, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['IEC 61000-6-3', '', 10, QP, MEM], [b(30, 230, 30), b(230, 1000, 37)], [e(230, 30)]),
  table(['IEC 61000-6-3', '', 3, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['IEC 61000-6-3', '', 3, AV, MEM], [b(1000, 3000, 50), b(3000, 6000, 54)], [e(3000, 50)]),
  table(['IEC 61000-6-3', '', 3, PK, MEM], [b(1000, 3000, 70), b(3000, 6000, 74)], [e(3000, 70)]),
  table(['IEC 61000-6-4', '', 10, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['IEC 61000-6-4', '', 3, QP, MEM], [b(30, 230, 50), b(230, 1000, 57)], [e(230, 50)]),
  table(['IEC 61000-6-4', '', 3, AV, MEM], [b(1000, 3000, 56), b(3000, 6000, 60)], [e(3000, 56)]),
  table(['IEC 61000-6-4', '', 3, PK, MEM], [b(1000, 3000, 76), b(3000, 6000, 80)], [e(3000, 76)]),
  table(
    ['ICES-003', 'A', 10, QP, MEM],
    [b(30, 88, 40), b(88, 216, 43.5), b(216, 230, 46.4), b(230, 960, 47), b(960, 1000, 49.5)],
    [e(88, 40), e(216, 43.5), e(230, 46.4), e(960, 47)],
  ),
  table(
    ['ICES-003', 'A', 3, QP, MEM],
    [b(30, 88, 50), b(88, 216, 54), b(216, 230, 56.9), b(230, 960, 57), b(960, 1000, 60)],
    [e(88, 50), e(216, 54), e(230, 56.9), e(960, 57)],
  ),
  table(
    ['ICES-003', 'B', 10, QP, MEM],
    [b(30, 88, 30), b(88, 216, 33.1), b(216, 230, 35.6), b(230, 960, 37), b(960, 1000, 43.5)],
    [e(88, 30), e(216, 33.1), e(230, 35.6), e(960, 37)],
  ),
  table(
    ['ICES-003', 'B', 3, QP, MEM],
    [b(30, 88, 40), b(88, 216, 43.5), b(216, 230, 46), b(230, 960, 47), b(960, 1000, 54)],
    [e(88, 40), e(216, 43.5), e(230, 46), e(960, 47)],
  ),
  table(['ICES-003', 'A', 3, AV, MEM], [b(1000.001, 6000, 60)], []),
  table(['ICES-003', 'A', 3, PK, MEM], [b(1000.001, 6000, 80)], []),
  table(['ICES-003', 'B', 3, AV, MEM], [b(1000.001, 6000, 54)], []),
  table(['ICES-003', 'B', 3, PK, MEM], [b(1000.001, 6000, 74)], []),
  table(['VCCI', 'A', 10, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['VCCI', 'A', 3, QP, MEM], [b(30, 230, 50), b(230, 1000, 57)], [e(230, 50)]),
  table(['VCCI', 'B', 10, QP, MEM], [b(30, 230, 30), b(230, 1000, 37)], [e(230, 30)]),
  table(['VCCI', 'B', 3, QP, MEM], [b(30, 230, 40), b(230, 1000, 47)], [e(230, 40)]),
  table(['VCCI', 'A', 3, AV, MEM], [b(1000, 3000, 56), b(3000, 6000, 60)], [e(3000, 56)]),
  table(['VCCI', 'B', 3, PK, MEM], [b(1000, 3000, 70), b(3000, 6000, 74)], [e(3000, 70)]),
];

describe.each(TABLES)('$standard $class, $distanceM m, $detector', (row) => {
  const set = chooseLimits({
    standard: row.standard,
    class: row.class,
    distanceM: row.distanceM,
    convertDistance: false,
  });
  const limitAt = (frequencyMhz: number) =>
    set.limitsAt(frequencyMhz * 1e6).find(({ detector }) => detector === row.detector)?.limitDbuvPerM;

  it('has the level of each band inside it', () => {
    for (const [fromMhz, toMhz, level] of row.bands) {
      for (const mhz of [fromMhz + 0.001, Math.sqrt(fromMhz * toMhz), toMhz - 0.001]) {
        // FCC rows are rounded to 0.001 dB.
        expect(limitAt(mhz)).toBeCloseTo(level, 3);
      }
    }
  });

  it('has the tighter level at inner edges, the outer bands at the ends, nothing beyond', () => {
    for (const [mhz, level] of row.edges) {
      expect(limitAt(mhz)).toBeCloseTo(level, 3);
      // A harmonic that rounds to a neighbour of the edge is on the edge.
      expect(limitAt(mhz * (1 + 1e-12))).toBeCloseTo(level, 3);
      expect(limitAt(mhz * (1 - 1e-12))).toBeCloseTo(level, 3);
    }
    const [first, last] = [row.bands[0]!, row.bands.at(-1)!];
    expect(limitAt(first[0])).toBeCloseTo(first[2], 3);
    expect(limitAt(last[1])).toBeCloseTo(last[2], 3);
    expect(limitAt(first[0] - 1)).toBeUndefined();
    if (row.standard !== 'ICES-003') expect(limitAt(last[1] + 1)).toBeUndefined();
  });

  it('says whether its numbers were seen', () => {
    const line = set.lines.find(({ detector }) => detector === row.detector);
    expect(line?.sourceStatus).toBe(row.status);
  });
});

describe('free-space lines below 1 GHz (memory): slope in dB over log frequency to 230 MHz, then flat', () => {
  // At √(30·230) = 83.066 MHz the slope is half way.
  it.each([
    ['CISPR 32', 'A', 10, 42, 38.5, 35, 42],
    ['CISPR 32', 'A', 3, 52, 48.5, 45, 52],
    ['CISPR 32', 'B', 10, 32, 28.5, 25, 32],
    ['CISPR 32', 'B', 3, 42, 38.5, 35, 42],
    ['VCCI', 'B', 3, 42, 38.5, 35, 42],
    ['CISPR 14-1', 'none', 3, 42, 38.5, 35, 42],
  ] as const)('%s class %s at %i m', (standard, className, distanceM, at30, middle, at230, above) => {
    const request = { standard, class: className, distanceM, convertDistance: false, siteKind: 'free-space' } as const;
    const { limitsAt, notes } = chooseLimits(request);
    expect(limitsAt(30e6)[0]?.limitDbuvPerM).toBe(at30);
    expect(limitsAt(83.0662e6)[0]?.limitDbuvPerM).toBeCloseTo(middle, 3);
    expect(limitsAt(230e6)[0]?.limitDbuvPerM).toBe(at230);
    expect(limitsAt(231e6)[0]?.limitDbuvPerM).toBe(above);
    expect(limitsAt(1e9)[0]?.limitDbuvPerM).toBe(above);
    expect(notes.filter((note) => note.includes('kind of site'))).toEqual([]);
  });
});

describe('at 1000 MHz exactly', () => {
  const at1Ghz = (standard: string, className: string, distanceM: number) =>
    chooseLimits({ standard, class: className, distanceM, convertDistance: false }).limitsAt(1e9);

  it('FCC: quasi-peak only (15.35(a)), average and peak strictly above', () => {
    expect(at1Ghz('FCC', 'B', 3).map(({ detector }) => detector)).toEqual(['quasi-peak']);
    const above = chooseLimits({ standard: 'FCC', class: 'B', distanceM: 3, convertDistance: false }).limitsAt(
      1.0001e9,
    );
    expect(above.map(({ detector }) => detector)).toEqual(['average', 'peak']);
  });

  it('CISPR: the lines of both sides, so the lower one holds (class A at 3 m: average 56 below quasi-peak 57)', () => {
    expect(at1Ghz('CISPR 32', 'A', 3)).toEqual([
      { detector: 'quasi-peak', limitDbuvPerM: 57 },
      { detector: 'average', limitDbuvPerM: 56 },
      { detector: 'peak', limitDbuvPerM: 76 },
    ]);
  });
});
