import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { driveFile, drivenBoard, estimateOf, linesVoltage, netFile, pointAt } from '../support/estimates.ts';

const HZ = 120e6;
const tone = (name: string, domain?: string, volts = 1) => linesVoltage(name, [[120, volts]], domain);
const at120 = (file: BoardFileInput): ResultPoint => pointAt(estimateOf(file), HZ);

const one = at120(drivenBoard([netFile('A')], [driveFile('A', 'w')], [tone('w')]));

/** Two equal nets at one place. */
const twins = (waveforms: ReturnType<typeof tone>[], second: Parameters<typeof driveFile>[2] = {}) =>
  drivenBoard(
    [netFile('A'), netFile('B')],
    [driveFile('A', waveforms[0]!.name), driveFile('B', waveforms.at(-1)!.name, second)],
    waveforms,
  );

/** The kernel is linear: only rounding and the search for the maximum (1e-7 of the power) differ. */
const ROUNDING_DB = 1e-6;
const expectDb = (actual: number, expected: number) => expect(Math.abs(actual - expected)).toBeLessThan(ROUNDING_DB);

describe('equal sources at one place', () => {
  it('in one domain: +6.02 dB, which is the upper bound', () => {
    const two = at120(twins([tone('w')]));
    expectDb(two.levelDbuvPerM - one.levelDbuvPerM, 20 * Math.log10(2));
    expectDb(two.upperBoundDbuvPerM, two.levelDbuvPerM);
    expect(two.contributors.map(({ name }) => name)).toEqual(['A', 'B']);
    for (const { levelDbuvPerM } of two.contributors) expectDb(levelDbuvPerM, one.levelDbuvPerM);
  });

  it.each([
    ['two waveforms without a domain', [tone('w'), tone('v')]],
    ['two named domains', [tone('w', 'x'), tone('v', 'y')]],
  ])('in two domains (%s): +3.01 dB, upper bound +6.02 dB', (_, waveforms) => {
    const two = at120(twins(waveforms));
    expectDb(two.levelDbuvPerM - one.levelDbuvPerM, 10 * Math.log10(2));
    expectDb(two.upperBoundDbuvPerM - one.levelDbuvPerM, 20 * Math.log10(2));
  });

  it('two waveforms of one named domain add as phasors', () => {
    expectDb(at120(twins([tone('w', 'x'), tone('v', 'x')])).levelDbuvPerM - one.levelDbuvPerM, 20 * Math.log10(2));
  });

  it.each([
    ['inverted', { inverted: true }],
    ['half a period late', { delayNs: 0.5e9 / HZ }],
  ])('the twin %s cancels, and JSON can say so', (_, second) => {
    const two = at120(twins([tone('w')], second));
    // Rounding of the delay's angle leaves 1e-15 of the field.
    expect(two.levelDbuvPerM).toBeLessThan(one.levelDbuvPerM - 200);
    for (const level of [two.levelDbuvPerM, two.horizontalDbuvPerM, two.verticalDbuvPerM, two.upperBoundDbuvPerM]) {
      expect(JSON.parse(JSON.stringify({ level }))).toEqual({ level });
    }
  });

  it('half of the twin, inverted: −6.02 dB; the upper bound does not see the sign: +3.52 dB', () => {
    const file = twins([tone('w', 'x'), tone('v', 'x', 0.5)], { inverted: true });
    const two = at120(file);
    expectDb(two.levelDbuvPerM - one.levelDbuvPerM, 20 * Math.log10(0.5));
    expectDb(two.upperBoundDbuvPerM - one.levelDbuvPerM, 20 * Math.log10(1.5));
  });

  it('the twin a third of a period late: |1 + e^(−j120°)| = 1; inverted too: √3', () => {
    const delayNs = 1e9 / HZ / 3;
    expectDb(at120(twins([tone('w')], { delayNs })).levelDbuvPerM, one.levelDbuvPerM);
    const inverted = at120(twins([tone('w')], { delayNs, inverted: true }));
    expectDb(inverted.levelDbuvPerM - one.levelDbuvPerM, 10 * Math.log10(3));
  });
});

