import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { appFailure } from '../support/app-failure.ts';
import { driveFile, drivenBoard, estimateOf, linesVoltage, type Mm, netFile, pointAt } from '../support/estimates.ts';

const HZ = 40e6;
const STRAIGHT: Mm[] = [
  [10, 20],
  [50, 20],
];
const board = (more: Partial<BoardFileInput> = {}, net = netFile('A', STRAIGHT)): BoardFileInput =>
  drivenBoard([net], [driveFile('A', 'w')], [linesVoltage('w', [[40, 1]])], more);
const levelOf = (file: BoardFileInput) => pointAt(estimateOf(file), HZ).levelDbuvPerM;
const refusal = (file: BoardFileInput) => appFailure(() => estimateOf(file)).message;
const box = (x1: number, x2: number): Mm[] => [
  [x1, 0],
  [x2, 0],
  [x2, 44],
  [x1, 44],
];
const planeTo = (xMm: number) => board({ planes: [{ layer: 'BOT', net: 'GND', pointsMm: box(0, xMm) }] });

describe('model of a driven net', () => {
  it('source and series resistance add: 12 + 18 Ω drive as 30 Ω', () => {
    const drives = (sourceOhm: number, seriesOhm: number) =>
      board({ drives: [driveFile('A', 'w', { sourceOhm, seriesOhm })] });
    expect(levelOf(drives(12, 18))).toBeCloseTo(levelOf(drives(30, 0)), 9);
    expect(levelOf(drives(12, 0))).toBeGreaterThan(levelOf(drives(30, 0)) + 1);
  });

  it('a short line into a resistance: the level follows the current V/(Rs + RL)', () => {
    const load = (resistanceOhm: number) => board({ loads: [{ net: 'A', pin: 'U2.A', resistanceOhm }] });
    // The loop rules for loads far below the line's 100 Ω; its reactance and the electric moment of what voltage is left make 0.3 dB.
    const drop = levelOf(load(5)) - levelOf(load(15));
    expect(Math.abs(drop - 20 * Math.log10((30 + 15) / (30 + 5)))).toBeLessThan(0.5);
  });

  it('twice the trace’s height over its plane is twice the loop: +6 dB', () => {
    const over = (thicknessMm: number) =>
      board({
        // The line stays the same, so that its current does.
        nets: [{ ...netFile('A', STRAIGHT), z0Ohm: 80, epsilonEff: 2.5 }],
        stackup: [
          { name: 'TOP', kind: 'copper', thicknessMm: 0 },
          { name: 'D', kind: 'dielectric', thicknessMm, epsilonR: 4 },
          { name: 'BOT', kind: 'copper', thicknessMm: 0 },
        ],
      });
    // The ends' charge goes with h²: on 40 mm of line 0.02 dB.
    const excessDb = levelOf(over(0.8)) - levelOf(over(0.4)) - 20 * Math.log10(2);
    expect(excessDb).toBeGreaterThan(-0.005);
    expect(excessDb).toBeLessThan(0.03);
  });

  it('a stated impedance replaces that of the stackup', () => {
    const stated = (z0Ohm: number) => board({}, { ...netFile('A', STRAIGHT), z0Ohm });
    // Open-circuit part of the level: C′ = √ε_eff/(Z0 c) halves when Z0 doubles.
    const open = (z0Ohm: number) => levelOf({ ...stated(z0Ohm), loads: [] });
    expect(open(50) - open(100)).toBeCloseTo(20 * Math.log10(2), 1);
  });

  it('half of the trace may lie past the plane (a gap); more is refused', () => {
    const gap = estimateOf(planeTo(30.1));
    expect(gap.findings.map(({ code }) => code)).toEqual(['plane-gap']);
    expect(gap.findings[0]!.message).toMatch(/no copper of BOT under 19\.9 mm of the trace; there is no way around/);
    expect(refusal(planeTo(29.8))).toMatch(/net A must be over a plane, or given a returnPath.*51 % of its length/);
  });

  it('a piece without any plane takes the return of its neighbour on the layer, and that is found', () => {
    const bent: Mm[] = [
      [5, 20],
      [45, 20],
      [45, 36],
    ];
    const planes = [{ layer: 'BOT', net: 'GND', pointsMm: box(0, 40) }];
    const { points, findings } = estimateOf(board({ planes }, netFile('A', bent)));
    expect(points).toHaveLength(1);
    expect(findings.map(({ message }) => message.match(/under (\S+) mm/)![1])).toEqual(['5.0', '16.0']);
  });

  it('a pin off the copper of its net is refused by name', () => {
    const net = netFile('A', STRAIGHT);
    const pins = [net.pins![0]!, { ...net.pins![1]!, atMm: [50, 25] as Mm }];
    expect(refusal(board({}, { ...net, pins }))).toMatch(/pin U2\.A of net A must be on the copper of its net/);
  });

  it('a trace on the underside over a plane above is the mirror of one on top', () => {
    const stack = (isBelow: boolean): BoardFileInput =>
      board(
        {
          planes: [{ layer: isBelow ? 'TOP' : 'BOT', net: 'GND' }],
          nets: [netFile('A', STRAIGHT, isBelow ? 'BOT' : 'TOP')],
        },
        undefined,
      );
    // The same loop, turned over: its height over the ground differs by 1.2 mm at most, its level by less than 0.02 dB.
    expect(Math.abs(levelOf(stack(true)) - levelOf(stack(false)))).toBeLessThan(0.02);
  });
});
