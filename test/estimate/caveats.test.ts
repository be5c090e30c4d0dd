import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import {
  boardFile,
  type Choices,
  driveFile,
  drivenBoard,
  estimateOf,
  linesVoltage,
  loadFile,
  type Mm,
  netFile,
} from '../support/estimates.ts';

/** 20 µm of copper and 1 mm: nothing about the lines is outside its range from 30 MHz on. */
const STACK: BoardFileInput['stackup'] = [
  { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
  { name: 'D', kind: 'dielectric', thicknessMm: 1, epsilonR: 4.1 },
  { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
];
const small = {
  outline: [
    {
      pointsMm: [
        [0, 0],
        [60, 0],
        [60, 40],
        [0, 40],
      ] as Mm[],
    },
  ],
  stackup: STACK,
};
const plain = (more: Partial<BoardFileInput> = {}) =>
  drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[100, 1]])], { ...small, ...more });
const codesOf = (file: BoardFileInput, choices?: Choices) => estimateOf(file, choices).caveats.map(({ code }) => code);
const caveat = (code: string, file: BoardFileInput, choices?: Choices) =>
  estimateOf(file, choices).caveats.find((each) => each.code === code);

describe('caveats (physics 10): said when they apply, silent when not', () => {
  it('a plain board: only that planes are left out, or idealised', () => {
    expect(codesOf(plain())).toEqual(['structure-not-solved']);
    expect(codesOf(plain(), { request: { structure: 'solved' } })).toEqual(['structure-idealised']);
    expect(caveat('structure-not-solved', plain(), { request: { structure: 'solved', maxHz: 2e9 } })).toMatchObject({
      fromHz: 1e9,
      toHz: 2e9,
    });
  });

  it('a slot that the user’s own cells are too large for, closed or open to the edge', () => {
    const notched: Mm[] = [
      [0, 0],
      [30, 0],
      [30, 20],
      [30.4, 20],
      [30.4, 0],
      [60, 0],
      [60, 40],
      [0, 40],
    ];
    const solved = { request: { structure: 'solved' as const } };
    const plane = (more: Partial<BoardFileInput> = {}) =>
      plain({ planes: [{ layer: 'BOT', net: 'GND', pointsMm: notched }], ...more });
    expect(codesOf(plane(), solved)).not.toContain('structure-cells-coarse');
    const coarse = caveat('structure-cells-coarse', plane({ structure: { cellMm: 5 } }), solved)!;
    expect(coarse.message).toMatch(/a slot of 20 mm in the planes is only 4 cells long/);
    expect(codesOf(plain({ structure: { cellMm: 5 } }), solved)).not.toContain('structure-cells-coarse');
  });

  it('board larger than half a wave: diagonal of 224 mm at 671 MHz', () => {
    const wide = (xMm: number) =>
      plain({
        outline: [
          {
            pointsMm: [
              [0, 0],
              [xMm, 0],
              [xMm, 100],
              [0, 100],
            ],
          },
        ],
      });
    const found = caveat('board-larger-than-half-wave', wide(200))!;
    // 299.792/(2·0.2236) MHz.
    expect(found.fromHz / 1e6).toBeCloseTo(670.4, 0);
    expect(found.toHz).toBe(1e9);
    expect(caveat('board-larger-than-half-wave', wide(110))).toBeUndefined();
  });

  it('a loop longer than a tenth of a wave around', () => {
    const loop = (sideMm: number): BoardFileInput => ({
      ...boardFile(small),
      waveforms: [{ name: 'i', kind: 'lines', lines: [{ frequencyMhz: 100, amplitudeA: 1e-3 }] }],
      loops: [
        {
          name: 'L',
          waveform: 'i',
          pointsMm: [
            [0, 0, 1],
            [sideMm, 0, 1],
            [sideMm, sideMm, 1],
            [0, sideMm, 1],
          ],
        },
      ],
    });
    // λ/10 at 1 GHz is 30 mm; 4 × 10 mm reach it at 749 MHz.
    expect(caveat('loop-not-small', loop(10))).toMatchObject({ where: 'loop L' });
    expect(caveat('loop-not-small', loop(10))!.fromHz / 1e6).toBeCloseTo(749.5, 0);
    expect(caveat('loop-not-small', loop(7.4))).toBeUndefined();
  });

  it('a cross section that is not small, per net, from its frequency on', () => {
    const thick = (heightMm: number) =>
      plain({ stackup: [STACK[0]!, { ...STACK[1]!, thicknessMm: heightMm }, STACK[2]!] });
    const found = caveat('line-not-tem', thick(25))!;
    expect(found).toMatchObject({ where: 'net A', toHz: 1e9 });
    // c/(10·25 mm·√ε_eff), ε_eff between 1 and 4.1: 592 to 1199 MHz.
    expect(found.fromHz).toBeGreaterThan(592e6);
    expect(found.fromHz).toBeLessThan(1e9);
    expect(caveat('line-not-tem', thick(5))).toBeUndefined();
  });

  it('copper thinner than two skin depths, up to its frequency; several thicknesses of a net up to the highest', () => {
    const layers = (micrometres: number[]): BoardFileInput['stackup'] => [
      { name: 'L1', kind: 'copper', thicknessMm: micrometres[0]! / 1e3 },
      { name: 'D1', kind: 'dielectric', thicknessMm: 0.5, epsilonR: 4.1 },
      { name: 'L2', kind: 'copper', thicknessMm: 0.035 },
      { name: 'D2', kind: 'dielectric', thicknessMm: 0.5, epsilonR: 4.1 },
      { name: 'L3', kind: 'copper', thicknessMm: micrometres[1]! / 1e3 },
    ];
    const file = (micrometres: number[]) =>
      plain({
        stackup: layers(micrometres),
        planes: [{ layer: 'L2', net: 'GND' }],
        nets: [
          {
            name: 'A',
            traces: [
              {
                layer: 'L1',
                widthMm: 0.4,
                pointsMm: [
                  [9, 12],
                  [30, 12],
                ],
              },
              {
                layer: 'L3',
                widthMm: 0.4,
                pointsMm: [
                  [30, 12],
                  [50, 12],
                ],
              },
            ],
            vias: [{ atMm: [30, 12], fromLayer: 'L1', toLayer: 'L3', drillMm: 0.3 }],
            pins: [
              { name: 'U1.A', atMm: [9, 12], layer: 'L1' },
              { name: 'U2.A', atMm: [50, 12], layer: 'L3' },
            ],
          },
        ],
      });
    const thin = (micrometres: number[]) =>
      estimateOf(file(micrometres)).caveats.filter(({ code, where }) => where === 'net A' && code === 'thin-conductor');
    // f = 4/(π µ0 σ t²), σ = 5.8e7 S/m: 78 MHz for 15 µm, 121 MHz for 12 µm.
    expect(thin([35, 35])).toEqual([]);
    for (const pair of [
      [15, 12],
      [12, 15],
    ]) {
      const found = thin(pair);
      expect(found).toHaveLength(1);
      expect(found[0]!.toHz / 121.3e6).toBeCloseTo(1, 2);
    }
  });

  it('every different reason of a net’s lines is told once', () => {
    const wide = plain({
      nets: [
        {
          ...netFile('A'),
          traces: [
            {
              layer: 'TOP',
              widthMm: 0.015,
              pointsMm: [
                [9, 12],
                [28, 12],
              ],
            },
            {
              layer: 'TOP',
              widthMm: 0.009,
              pointsMm: [
                [28, 12],
                [48, 12],
                [48, 33],
              ],
            },
          ],
        },
      ],
    });
    const messages = estimateOf(wide)
      .caveats.filter(({ code }) => code === 'line-outside-validity')
      .map(({ message }) => message);
    expect(messages.sort()).toEqual([
      'copper more than twice as thick as the trace is wide',
      'microstrip with w/h outside 0.01 to 100',
    ]);
  });

  it('a gap in the plane, a layer change without a near return', () => {
    const slot = plain({
      planes: [
        {
          layer: 'BOT',
          net: 'GND',
          cutoutsMm: [
            [
              [20, 5],
              [23, 5],
              [23, 18],
              [20, 18],
            ],
          ],
        },
      ],
    });
    const result = estimateOf(slot);
    expect(result.caveats.find(({ code }) => code === 'plane-gap')).toMatchObject({ where: 'A' });
    expect(result.findings).toHaveLength(1);
    const [finding] = result.findings;
    expect(finding).toMatchObject({ code: 'plane-gap', net: 'A', layer: 'TOP' });
    expect(finding!.atM[0]).toBeCloseTo(0.0215, 9);
    expect(finding!.atM[1]).toBeCloseTo(0.012, 9);
    // 3 mm of the trace, copper again 6 mm to one side and 7 mm to the other.
    expect(finding!.message).toMatch(/under 3\.0 mm of the trace; the shorter way around is 6\.0 mm to the side/);
    // A via's clearance, gone around within 1 mm, is none.
    const clearance = plain({
      planes: [
        {
          layer: 'BOT',
          net: 'GND',
          cutoutsMm: [
            [
              [20, 11.2],
              [21.6, 11.2],
              [21.6, 12.8],
              [20, 12.8],
            ],
          ],
        },
      ],
    });
    expect(estimateOf(clearance).findings).toEqual([]);
    const split = plain({
      planes: [
        {
          layer: 'BOT',
          net: 'GND',
          pointsMm: [
            [0, 0],
            [30, 0],
            [30, 40],
            [0, 40],
          ],
        },
        {
          layer: 'BOT',
          net: 'V',
          pointsMm: [
            [30.2, 0],
            [60, 0],
            [60, 40],
            [30.2, 40],
          ],
        },
      ],
    });
    expect(estimateOf(split).findings[0]!.message).toMatch(/under 0\.2 mm of the trace; there is no way around/);
  });

  it('a guessed permittivity, nets without a drive', () => {
    const guessed = plain({ stackup: [STACK[0]!, { ...STACK[1]!, guessed: true } as never, STACK[2]!] });
    expect(caveat('permittivity-guessed', guessed)).toMatchObject({ where: 'D' });
    const open = plain({
      nets: [
        netFile('A'),
        netFile('B', [
          [5, 35],
          [30, 35],
        ]),
        { name: 'C' },
      ],
    });
    expect(caveat('nets-without-drive', open)).toMatchObject({ where: 'B' });
    expect(caveat('nets-without-drive', open)!.message).toMatch(/^1 net has/);
  });

  it('connectors without any cable; a cable nothing is known of; a current stated for part of the range', () => {
    const pins = [...netFile('A').pins!, { name: 'J3.1', atMm: [48, 33] as Mm, layer: 'TOP' }];
    const withConnector = plain({ nets: [{ ...netFile('A'), pins }], loads: [loadFile('A', 50)] });
    expect(caveat('no-cable-modelled', withConnector)!.message).toMatch(/\(J3\)/);
    const cable = {
      name: 'c',
      pointsMm: [
        [60, 20, 0],
        [260, 20, 0],
      ] as [number, number, number][],
    };
    const withCable = (more: object) => ({ ...withConnector, cables: [{ ...cable, ...more }] });
    expect(codesOf(withCable({}))).toContain('cable-not-solved');
    expect(codesOf(withCable({}), { request: { structure: 'solved' } })).not.toContain('cable-not-solved');
    const stated = (from: number, to: number) =>
      codesOf(
        withCable({
          commonModeUa: [
            [from, 0.3],
            [to, 0.3],
          ],
        }),
      );
    expect(stated(30, 1000)).toEqual(['structure-not-solved']);
    expect(stated(40, 1000)).toEqual(['structure-not-solved', 'cable-current-range']);
    expect(stated(30, 900)).toEqual(['structure-not-solved', 'cable-current-range']);
  });

  it('several lines in the bandwidth, with their range', () => {
    const file = drivenBoard(
      [netFile('A')],
      [driveFile('A', 'w')],
      [
        linesVoltage('w', [
          [100, 1],
          [100.05, 1],
          [300, 1],
          [500, 1],
          [500.06, 1],
        ]),
      ],
      small,
    );
    expect(caveat('several-lines-in-bandwidth', file)).toMatchObject({ fromHz: 100e6, toHz: 500.06e6 });
    expect(caveat('several-lines-in-bandwidth', file)!.message).toMatch(/^4 lines/);
  });
});