describe('two drives on one net', () => {
  /** Two driver pins at one place, so both see the same net. */
  const sideBySide = (waveforms: ReturnType<typeof tone>[]) => {
    const net = netFile('A');
    const pins = [...net.pins!, { ...net.pins![0]!, name: 'U3.A' }];
    const drives = [driveFile('A', waveforms[0]!.name), { ...driveFile('A', waveforms.at(-1)!.name), pin: 'U3.A' }];
    return drivenBoard([{ ...net, pins }], drives, waveforms);
  };
  const alone = at120(sideBySide([tone('w', 'x'), tone('v', 'y', 0)]));

  it('in different domains add as powers, and the upper bound is their linear sum', () => {
    const both = at120(sideBySide([tone('w', 'x'), tone('v', 'y')]));
    expectDb(both.levelDbuvPerM - alone.levelDbuvPerM, 10 * Math.log10(2));
    expectDb(both.upperBoundDbuvPerM - alone.levelDbuvPerM, 20 * Math.log10(2));
    expect(both.contributors).toHaveLength(1);
    expectDb(both.contributors[0]!.levelDbuvPerM, both.levelDbuvPerM);
  });

  it('in one domain add as phasors', () => {
    const both = at120(sideBySide([tone('w')]));
    expectDb(both.levelDbuvPerM - alone.levelDbuvPerM, 20 * Math.log10(2));
    expectDb(both.upperBoundDbuvPerM, both.levelDbuvPerM);
  });

  it('that cancel leave a contributor without a field, which JSON can say', () => {
    const file = sideBySide([tone('w')]);
    const both = at120({
      ...file,
      nets: [
        ...file.nets,
        netFile('B', [
          [12, 8],
          [40, 30],
        ]),
      ],
      drives: [file.drives![0]!, { ...file.drives![1]!, inverted: true }, driveFile('B', 'w')],
    });
    expect(both.contributors.map(({ name }) => name)).toEqual(['B', 'A']);
    expect(JSON.parse(JSON.stringify(both.contributors[1]))).toEqual({
      kind: 'net',
      name: 'A',
      levelDbuvPerM: -200,
      viaDbuvPerM: { pair: -200 },
    });
  });

  it('at opposite ends with opposite signs drive one current through', () => {
    const ends = (volts: number) =>
      at120(
        drivenBoard(
          [
            netFile('A', [
              [11, 22],
              [59, 22],
            ]),
          ],
          [driveFile('A', 'w'), { ...driveFile('A', 'v', { inverted: true }), pin: 'U2.A' }],
          [tone('w', 'x'), tone('v', 'x', volts)],
          { loads: [] },
        ),
      );
    // Low frequency: I = (V1 + V2)/(R1 + R2), twice that of one alone; 48 mm are λ/25 at 120 MHz, so about.
    expect(Math.abs(ends(1).levelDbuvPerM - ends(0).levelDbuvPerM - 20 * Math.log10(2))).toBeLessThan(1);
  });
});

