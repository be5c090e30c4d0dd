import { describe, expect, it } from 'vitest';
import { AppError } from '../../app/errors.ts';
import { allLimitLines } from '../../app/limits/catalogue.ts';
import { chooseLimits, type LimitRequest } from '../../app/limits/choose.ts';
import { limitOfLine, plainName } from '../../app/limits/limit-line.ts';

const request = (over: Partial<LimitRequest>): LimitRequest => ({
  standard: 'CISPR 32',
  class: 'B',
  distanceM: 3,
  convertDistance: false,
  ...over,
});
const choose = (over: Partial<LimitRequest>) => chooseLimits(request(over));

describe('names', () => {
  it.each([
    ['cispr 32', 'CISPR 32'],
    ['CISPR32', 'CISPR 32'],
    ['en 55032', 'CISPR 32'],
    ['FCC Part 15', 'FCC 15.109'],
    ['fcc', 'FCC 15.109'],
    ['47 CFR 15.109', 'FCC 15.109'],
    ['FCC 15.109', 'FCC 15.109'],
    ['EN 55011', 'CISPR 11'],
    ['en55014-1', 'CISPR 14-1'],
    ['EN IEC 61000-6-3', 'IEC 61000-6-3'],
    ['iec61000-6-4', 'IEC 61000-6-4'],
    ['ices-003', 'ICES-003'],
    ['VCCI', 'VCCI-CISPR 32'],
  ])('%s is %s, with the default class and distance', (name, standard) => {
    expect(choose({ standard: name }).standard).toBe(standard);
  });

  it('names and aliases of two standards never coincide', () => {
    const ownerOf = new Map<string, string>();
    for (const { standard, aliases } of allLimitLines) {
      for (const name of [standard, ...aliases]) {
        expect(ownerOf.get(plainName(name)) ?? standard).toBe(standard);
        ownerOf.set(plainName(name), standard);
      }
    }
    expect(ownerOf.size).toBeGreaterThan(20);
  });

  it('an unknown name lists those that exist', () => {
    expect(() => choose({ standard: 'CISPR 33' })).toThrow(
      /standard must be one of CISPR 32, FCC 15\.109, CISPR 11, .*received "CISPR 33"/,
    );
    expect(() => choose({ standard: '' })).toThrow(AppError);
    expect(() => choose({ standard: '···' })).toThrow(AppError);
  });
});

describe('class', () => {
  it('is free of case; an unknown one lists those that exist', () => {
    expect(choose({ class: 'b' }).class).toBe('B');
    expect(() => choose({ class: 'C' })).toThrow(/class must be one of A, B for CISPR 32; received "C"/);
    expect(() => choose({ class: '' })).toThrow(/class must be one of A, B/);
  });

  it('is not used, and said so, where the standard has none: the default B works', () => {
    for (const standard of ['IEC 61000-6-3', 'IEC 61000-6-4', 'CISPR 14-1']) {
      const set = choose({ standard, class: 'B' });
      expect(set.class).toBe('none');
      expect(set.notes.join()).toContain(`${standard} has no classes: class B was not used`);
      expect(choose({ standard, class: 'none' }).notes.join()).not.toContain('classes');
    }
    // Residential 40, industrial 50 at 3 m.
    expect(choose({ standard: 'IEC 61000-6-3' }).limitsAt(100e6)[0]?.limitDbuvPerM).toBe(40);
    expect(choose({ standard: 'IEC 61000-6-4' }).limitsAt(100e6)[0]?.limitDbuvPerM).toBe(50);
  });

  it('CISPR 11 class A is the usual power, and says so', () => {
    const set = choose({ standard: 'CISPR 11', class: 'A' });
    expect(set.class).toBe('A up to 20 kVA');
    expect(set.notes.join()).toContain('A up to 20 kVA');
    expect(choose({ standard: 'CISPR 11', class: 'A>20kVA' }).class).toBe('A over 20 kVA');
    expect(choose({ standard: 'CISPR 11', class: 'A<=20kVA' }).class).toBe('A up to 20 kVA');
  });
});

