import fc from 'fast-check';
import { expect } from 'vitest';
import type { Board, Waveform } from '../../app/board/board.ts';
import { estimate } from '../../app/estimate/estimate.ts';
import type { EstimateRequest } from '../../app/estimate/estimate-request.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { type LeverAnswer, type LeverRequest, type Levers, prepareLevers } from '../../app/levers/levers.ts';

type Told = Exclude<LeverAnswer, { needsSolve: string }>;

/** Points of a board's sources, which must not need anything solved. */
export function told(answer: LeverAnswer): Told {
  if ('needsSolve' in answer) throw new Error(`needs solving: ${answer.needsSolve}`);
  return answer;
}

const keyOf = ({ frequencyHz, detector }: ResultPoint): string => `${Math.round(frequencyHz)} ${detector}`;

/**
 * Holds what the levers say of a changed board against a fresh estimate of it.
 *
 * `levelDb`: where the currents are solved at every line both ways sum the same elements, at places that differ by what the
 * searches leave (single precision here, golden section there): at a maximum that counts by its square. Contributors are compared against
 * the point's own field, since one of them changes with the place in the first order.
 */
export function expectFresh(levers: Levers, changed: Board, request: EstimateRequest, levelDb = 1e-5): void {
  const answer = told(levers.try(changed, request));
  const fresh = estimate(changed, request);
  const byKey = new Map(answer.points.map((point) => [keyOf(point), point]));
  expect(answer.points).toHaveLength(fresh.points.length);
  for (const point of fresh.points) {
    const own = byKey.get(keyOf(point))!;
    const far = (one: number, other: number) => Math.abs(one - other);
    expect(far(own.levelDbuvPerM, point.levelDbuvPerM), `level at ${keyOf(point)}`).toBeLessThan(levelDb);
    expect(far(own.horizontalDbuvPerM, point.horizontalDbuvPerM), `horizontal at ${keyOf(point)}`).toBeLessThan(
      levelDb,
    );
    expect(far(own.verticalDbuvPerM, point.verticalDbuvPerM), `vertical at ${keyOf(point)}`).toBeLessThan(levelDb);
    expect(own.marginDb).toBeCloseTo(own.limitDbuvPerM - own.levelDbuvPerM, 12);
    if (levelDb > 1e-4) continue;
    expect(own.polarization).toBe(point.polarization);
    expect(far(own.upperBoundDbuvPerM, point.upperBoundDbuvPerM)).toBeLessThan(0.01);
    const field = (db: number) => 10 ** (db / 20);
    const parts = new Map(own.contributors.map((contributor) => [contributor.kind + contributor.name, contributor]));
    expect(parts.size).toBe(point.contributors.length);
    for (const { kind, name, levelDbuvPerM, viaDbuvPerM } of point.contributors) {
      const part = parts.get(kind + name)!;
      const whole = field(point.upperBoundDbuvPerM);
      expect(Math.abs(field(part.levelDbuvPerM) - field(levelDbuvPerM)) / whole).toBeLessThan(1e-3);
      expect(Object.keys(part.viaDbuvPerM)).toEqual(Object.keys(viaDbuvPerM));
      for (const [via, db] of Object.entries(viaDbuvPerM)) {
        expect(Math.abs(field(part.viaDbuvPerM[via]!) - field(db)) / whole).toBeLessThan(1e-3);
      }
    }
  }
  expect(answer.verdict).toBe(fresh.verdict);
  expect(answer.worst?.marginDb ?? 0).toBeCloseTo(fresh.worst?.marginDb ?? 0, levelDb > 1e-4 ? 0 : 4);
}

/** Numbers from 0 to 1, by which a board's sources are changed. */
export const dials = fc.array(
  fc.integer({ min: 0, max: 1000 }).map((value) => value / 1000),
  {
    minLength: 40,
    maxLength: 40,
  },
);

/** The board with every waveform, driver and load turned by the dials; fundamentals, pins and which waveform drives what stay. */
export function turned(board: Board, values: readonly number[]): Board {
  let next = 0;
  const dial = (low: number, high: number) => low + (high - low) * values[next++ % values.length]!;
  const flag = () => dial(0, 1) > 0.5;
  return {
    ...board,
    waveforms: board.waveforms.map((waveform) => turnedWaveform(waveform, dial, flag)),
    drives: board.drives.map((drive) => ({
      ...drive,
      sourceOhm: dial(1, 80),
      seriesOhm: dial(0, 100),
      delayS: dial(0, 6e-9),
      isInverted: flag(),
    })),
    loads: board.loads.map(({ resistanceOhm: _, ...load }) => ({
      ...load,
      capacitanceF: flag() ? dial(0, 20e-12) : 0,
      ...(flag() ? { resistanceOhm: 10 ** dial(1, 6) } : {}),
    })),
    loops: board.loops.map((loop) => ({ ...loop, delayS: dial(0, 5e-9), isInverted: flag() })),
  };
}

function turnedWaveform(
  waveform: Waveform,
  dial: (low: number, high: number) => number,
  flag: () => boolean,
): Waveform {
  const clockDomain = flag() ? 'one clock' : `clock of ${waveform.name}`;
  if (waveform.kind !== 'trapezoid') return { ...waveform, clockDomain };
  const edges = { rise1090S: dial(0.3e-9, 3e-9), fall1090S: dial(0.3e-9, 3e-9) };
  return { ...waveform, clockDomain, high: dial(1, 5), dutyRatio: dial(0.2, 0.7), ...edges };
}

/** Holds a number of turned boards, one after the other with the same kept responses, against fresh estimates. */
export function expectFreshWhenTurned(board: Board, request: EstimateRequest, runs: number): void {
  const levers = prepareLevers(board, request as LeverRequest);
  expectFresh(levers, board, request);
  fc.assert(
    fc.property(dials, (values) => expectFresh(levers, turned(board, values), request)),
    { seed: 20261205, numRuns: runs, endOnFailure: true },
  );
  // And back: nothing of the changes is left.
  expectFresh(levers, board, request);
}
