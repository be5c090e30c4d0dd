import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { BOARD, CLOCK, DATA, type Net, RUN, said, withClock } from './kiln-board.ts';

/** Sentences are compared with ones written by hand; lengths, areas and slopes in them follow from the drawn points. */

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

  it('noise about half a nanometre, where rounding falls apart', () => {
    const at = (xMm: number) =>
      withClock({
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.2,
            pointsMm: [
              [10, 10],
              [xMm, 10],
            ],
          },
        ],
        vias: [],
        pins: [],
      });
    expect(said(at(40.0000005 + 1e-7), at(40.0000005 - 1e-7))).toEqual([]);
    // Two nanometres are another place, if not one to talk about by length.
    expect(said(at(40.000002), at(40))).toEqual(['CLK_25M: trace on TOP another way, still 30 mm']);
  });

  it('a run against itself, and order of nets, planes, drives and keys', () => {
    expect(compareRuns(RUN, RUN).changes).toEqual([]);
    const turned = Object.fromEntries(Object.entries({ ...BOARD, nets: BOARD.nets.toReversed() }).reverse());
    expect(said(turned as unknown as BoardFileInput)).toEqual([]);
    expect(said({ notes: 'read me', revision: 'C' })).toEqual([]);
  });
});