describe('distance', () => {
  it('without a line there: an error that names the distances and the option', () => {
    expect(() => choose({ standard: 'FCC', class: 'A' })).toThrow(
      /distance must be 10 m for FCC 15\.109 class A .*--convert-distance.*received "3 m"/,
    );
    expect(() => choose({ distanceM: 5 })).toThrow(/distance must be 3 m or 10 m for CISPR 32 class B/);
    for (const distanceM of [0, -3, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(() => choose({ distanceM })).toThrow(/above 0 m/);
    }
  });

  it('10 m works below 1 GHz; above, nothing is judged, and the notes say it', () => {
    const set = choose({ distanceM: 10 });
    expect(set.limitsAt(500e6)).toEqual([{ detector: 'quasi-peak', limitDbuvPerM: 37 }]);
    expect(set.limitsAt(2e9)).toEqual([]);
    expect(set.conversion).toBeUndefined();
    expect(set.notes.join()).toMatch(/not judged.*average 1000–6000 MHz \(3 m\)/);
    expect(choose({}).notes).toEqual([]);
  });

  it('FCC class A at 3 m, converted: +10.458 dB on every line', () => {
    const set = choose({ standard: 'FCC', class: 'A', convertDistance: true });
    // Unrounded µV/m at 10 m times 10/3: 300, 500, 700, 1000 (fact sheet 1.2) → 49.542, 53.979, 56.902, 60.000.
    for (const [mhz, level] of [
      [50, 49.542],
      [100, 53.979],
      [500, 56.902],
      [970, 60],
      [2000, 60],
    ] as const) {
      expect(set.limitsAt(mhz * 1e6)[0]?.limitDbuvPerM).toBeCloseTo(level, 3);
    }
    expect(set.limitsAt(2e9)[1]).toEqual({ detector: 'peak', limitDbuvPerM: expect.closeTo(80, 3) });
    expect(set.conversion).toMatch(/from 10 m to 3 m by 20 dB per decade of distance \(\+10\.46 dB\).*not physics/);
    expect(set.lines.every((line) => line.distanceM === 3)).toBe(true);
  });

  it('FCC class B at 10 m, converted: 30, 45, 60, 150 µV/m', () => {
    const set = choose({ standard: 'FCC', distanceM: 10, convertDistance: true });
    for (const [mhz, level] of [
      [50, 29.542],
      [100, 33.064],
      [500, 35.563],
      [970, 43.522],
    ] as const) {
      expect(set.limitsAt(mhz * 1e6)[0]?.limitDbuvPerM).toBeCloseTo(level, 3);
    }
  });

  it('CISPR at 10 m keeps its own lines and converts only what is missing', () => {
    const set = choose({ distanceM: 10, convertDistance: true });
    expect(set.limitsAt(500e6)).toEqual([{ detector: 'quasi-peak', limitDbuvPerM: 37 }]);
    // 50 − 10.458 and 70 − 10.458.
    expect(set.limitsAt(2e9).map((limit) => limit.limitDbuvPerM)).toEqual([
      expect.closeTo(39.542, 3),
      expect.closeTo(59.542, 3),
    ]);
    expect(set.conversion).toContain('average 1000–6000 MHz, peak 1000–6000 MHz');
    expect(set.conversion).not.toContain('quasi-peak');
  });

  it('CISPR between 3 m and 10 m steps by exactly 10 dB', () => {
    // CISPR 14-1 in free space exists at 3 m only; below 1 GHz CISPR steps by 10 dB.
    const far = choose({ standard: 'CISPR 14-1', distanceM: 10, convertDistance: true, siteKind: 'free-space' });
    expect(far.limitsAt(500e6)[0]?.limitDbuvPerM).toBeCloseTo(32, 9);
    expect(far.conversion).toMatch(/10 dB between 3 m and 10 m.*\(−10\.00 dB\)/);
    // The other way, with a catalogue that has 10 m only.
    const tenOnly = allLimitLines.filter((line) => line.distanceM === 10);
    const three = chooseLimits(request({ convertDistance: true }), tenOnly);
    expect(three.limitsAt(500e6)[0]?.limitDbuvPerM).toBeCloseTo(47, 9);
  });

  it('other distances: from the nearest line by ratio, 20 dB per decade', () => {
    // 5 m: 3 m is nearer (ratio 1.67 against 2): 40 − 20 log10(5/3) = 35.563. 30 m from 10 m: 30 − 9.542.
    expect(choose({ distanceM: 5, convertDistance: true }).limitsAt(100e6)[0]?.limitDbuvPerM).toBeCloseTo(35.563, 3);
    expect(choose({ distanceM: 30, convertDistance: true }).limitsAt(100e6)[0]?.limitDbuvPerM).toBeCloseTo(20.458, 3);
    expect(choose({ distanceM: 1, convertDistance: true }).limitsAt(2e9)[0]?.limitDbuvPerM).toBeCloseTo(59.542, 3);
  });

  it('asking for conversion where none is needed changes nothing', () => {
    const set = choose({ convertDistance: true });
    expect(set.conversion).toBeUndefined();
    expect(set.lines).toEqual(choose({}).lines);
  });
});

describe('site', () => {
  it('the ordinary lines by default, the free-space ones on request; above 1 GHz the same', () => {
    expect(choose({}).limitsAt(100e6)[0]?.limitDbuvPerM).toBe(40);
    const free = choose({ siteKind: 'free-space' });
    expect(free.limitsAt(30e6)[0]?.limitDbuvPerM).toBe(42);
    expect(free.limitsAt(2e9)).toEqual(choose({}).limitsAt(2e9));
  });

  it('a standard without free-space lines keeps its own, and says so', () => {
    const set = choose({ standard: 'FCC', siteKind: 'free-space' });
    expect(set.limitsAt(50e6)[0]?.limitDbuvPerM).toBeCloseTo(40, 9);
    expect(set.notes.join()).toMatch(/no limits below 1 GHz for a site without reflections at 3 m/);
    // CISPR 14-1 has free-space lines at 3 m only.
    const tenM = choose({ standard: 'CISPR 14-1', distanceM: 10, siteKind: 'free-space' });
    expect(tenM.limitsAt(50e6)[0]?.limitDbuvPerM).toBe(30);
    expect(tenM.notes.join()).toMatch(/no limits below 1 GHz/);
  });
});

describe('origin', () => {
  it('tells edition, source and status of all chosen lines', () => {
    expect(choose({}).sourceStatus).toBe('seen');
    expect(choose({ class: 'A' }).sourceStatus).toBe('partly from memory');
    expect(choose({ standard: 'CISPR 11' }).sourceStatus).toBe('from memory');
    expect(choose({}).edition).toContain('2012');
    expect(choose({ class: 'A' }).source.split('; ')).toHaveLength(2);
  });

  it('every line is well formed', () => {
    expect(allLimitLines.length).toBeGreaterThan(50);
    for (const line of allLimitLines) {
      for (let i = 1; i < line.points.length; i++) {
        expect(line.points[i]![0]).toBeGreaterThanOrEqual(line.points[i - 1]![0]);
      }
      expect(line.edition + line.source).not.toBe('');
      // A limit between 20 and 90 dBµV/m anywhere inside: a slipped digit would show.
      const middleHz = Math.sqrt(line.points[0]![0] * line.points.at(-1)![0]);
      expect(limitOfLine(line, middleHz)).toBeGreaterThan(20);
      expect(limitOfLine(line, middleHz)).toBeLessThan(90);
    }
  });
});
