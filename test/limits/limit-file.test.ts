import { describe, expect, it } from 'vitest';
import { allLimitLines } from '../../app/limits/catalogue.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { parseLimitFile } from '../../app/limits/limit-file.ts';

const line = {
  standard: 'House rule',
  aliases: ['HR 7'],
  class: 'B',
  distanceM: 3,
  detector: 'quasi-peak',
  pointsMhzDbuvPerM: [
    [30, 34],
    [230, 34],
    [230, 41],
    [1000, 51],
  ],
};
const file = (...lines: unknown[]) => ({ format: 'quietboard-limits', version: 1, lines });

describe('limit file', () => {
  it('gives lines that can be chosen beside the built-in ones', () => {
    const catalogue = [...parseLimitFile(file(line)), ...allLimitLines];
    const set = chooseLimits({ standard: 'hr7', class: 'b', distanceM: 3, convertDistance: false }, catalogue);
    expect(set).toMatchObject({ standard: 'House rule', class: 'B', sourceStatus: 'user file', source: 'limit file' });
    expect(set.limitsAt(100e6)).toEqual([{ detector: 'quasi-peak', limitDbuvPerM: 34 }]);
    expect(set.limitsAt(230e6)[0]?.limitDbuvPerM).toBe(34);
    // Half way in log frequency from 230 to 1000 MHz: 479.583 MHz.
    expect(set.limitsAt(479.5832e6)[0]?.limitDbuvPerM).toBeCloseTo(46, 4);
    expect(set.limitsAt(1.1e9)).toEqual([]);
  });

  it('a downward step takes the lower value too', () => {
    const points = [
      [30, 50],
      [100, 50],
      [100, 40],
      [300, 40],
    ];
    const lines = parseLimitFile(file({ ...line, pointsMhzDbuvPerM: points }));
    const set = chooseLimits({ standard: 'House rule', class: 'B', distanceM: 3, convertDistance: false }, lines);
    expect(set.limitsAt(100e6)[0]?.limitDbuvPerM).toBe(40);
    expect(set.limitsAt(99.9e6)[0]?.limitDbuvPerM).toBe(50);
  });

  it('a step at the very end counts', () => {
    const points = [
      [30, 50],
      [100, 50],
      [100, 40],
    ];
    const lines = parseLimitFile(file({ ...line, pointsMhzDbuvPerM: points }));
    const set = chooseLimits({ standard: 'House rule', class: 'B', distanceM: 3, convertDistance: false }, lines);
    expect(set.limitsAt(100e6)[0]?.limitDbuvPerM).toBe(40);
  });

  it('two lines of one detector: the tighter holds where both are, at a shared edge too', () => {
    const flat = (fromMhz: number, toMhz: number, level: number, distanceM = 3) => ({
      ...line,
      distanceM,
      pointsMhzDbuvPerM: [
        [fromMhz, level],
        [toMhz, level],
      ],
    });
    const request = { standard: 'House rule', class: 'B', distanceM: 3, convertDistance: true };
    const lower = chooseLimits(request, parseLimitFile(file(flat(30, 300, 40), flat(200, 1000, 36))));
    expect([199, 200, 250, 300, 301].map((mhz) => lower.limitsAt(mhz * 1e6))).toEqual(
      [40, 36, 36, 36, 36].map((limitDbuvPerM) => [{ detector: 'quasi-peak', limitDbuvPerM }]),
    );
    // Lines that only touch are no alternatives: the one of 10 m fills what the one of 3 m leaves open (+10.458 dB).
    const touching = chooseLimits(request, parseLimitFile(file(flat(30, 230, 40), flat(230, 1000, 36, 10))));
    expect(touching.limitsAt(230e6)[0]?.limitDbuvPerM).toBe(40);
    expect(touching.limitsAt(500e6)[0]?.limitDbuvPerM).toBeCloseTo(46.458, 3);
    const overlapping = chooseLimits(request, parseLimitFile(file(flat(30, 231, 40), flat(230, 1000, 36, 10))));
    expect(overlapping.limitsAt(500e6)).toEqual([]);
  });

  it('a line without class takes any class', () => {
    const { class: _, ...classless } = line;
    const lines = parseLimitFile(file(classless));
    const set = chooseLimits({ standard: 'House rule', class: 'B', distanceM: 3, convertDistance: false }, lines);
    expect(set.class).toBe('none');
    expect(set.notes.join()).toContain('no classes');
  });

  it.each([
    ['another format', { ...file(line), format: 'quietboard-board' }, /format must be "quietboard-limits"/],
    ['a newer version', { ...file(line), version: 2 }, /version must be 1/],
    ['an unknown key', file({ ...line, distanceFt: 10 }), /lines\[0\]\.distanceFt/],
    ['no lines', file(), /lines must be/],
    ['a negative distance', file({ ...line, distanceM: -3 }), /lines\[0\]\.distanceM/],
    ['another detector', file({ ...line, detector: 'rms' }), /lines\[0\]\.detector.*quasi-peak/],
    ['one point', file({ ...line, pointsMhzDbuvPerM: [[30, 40]] }), /pointsMhzDbuvPerM/],
    [
      'falling frequencies',
      file(line, {
        ...line,
        pointsMhzDbuvPerM: [
          [30, 40],
          [20, 40],
        ],
      }),
      /lines\[1\]\.pointsMhzDbuvPerM\[1\]\[0\]/,
    ],
    [
      'three points at one frequency',
      file({
        ...line,
        pointsMhzDbuvPerM: [
          [30, 40],
          [50, 40],
          [50, 45],
          [50, 47],
        ],
      }),
      /\[3\]\[0\]/,
    ],
    [
      'a range of nothing',
      file({
        ...line,
        pointsMhzDbuvPerM: [
          [30, 40],
          [30, 50],
        ],
      }),
      /more than one frequency/,
    ],
    [
      'a frequency of zero',
      file({
        ...line,
        pointsMhzDbuvPerM: [
          [0, 40],
          [30, 50],
        ],
      }),
      /pointsMhzDbuvPerM\[0\]\[0\]/,
    ],
    ['a name of no letters', file({ ...line, standard: ' – ' }), /standard must be a name/],
    ['no object at all', 'text', /the file must be/],
    ['null', null, /the file must be/],
  ])('refuses %s, with the place', (_, json, message) => {
    expect(() => parseLimitFile(json)).toThrow(message);
  });
});
