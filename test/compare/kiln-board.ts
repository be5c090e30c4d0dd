import type { BoardFileInput } from '../../app/board/board-file.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { emptyResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';

/** The board whose changes tests put into words. */

export type Net = BoardFileInput['nets'][number];
export type Waveform = NonNullable<BoardFileInput['waveforms']>[number];

export const CLOCK: Net = {
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
export const DATA: Net = {
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
export const TRAPEZOID: Waveform = {
  name: 'clk',
  kind: 'trapezoid',
  frequencyMhz: 25,
  lowV: 0,
  highV: 3.3,
  riseNs: 1,
  fallNs: 1,
};

export const BOARD = {
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

export const RUN = storedRun(BOARD as BoardFileInput, emptyResult());

/** What is said when the board changes so. */
export const said = (change: Partial<BoardFileInput>, from: Partial<BoardFileInput> = {}): string[] =>
  compareRuns(
    storedRun({ ...(BOARD as BoardFileInput), ...from }, emptyResult()),
    storedRun({ ...(BOARD as BoardFileInput), ...change }, emptyResult()),
  ).changes.map(({ text }) => text);

export const withClock = (change: Partial<Net>): Partial<BoardFileInput> => ({
  nets: [{ ...CLOCK, ...change }, DATA, BOARD.nets[2] as Net],
});
export const withWave = (change: object): Partial<BoardFileInput> => ({
  waveforms: [{ ...TRAPEZOID, ...change } as Waveform],
});
export const withCable = (change: object) =>
  ({ cables: [{ ...(BOARD.cables[0] as object), ...change }] }) as unknown as Partial<BoardFileInput>;
