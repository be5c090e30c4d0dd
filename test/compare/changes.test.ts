import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { emptyResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';

/** Sentences are compared with ones written by hand; lengths, areas and slopes in them follow from the drawn points. */

type Net = BoardFileInput['nets'][number];
type Waveform = NonNullable<BoardFileInput['waveforms']>[number];

const CLOCK: Net = {
  name: 'CLK_25M',
  traces: [
    {
      layer: 'TOP',
      widthMm: 0.2,
      pointsMm: [
        [10, 10],
        [40, 10],
        [40, 31.2],
      ],
    },
  ],
  vias: [{ atMm: [40, 31.2], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 0.3 }],
  pins: [
    { name: 'Y1.3', atMm: [10, 10], layer: 'TOP' },
    { name: 'U1.5', atMm: [40, 31.2], layer: 'TOP' },
  ],
};
const DATA: Net = {
  name: 'DATA',
  traces: [
    {
      layer: 'BOT',
      widthMm: 0.25,
      pointsMm: [
        [5, 5],
        [25, 5],
      ],
    },
  ],
  pins: [{ name: 'U2.1', atMm: [5, 5], layer: 'BOT' }],
};
const TRAPEZOID: Waveform = {
  name: 'clk',
  kind: 'trapezoid',
  frequencyMhz: 25,
  lowV: 0,
  highV: 3.3,
  riseNs: 1,
  fallNs: 1,
};

const BOARD = {
  format: 'quietboard-board',
  version: 1,
  name: 'Kiln fan controller',
  revision: 'B',
  outline: [
    {
      pointsMm: [
        [0, 0],
        [80, 0],
        [80, 50],
        [0, 50],
      ],
    },
  ],
  stackup: [
    { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
    { name: 'D1', kind: 'dielectric', thicknessMm: 0.2, epsilonR: 4.3, lossTangent: 0.02 },
    { name: 'GND', kind: 'copper', thicknessMm: 0.018 },
    { name: 'D2', kind: 'dielectric', thicknessMm: 1.2, epsilonR: 4.5 },
    { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
  ],
  planes: [
    {
      layer: 'GND',
      net: 'GND',
      cutoutsMm: [
        [
          [39, 18],
          [41, 18],
          [41, 22],
          [39, 22],
        ],
      ],
    },
  ],
  nets: [CLOCK, DATA, { name: 'GND', vias: [{ atMm: [3, 3], fromLayer: 'TOP', toLayer: 'GND', drillMm: 0.3 }] }],
  waveforms: [TRAPEZOID],
  drives: [{ net: 'CLK_25M', pin: 'Y1.3', waveform: 'clk', sourceOhm: 25 }],
  loads: [{ net: 'CLK_25M', pin: 'U1.5', resistanceOhm: 1e6, capacitancePf: 5 }],
  loops: [],
  cables: [
    {
      name: 'valve cable',
      pointsMm: [
        [80, 25, 0],
        [180, 25, 0],
        [180, 25, -600],
      ],
      farEnd: 'open',
    },
  ],
} as const satisfies BoardFileInput;

const RUN = storedRun(BOARD as BoardFileInput, emptyResult());

/** What is said when the board changes so. */
const said = (change: Partial<BoardFileInput>, from: Partial<BoardFileInput> = {}): string[] =>
  compareRuns(
    storedRun({ ...(BOARD as BoardFileInput), ...from }, emptyResult()),
    storedRun({ ...(BOARD as BoardFileInput), ...change }, emptyResult()),
  ).changes.map(({ text }) => text);

const withClock = (change: Partial<Net>): Partial<BoardFileInput> => ({
  nets: [{ ...CLOCK, ...change }, DATA, BOARD.nets[2] as Net],
});
const withWave = (change: object): Partial<BoardFileInput> => ({
  waveforms: [{ ...TRAPEZOID, ...change } as Waveform],
});
const withCable = (change: object) =>
  ({ cables: [{ ...(BOARD.cables[0] as object), ...change }] }) as unknown as Partial<BoardFileInput>;

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

describe('copper in words', () => {
  const stack = (
    change: (layers: BoardFileInput['stackup']) => BoardFileInput['stackup'],
  ): Partial<BoardFileInput> => ({
    stackup: change(structuredClone(BOARD.stackup) as unknown as BoardFileInput['stackup']),
  });

  it('says thickness and material of a layer', () => {
    expect(
      said(stack((all) => all.map((layer) => (layer.name === 'D1' ? { ...layer, thicknessMm: 0.1 } : layer)))),
    ).toEqual(['stackup: D1 0.2 → 0.1 mm']);
    expect(
      said(
        stack((all) => all.map((layer) => (layer.name === 'D2' ? { ...layer, epsilonR: 4 } : layer) as typeof layer)),
      ),
    ).toEqual(['stackup: D2 permittivity 4.5 → 4']);
  });

  it('says what added layers do to the dielectric under those that stay', () => {
    const more: BoardFileInput['stackup'] = [
      { name: 'D0', kind: 'dielectric', thicknessMm: 0.1, epsilonR: 4 },
      { name: 'PWR', kind: 'copper', thicknessMm: 0.018 },
    ];
    // 1.488 mm and 0.118 mm more; D2 stays below PWR, so under GND now lies 0.1 mm.
    expect(said(stack((all) => [...all.slice(0, 3), ...more, ...all.slice(3)]))).toEqual([
      'stackup: 3 → 4 copper layers; board 1.488 → 1.606 mm thick; dielectric under GND 1.2 → 0.1 mm',
    ]);
  });

  it('takes a new name of a layer for what it is: nothing about the nets changes', () => {
    const renamed = JSON.parse(JSON.stringify(BOARD).replaceAll('"BOT"', '"L4"')) as BoardFileInput;
    expect(said(renamed)).toEqual(['stackup: layer BOT is now named L4']);
  });

  it('names a cut-out with size and place, counts many, follows a plane to another layer', () => {
    expect(said({ planes: [{ layer: 'GND', net: 'GND' }] })).toEqual([
      'plane GND on layer GND: cut-out of 2 × 4 mm removed at (40, 20) mm',
    ]);
    expect(said({ planes: [{ layer: 'BOT', net: 'GND' }] })).toEqual([
      'plane GND moved from layer GND to BOT; cut-out of 2 × 4 mm removed at (40, 20) mm',
    ]);
    const holes = [10, 20, 30, 60].map((x): [number, number][] => [
      [x, 1],
      [x + 1, 1],
      [x + 1, 2],
      [x, 2],
    ]);
    holes[2]![2]![1] = 5;
    const planes = [
      { layer: 'GND', net: 'GND', cutoutsMm: [...BOARD.planes[0].cutoutsMm, ...holes] },
    ] as unknown as NonNullable<BoardFileInput['planes']>;
    expect(said({ planes })).toEqual([
      'plane GND on layer GND: 4 cut-outs added, the largest of 1 × 4 mm at (30.5, 3) mm',
    ]);
  });

  it('does not care where a ring starts, or which way it runs', () => {
    const cutout: [number, number][] = [
      [39, 22],
      [41, 22],
      [41, 18],
      [39, 18],
      [39, 22],
    ];
    expect(said({ planes: [{ layer: 'GND', net: 'GND', cutoutsMm: [cutout] }] })).toEqual([]);
    expect(
      said({
        outline: [
          {
            pointsMm: [
              [80, 50],
              [80, 0],
              [0, 0],
              [0, 50],
            ],
          },
        ],
      }),
    ).toEqual([]);
    expect(
      said({
        outline: [
          {
            pointsMm: [
              [0, 0],
              [60, 0],
              [60, 50],
              [0, 50],
            ],
          },
        ],
      }),
    ).toEqual(['outline: 80 × 50 → 60 × 50 mm']);
  });

  it.each<[string, Partial<Net>, string[]]>([
    // 30 + 21.2 mm, 30 + 4 mm.
    [
      'length',
      {
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.2,
            pointsMm: [
              [10, 10],
              [40, 10],
              [40, 14],
            ],
          },
        ],
      },
      ['CLK_25M: trace on TOP 51.2 → 34 mm'],
    ],
    ['width', { traces: [{ ...CLOCK.traces![0]!, widthMm: 0.3 }] }, ['CLK_25M: trace on TOP width 0.2 → 0.3 mm']],
    [
      'another way of the same length',
      {
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.2,
            pointsMm: [
              [10, 10],
              [10, 31.2],
              [40, 31.2],
            ],
          },
        ],
      },
      ['CLK_25M: trace on TOP another way, still 51.2 mm'],
    ],
    [
      'another layer',
      { traces: [{ ...CLOCK.traces![0]!, layer: 'BOT' }] },
      ['CLK_25M: trace on TOP 51.2 mm → none, on BOT none → 51.2 mm'],
    ],
    [
      'via',
      { vias: [...CLOCK.vias!, { atMm: [12, 10], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 0.2 }] },
      ['CLK_25M: via added at (12, 10) mm'],
    ],
    ['first via', { vias: [] }, ['CLK_25M: via removed at (40, 31.2) mm']],
    ['drill', { vias: [{ ...CLOCK.vias![0]!, drillMm: 0.2 }] }, ['CLK_25M: drill of 1 via 0.3 → 0.2 mm']],
    [
      'pin',
      { pins: [{ name: 'Y1.3', atMm: [10, 12], layer: 'TOP' }, CLOCK.pins![1]!] },
      ['CLK_25M: pin Y1.3 moved from (10, 10) to (10, 12) mm'],
    ],
    [
      'stated values',
      { z0Ohm: 50, epsilonEff: 3 },
      ['CLK_25M: stated Z0 none → 50 Ω; stated effective permittivity none → 3'],
    ],
    ['via from the other end', { vias: [{ ...CLOCK.vias![0]!, fromLayer: 'BOT', toLayer: 'TOP' }] }, []],
  ])('net: %s', (_name, change, expected) => expect(said(withClock(change))).toEqual(expected));

  it('names nets that come and go, and one that only changed its name', () => {
    const nets = BOARD.nets.filter(({ name }) => name !== 'DATA') as unknown as Net[];
    expect(said({ nets })).toEqual(['net DATA removed (20 mm of trace)']);
    expect(said({ nets: [...nets, { ...DATA, name: 'DATA_OUT' }] })).toEqual([
      'net DATA is now named DATA_OUT (same copper)',
    ]);
    // Two new nets with the copper of the old one: no guess.
    expect(said({ nets: [...nets, { ...DATA, name: 'X' }, { ...DATA, name: 'Y' }] })).toEqual([
      'net DATA removed (20 mm of trace)',
      'net X added (20 mm of trace)',
      'net Y added (20 mm of trace)',
    ]);
  });

  it('takes the sources along with a net that changed its name', () => {
    const renamed = JSON.parse(JSON.stringify(BOARD).replaceAll('CLK_25M', 'CLK')) as BoardFileInput;
    expect(said(renamed)).toEqual(['net CLK_25M is now named CLK (same copper)']);
  });
});

