import { describe, expect, it } from 'vitest';
import { type EndingTrace, endKinds, traceEndM } from '../../app/emitters/trace-end.ts';
import { buildNetGraph } from '../../app/network/net-graph.ts';
import { ETA0_OHM } from '../../app/units/constants.ts';
import { chargedWire } from '../support/charged-wire.ts';
import { boardOf } from '../support/small-boards.ts';

const OPEN = { isOpen: true, hasTerminal: false } as const;
const PIN = { isOpen: true, hasTerminal: true } as const;

/** Round wire of radius a at height 1 in air; a strip of width 4a has the same field (C. A. Balanis, Antenna Theory, table 9.3). */
const wire = (ratio: number): EndingTrace => ({
  widthM: 4 / ratio,
  heightM: 1,
  epsilonR: 1,
  z0Ohm: (ETA0_OHM / (2 * Math.PI)) * Math.acosh(ratio),
  epsilonEff: 1,
});

describe('charge of a trace’s end', () => {
  it.each([8, 12.5, 20, 40])('round wire, h/a = %f: open, and with a terminal, as the thin-wire solution', (ratio) => {
    // 0.05 h of line is 0.04 dB on a line of ten heights; without the end 0.2 to 0.55 h would be missing.
    expect(Math.abs(traceEndM(wire(ratio), OPEN) - chargedWire(ratio, 'open').endM)).toBeLessThan(0.05);
    expect(Math.abs(traceEndM(wire(ratio), PIN) - chargedWire(ratio, 'terminal').endM)).toBeLessThan(0.06);
  });

  it.each([
    [9.8, 1, 6.579],
    [4.3, 2, 3.275],
    [4.3, 0.5, 2.99],
  ])('strip on ε_r %f, w/h = %f: as an older formula has it', (epsilonR, ratio, epsilonEff) => {
    // Δl/h = 0.412 (ε_eff + 0.3)(w/h + 0.264)/((ε_eff − 0.258)(w/h + 0.8)): E. Hammerstad, European Microwave Conference 1975
    // (from memory), stated there as good to 5 %.
    const older = (0.412 * (epsilonEff + 0.3) * (ratio + 0.264)) / ((epsilonEff - 0.258) * (ratio + 0.8));
    const h = 0.3e-3;
    const own = traceEndM({ widthM: ratio * h, heightM: h, epsilonR, z0Ohm: 50, epsilonEff }, OPEN);
    expect(Math.abs(own / h / older - 1)).toBeLessThan(0.05);
  });

  it('a wide trace’s terminal keeps the charge of a piece with h/a = 8; nothing ends where a trace goes on', () => {
    const wide: EndingTrace = { widthM: 2e-3, heightM: 1e-3, epsilonR: 4.3, z0Ohm: 49.19, epsilonEff: 3.275 };
    const piece = traceEndM(wide, { isOpen: false, hasTerminal: true });
    // Z0 in air over 60 Ω · acosh 8 = 166 Ω.
    expect(piece / 0.22e-3).toBeCloseTo((49.19 * Math.sqrt(3.275)) / 165.98, 3);
    expect(traceEndM(wide, PIN)).toBeCloseTo(piece + traceEndM(wide, OPEN), 12);
    expect(traceEndM(wide, { isOpen: false, hasTerminal: false })).toBe(0);
  });

  it('outside the published range it stays at its border; refuses what is no trace', () => {
    const over = (widthM: number) => traceEndM({ ...wire(20), widthM }, OPEN);
    expect(over(1e-6)).toBe(over(0.01));
    expect(over(1e4)).toBe(over(100));
    expect(() => traceEndM({ ...wire(20), heightM: 0 }, OPEN)).toThrow(/heightM must be a positive finite number/);
  });
});

describe('what the ends of a net meet', () => {
  const { nets } = boardOf({
    format: 'quietboard-board',
    version: 1,
    name: 'ends',
    outline: [
      {
        pointsMm: [
          [0, 0],
          [60, 0],
          [60, 40],
          [0, 40],
        ],
      },
    ],
    stackup: [
      { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
      { name: 'D', kind: 'dielectric', thicknessMm: 1, epsilonR: 4 },
      { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
    ],
    nets: [
      {
        name: 'S',
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.2,
            pointsMm: [
              [10, 10],
              [30, 10],
              [50, 10],
            ],
          },
          {
            layer: 'TOP',
            widthMm: 0.2,
            pointsMm: [
              [30, 10],
              [30, 30],
            ],
          },
        ],
        vias: [{ atMm: [50, 10], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 0.3 }],
        pins: [
          { name: 'U1.1', atMm: [10, 10], layer: 'TOP' },
          { name: 'U2.1', atMm: [30, 10], layer: 'TOP' },
          { name: 'V', atMm: [50, 10], layer: 'BOT' },
        ],
      },
    ],
  });

  it('pin at an end, pin on the way, stub, via', () => {
    const graph = buildNetGraph(nets[0]!);
    const terminals = new Set(['U1.1', 'U2.1'].map((pin) => graph.pinNodes.get(pin)!));
    const kinds = endKinds(graph, terminals);
    const at = (xMm: number, yMm: number) =>
      graph.segments.flatMap((segment, i) =>
        ([segment.fromM, segment.toM] as const).flatMap(([x, y], end) =>
          Math.hypot(x - xMm / 1e3, y - yMm / 1e3) < 1e-6 ? [kinds[i]![end]!] : [],
        ),
      );
    expect(at(10, 10)).toEqual([PIN]);
    expect(at(30, 30)).toEqual([OPEN]);
    // Three traces meet: no open end, and one piece down to the plane.
    expect(at(30, 10).map(({ isOpen }) => isOpen)).toEqual([false, false, false]);
    expect(at(30, 10).filter(({ hasTerminal }) => hasTerminal)).toHaveLength(1);
    expect(at(50, 10)).toEqual([{ isOpen: false, hasTerminal: false }]);
  });
});