describe('a clock domain is not mixed up with', () => {
  it('a cable of stated current whose name it looks like: they add as powers', () => {
    const withCable = (clockDomain: string) =>
      at120(
        drivenBoard([netFile('A')], [driveFile('A', 'w')], [tone('w', clockDomain, 20)], {
          cables: [
            {
              name: 'c',
              pointsMm: [
                [70, 22, 0],
                [270, 22, 0],
              ],
              commonModeUa: [
                [30, 5],
                [300, 5],
              ],
            },
          ],
        }),
      );
    const expected = withCable('something else');
    for (const name of ['cable c', 'c', 'clock c']) expect(withCable(name)).toEqual(expected);
  });

  it('that of another drive when net and pin names run together', () => {
    // Random data: one domain a drive. Net "N" pin "P/Q" and net "N/P" pin "Q" are two drives.
    const names = [
      ['N', 'P/Q'],
      ['N/P', 'Q'],
    ] as const;
    const file = (isSlashed: boolean): BoardFileInput => {
      const nets = names.map(([net, pin], i) => {
        const base = netFile(isSlashed ? net : `net ${i}`);
        const pins = base.pins!.map((each, p) => (p === 0 ? { ...each, name: pin } : each));
        return { ...base, pins };
      });
      return drivenBoard(
        nets,
        nets.map(({ name, pins }) => ({ net: name, pin: pins[0]!.name, waveform: 'd', sourceOhm: 30 })),
        [
          {
            name: 'd',
            kind: 'random-data',
            bitRateMbps: 120,
            lowV: 0,
            highV: 1,
            riseNs: 1,
            fallNs: 1,
            sequenceBits: 3,
          },
        ],
        { loads: [] },
      );
    };
    const slashed = estimateOf(file(true)).points.map(({ levelDbuvPerM }) => levelDbuvPerM);
    expect(slashed).toEqual(estimateOf(file(false)).points.map(({ levelDbuvPerM }) => levelDbuvPerM));
    expect(slashed.length).toBeGreaterThan(3);
  });
});

describe('the sum does not depend on order', () => {
  it('nets, drives and waveforms in any order give the same points', () => {
    const nets = [
      netFile('A'),
      netFile('B', [
        [12, 8],
        [40, 30],
      ]),
      netFile('C', [
        [5, 40],
        [60, 40],
      ]),
    ];
    const waveforms = [tone('w', 'x'), tone('v', 'y', 0.7), tone('u', 'x', 1.3)];
    const drives = [
      driveFile('A', 'w'),
      driveFile('B', 'v', { delayNs: 1.1 }),
      driveFile('C', 'u', { inverted: true }),
    ];
    const expected = estimateOf(drivenBoard(nets, drives, waveforms)).points[0]!;
    fc.assert(
      fc.property(
        fc.shuffledSubarray([0, 1, 2], { minLength: 3, maxLength: 3 }),
        fc.shuffledSubarray([0, 1, 2], { minLength: 3, maxLength: 3 }),
        (netOrder, driveOrder) => {
          const [found] = estimateOf(
            drivenBoard(
              netOrder.map((i) => nets[i]!),
              driveOrder.map((i) => drives[i]!),
              netOrder.map((i) => waveforms[i]!),
            ),
          ).points;
          expectDb(found!.levelDbuvPerM, expected.levelDbuvPerM);
          expectDb(found!.upperBoundDbuvPerM, expected.upperBoundDbuvPerM);
          expect(found!.contributors.map(({ name }) => name)).toEqual(expected.contributors.map(({ name }) => name));
        },
      ),
      { numRuns: 6, seed: 20261202 },
    );
  });
});

describe('contributors at the maximum', () => {
  const db = (levels: readonly number[]) => levels.map((level) => 10 ** (level / 20));

  it('of different domains combine to the level as powers, to the upper bound linearly', () => {
    const { points } = estimateOf(
      drivenBoard(
        [
          netFile('A'),
          netFile('B', [
            [12, 8],
            [40, 30],
          ]),
          netFile('C', [
            [5, 40],
            [60, 40],
          ]),
        ],
        [driveFile('A', 'w'), driveFile('B', 'v'), driveFile('C', 'u')],
        [tone('w'), tone('v', undefined, 2), tone('u', undefined, 3)],
      ),
    );
    const [point] = points;
    const fields = db(point!.contributors.map(({ levelDbuvPerM }) => levelDbuvPerM));
    expect(fields).toEqual([...fields].sort((a, b) => b - a));
    expectDb(10 * Math.log10(fields.reduce((sum, field) => sum + field * field, 0)), point!.levelDbuvPerM);
    expectDb(20 * Math.log10(fields.reduce((sum, field) => sum + field, 0)), point!.upperBoundDbuvPerM);
    expect(Math.max(point!.horizontalDbuvPerM, point!.verticalDbuvPerM)).toBe(point!.levelDbuvPerM);
  });
});