describe('what is no change', () => {
  const mm = fc.integer({ min: 0, max: 60_000 }).map((micrometres) => micrometres / 1000);
  const point = fc.tuple(mm, mm);
  const noiseMm = fc.double({ min: -4e-7, max: 4e-7, noNaN: true });

  it('the same copper drawn by other polylines: split, turned round, in another order, with less than a nanometre of noise', () => {
    fc.assert(
      fc.property(
        fc.array(fc.array(point, { minLength: 2, maxLength: 6 }), { minLength: 1, maxLength: 5 }),
        fc.infiniteStream(fc.tuple(fc.double({ min: 0.1, max: 0.9, noNaN: true }), noiseMm, fc.boolean())),
        (lines, stream) => {
          const next = () => stream.next().value;
          const usable = lines.filter((line) =>
            line.slice(1).some(([x, y], i) => Math.hypot(x - line[i]![0], y - line[i]![1]) > 1e-3),
          );
          const trace = (pointsMm: [number, number][]) => ({ layer: 'TOP', widthMm: 0.2, pointsMm });
          const pieces = usable.flatMap((line) =>
            line.slice(1).flatMap((to, i) => {
              const from = line[i]!;
              if (from[0] === to[0] && from[1] === to[1]) return [];
              const [share, noise, isTurned] = next();
              const middle: [number, number] = [
                from[0] + share * (to[0] - from[0]),
                from[1] + share * (to[1] - from[1]),
              ];
              const noisy: [number, number] = [to[0] + noise, to[1] - noise];
              const parts = [
                [from, middle],
                [middle, noisy],
              ].map((part) => trace((isTurned ? part.toReversed() : part) as [number, number][]));
              return parts;
            }),
          );
          if (pieces.length === 0) return;
          const net = (traces: ReturnType<typeof trace>[]) => withClock({ traces });
          expect(said(net(pieces.toReversed()), net(usable.map(trace)))).toEqual([]);
        },
      ),
      { seed: 411, numRuns: 60 },
    );
  });

  it('a run against itself, and order of nets, planes, drives and keys', () => {
    expect(compareRuns(RUN, RUN).changes).toEqual([]);
    const turned = Object.fromEntries(Object.entries({ ...BOARD, nets: BOARD.nets.toReversed() }).reverse());
    expect(said(turned as unknown as BoardFileInput)).toEqual([]);
    expect(said({ notes: 'read me', revision: 'C' })).toEqual([]);
  });
});

