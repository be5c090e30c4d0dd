import type { BoardFileInput } from '../../app/board/board-file.ts';
import { seeded } from './seeded.ts';

export interface GeneratedSize {
  readonly widthMm: number;
  readonly heightMm: number;
  readonly nets: number;
  readonly segmentsPerNet: number;
}

/**
 * A made-up four-layer board whose nets are staircases of short segments over a solid ground, each driven at 25 MHz with
 * its own delay, edge and load. 25 MHz has 40 harmonics up to 1 GHz.
 */
export function generatedBoard({ widthMm, heightMm, nets, segmentsPerNet }: GeneratedSize): BoardFileInput {
  const random = seeded(20261201);
  const between = (low: number, high: number) => low + (high - low) * random();
  const list = Array.from({ length: nets }, (_, i) => {
    let x = between(0.1, 0.9) * widthMm;
    let y = between(0.1, 0.9) * heightMm;
    const pointsMm: [number, number][] = [[x, y]];
    for (let s = 0; s < segmentsPerNet; s++) {
      const step = between(2, 6) * (random() < 0.5 ? -1 : 1);
      if (s % 2 === 0) x = Math.min(widthMm - 2, Math.max(2, x + step));
      else y = Math.min(heightMm - 2, Math.max(2, y + step));
      const [lastX, lastY] = pointsMm.at(-1)!;
      if (Math.hypot(x - lastX, y - lastY) < 0.5) {
        if (s % 2 === 0) x += x > widthMm / 2 ? -3 : 3;
        else y += y > heightMm / 2 ? -3 : 3;
      }
      pointsMm.push([x, y]);
    }
    return { name: `N${i + 1}`, pointsMm };
  });
  return {
    format: 'quietboard-board',
    version: 1,
    name: 'Generated bench board',
    revision: '1',
    outline: [
      {
        pointsMm: [
          [0, 0],
          [widthMm, 0],
          [widthMm, heightMm],
          [0, heightMm],
        ],
      },
    ],
    stackup: [
      { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
      { name: 'D1', kind: 'dielectric', thicknessMm: 0.2, epsilonR: 4.3, lossTangent: 0.02 },
      { name: 'GND', kind: 'copper', thicknessMm: 0.018 },
    ],
    planes: [{ layer: 'GND', net: 'GND' }],
    nets: list.map(({ name, pointsMm }) => ({
      name,
      traces: [{ layer: 'TOP', widthMm: 0.2, pointsMm }],
      pins: [
        { name: `U${name}.1`, atMm: pointsMm[0]!, layer: 'TOP' },
        { name: `V${name}.1`, atMm: pointsMm.at(-1)!, layer: 'TOP' },
      ],
    })),
    waveforms: [0.7, 1, 1.5, 2].map((edgeNs, i) => ({
      name: `w${i}`,
      kind: 'trapezoid' as const,
      frequencyMhz: 25,
      lowV: 0,
      highV: 3.3,
      dutyPercent: 47,
      riseNs: edgeNs,
      fallNs: edgeNs * 1.1,
      clockDomain: `domain ${i}`,
    })),
    drives: list.map(({ name }, i) => ({
      net: name,
      pin: `U${name}.1`,
      waveform: `w${i % 4}`,
      sourceOhm: between(15, 60),
      delayNs: between(0, 40),
    })),
    loads: list.map(({ name }) => ({ net: name, pin: `V${name}.1`, capacitancePf: between(2, 8) })),
  };
}
