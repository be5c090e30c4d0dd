import type { BoardFileInput } from '../../app/board/board-file.ts';

/** Files as a user chooses or drops them. */

export interface NamedFile {
  readonly name: string;
  readonly mimeType: string;
  readonly buffer: Buffer;
}

export const jsonFile = (name: string, content: unknown): NamedFile => ({
  name,
  mimeType: 'application/json',
  buffer: Buffer.from(typeof content === 'string' ? content : JSON.stringify(content)),
});

const LAMP: BoardFileInput = {
  format: 'quietboard-board',
  version: 1,
  name: 'Greenhouse lamp',
  revision: 'A',
  outline: [
    {
      pointsMm: [
        [0, 0],
        [40, 0],
        [40, 30],
        [0, 30],
      ],
    },
  ],
  stackup: [
    { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
    { name: 'D1', kind: 'dielectric', thicknessMm: 0.2, epsilonR: 4.3, lossTangent: 0.02 },
    { name: 'GND', kind: 'copper', thicknessMm: 0.035 },
  ],
  planes: [{ layer: 'GND', net: 'GND' }],
  nets: [
    {
      name: 'CLK',
      traces: [
        {
          layer: 'TOP',
          widthMm: 0.2,
          pointsMm: [
            [5, 15],
            [35, 15],
          ],
        },
      ],
      pins: [
        { name: 'U1.1', atMm: [5, 15], layer: 'TOP' },
        { name: 'U2.1', atMm: [35, 15], layer: 'TOP' },
      ],
    },
  ],
  waveforms: [{ kind: 'trapezoid', name: 'clock', frequencyMhz: 50, lowV: 0, highV: 3.3, riseNs: 1, fallNs: 1 }],
  drives: [{ net: 'CLK', waveform: 'clock', sourceOhm: 25 }],
  loads: [{ net: 'CLK', capacitancePf: 5 }],
};

/** One clock over one plane, no cable: estimated in a second or two. */
export const smallBoard = (): NamedFile => jsonFile('lamp.board.json', LAMP);

/** The small board under other names. */
export function boardWith(names: {
  readonly name: string;
  readonly revision: string;
  readonly net: string;
  readonly pin: string;
  readonly waveform: string;
}): NamedFile {
  const { name, revision, net, pin, waveform } = names;
  const [clk] = LAMP.nets!;
  return jsonFile('named.board.json', {
    ...LAMP,
    name,
    revision,
    nets: [{ ...clk, name: net, pins: clk!.pins!.map((old, i) => ({ ...old, name: i === 0 ? pin : old.name })) }],
    waveforms: LAMP.waveforms!.map((old) => ({ ...old, name: waveform })),
    drives: LAMP.drives!.map((old) => ({ ...old, net, waveform })),
    loads: LAMP.loads!.map((old) => ({ ...old, net })),
  });
}

/** Sources that load its net anew. */
export const otherSources = (): NamedFile =>
  jsonFile('slower.sources.json', {
    format: 'quietboard-sources',
    version: 1,
    loads: [{ net: 'CLK', resistanceOhm: 50 }],
  });