describe('set-up in words', () => {
  const changed = (change: Parameters<typeof storedRun>[2], limit: object = {}, version = '0.1.0') => {
    const result = emptyResult();
    const other = { ...result, program: { version }, limit: { ...result.limit, ...limit } };
    return compareRuns(RUN, storedRun(BOARD as BoardFileInput, other, change));
  };

  it('says limit, distance, site and program', () => {
    const { changes } = changed(
      { settings: { distanceM: 10, class: 'A', site: 'free-space', orientation: 'upright', measuredFrom: 'center' } },
      { class: 'A', distanceM: 10 },
      '0.2.0',
    );
    expect(changes.map(({ text }) => text)).toEqual([
      'board flat → upright',
      'distance 3 → 10 m',
      'distance measured from the boundary → turntable axis',
      'site: ground plane → free space',
      'limit: class B → class A',
      'program version 0.1.0 → 0.2.0',
    ]);
  });

  it('warns when margins are not comparable, not when only the required margin differs', () => {
    const warned = (comparison: ReturnType<typeof changed>) => comparison.warnings.map(({ code }) => code);
    expect(warned(changed({ settings: { distanceM: 10 } }))).toEqual(['setups-differ']);
    expect(warned(changed({ settings: { site: 'free-space' } }))).toEqual(['setups-differ']);
    expect(warned(changed({ settings: { structure: 'pair-only' } }))).toEqual(['setups-differ']);
    expect(warned(changed({ settings: { limitFile: { lines: [] } } }))).toEqual(['setups-differ']);
    expect(warned(changed({}, {}, '9'))).toEqual(['programs-differ']);
    expect(warned(changed({}, { maxHz: 2e9 }))).toEqual(['ranges-differ']);
    const demand = changed({ settings: { requiredMarginDb: 3 } }, { requiredMarginDb: 3 });
    expect(warned(demand)).toEqual([]);
    expect(demand.changes.map(({ text }) => text)).toEqual(['required margin 6 → 3 dB']);
  });
});
