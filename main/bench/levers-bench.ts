import { boardFileSchema } from '../../app/board/board-file.ts';
import { toBoard } from '../../app/board/to-board.ts';
import { estimate } from '../../app/estimate/estimate.ts';
import { type LeverRequest, prepareLevers } from '../../app/levers/levers.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import type { BenchResult } from './bench-result.ts';
import { generatedBoard } from './generated-board.ts';

const NETS = 60;
const SEGMENTS = 10;
const TRIES = 5;

/** Another series resistor and load on every net of a board with 60 driven nets, 40 harmonics, trace pairs only: against estimating it again. */
export function leversBench(): BenchResult {
  const file = generatedBoard({ widthMm: 160, heightMm: 100, nets: NETS, segmentsPerNet: SEGMENTS });
  const { board } = toBoard(boardFileSchema.parse(file));
  const request: LeverRequest = {
    limits: chooseLimits({ standard: 'CISPR 32', class: 'B', distanceM: 3, convertDistance: false }),
    site: { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' },
    structure: 'pair-only',
    requiredMarginDb: 0,
  };
  const before = performance.now();
  const levers = prepareLevers(board, request);
  const prepareSeconds = (performance.now() - before) / 1000;
  let seconds = 0;
  for (let i = 1; i <= TRIES; i++) {
    const changed = {
      ...board,
      drives: board.drives.map((drive) => ({ ...drive, seriesOhm: 11 * i })),
      loads: board.loads.map((load) => ({ ...load, capacitanceF: load.capacitanceF * (1 + i / 4) })),
    };
    const started = performance.now();
    const answer = levers.try(changed, request);
    seconds += (performance.now() - started) / 1000 / TRIES;
    if ('needsSolve' in answer) throw new Error(answer.needsSolve);
  }
  const peakMb = process.resourceUsage().maxRSS / 1024;
  const started = performance.now();
  const { points } = estimate(board, { ...request, boardSha256: '', programVersion: '', notes: [] });
  const freshSeconds = (performance.now() - started) / 1000;
  return {
    name: `levers: every driver and load of ${NETS} nets changed, ${points.length} points`,
    seconds,
    ratio: freshSeconds / seconds,
    peakMb,
    detail: {
      'prepared in, s': Number(prepareSeconds.toFixed(2)),
      'kept, MB': Math.round(levers.keptBytes / 2 ** 20),
    },
  };
}
