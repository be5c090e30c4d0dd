import type { BoardFileInput } from '../../app/board/board-file.ts';

/** A made-up two-copper board in the shape of the documented example; a fresh copy at every call. */
export function orchardBoard() {
  return structuredClone({
    format: 'quietboard-board',
    version: 1,
    name: 'Orchard valve controller',
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
      { name: 'GND', kind: 'copper', thicknessMm: 0.017 },
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
              [10, 10],
              [60, 10],
            ],
          },
        ],
        vias: [{ atMm: [60, 10], fromLayer: 'GND', toLayer: 'TOP', drillMm: 0.3 }],
        pins: [
          { name: 'R1.1', atMm: [30, 10], layer: 'TOP' },
          { name: 'U1.3', atMm: [10, 10], layer: 'TOP' },
          { name: 'U2.7', atMm: [60, 10], layer: 'TOP' },
        ],
      },
      {
        name: 'DATA0',
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.15,
            pointsMm: [
              [10, 20],
              [40, 20],
              [40, 30],
            ],
          },
        ],
        pins: [
          { name: 'U1.4', atMm: [10, 20], layer: 'TOP' },
          { name: 'J1.2', atMm: [40, 30], layer: 'TOP' },
        ],
      },
      { name: 'GND', pins: [{ name: 'U1.8', atMm: [12, 14], layer: 'GND' }] },
    ],
    waveforms: [
      { name: 'clk', kind: 'trapezoid', frequencyMhz: 25, lowV: 0, highV: 3.3, riseNs: 1, fallNs: 1.5 },
      {
        name: 'pw',
        kind: 'piecewise',
        periodNs: 2000,
        pointsNsA: [
          [0, 0],
          [5, 12],
          [900, 12],
          [905, 0],
        ],
      },
    ],
    drives: [{ net: 'CLK', pin: 'U1.3', waveform: 'clk', sourceOhm: 25 }],
    loads: [{ net: 'CLK', pin: 'U2.7', resistanceOhm: 1e6, capacitancePf: 5 }],
    loops: [
      {
        name: 'converter loop',
        pointsMm: [
          [0, 0, 0.2],
          [6, 0, 0.2],
          [6, 4, 0.2],
          [0, 4, 0.2],
        ],
        waveform: 'pw',
      },
    ],
    cables: [
      {
        name: 'valve cable',
        pointsMm: [
          [80, 25, 0],
          [180, 25, 0],
          [180, 25, -700],
        ],
        radiusMm: 1.5,
      },
    ],
  } satisfies BoardFileInput as BoardFileInput);
}
