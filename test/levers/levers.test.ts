import { expect, test } from 'vitest';
import { estimate } from '../../app/estimate/estimate.ts';
import { prepareLevers } from '../../app/levers/levers.ts';
import { driveFile, drivenBoard, netFile, requestOf } from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';

const clock = { name: 'clk', kind: 'trapezoid' as const, frequencyMhz: 66, lowV: 0, highV: 3.3, dutyPercent: 47, riseNs: 1, fallNs: 1.2 };

test.each(['pair-only', 'solved'] as const)('try, %s', (structure) => {
  const file = drivenBoard([netFile('A')], [driveFile('A', 'clk')], [clock]);
  const board = boardOf(file);
  const request = requestOf({ request: { structure } });
  const levers = prepareLevers(board, request);
  for (const changed of [board, { ...board, drives: board.drives.map((d) => ({ ...d, seriesOhm: 47 })) }, { ...board, loads: board.loads.map((l) => ({ ...l, resistanceOhm: 1e5, capacitanceF: 7e-12 })) }]) {
    const answer = levers.try(changed, request);
    if ('needsSolve' in answer) throw new Error(answer.needsSolve);
    const fresh = estimate(changed, request);
    for (const [i, p] of fresh.points.entries()) {
      const q = answer.points[i]!;
      console.log(p.frequencyHz / 1e6, p.levelDbuvPerM.toFixed(3), q.levelDbuvPerM - p.levelDbuvPerM, q.horizontalDbuvPerM - p.horizontalDbuvPerM, q.turntableDeg - p.turntableDeg, q.antennaHeightM - p.antennaHeightM, JSON.stringify(q.contributors), JSON.stringify(p.contributors));
    }
    expect(answer.verdict).toBe(fresh.verdict);
  }
});
