import { expect, it } from 'vitest';
import { boardFileSchema } from '../../../app/board/board-file.ts';
import { toBoard } from '../../../app/board/to-board.ts';
import { estimate } from '../../../app/estimate/estimate.ts';
import { planEstimate } from '../../../app/estimate/plan.ts';
import { workUnits } from '../../../app/estimate/work-units.ts';
import { chooseLimits } from '../../../app/limits/choose.ts';
import { generatedBoard } from '../../../main/bench/generated-board.ts';

/** The built one: threads run built JavaScript. */
const { runEstimate } = (await import(
  new URL('../../../dist/main/jobs/run-estimate.js', import.meta.url).href
)) as typeof import('../../../main/jobs/run-estimate.ts');

function jobAt(frequencyMhz: number) {
  const file = generatedBoard({ widthMm: 60, heightMm: 40, nets: 3, segmentsPerNet: 4 });
  const waveforms = file.waveforms!.map((waveform) => ({ ...waveform, frequencyMhz }));
  const cables = [
    {
      name: 'cable',
      pointsMm: [
        [60, 20, 0],
        [460, 20, 0],
      ],
    },
  ];
  const { board } = toBoard(boardFileSchema.parse({ ...file, waveforms, cables }));
  const limits = { standard: 'CISPR 32', class: 'B', distanceM: 3, convertDistance: false };
  const request = {
    site: { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' },
    structure: 'solved',
    maxHz: 300e6,
    requiredMarginDb: 0,
    boardSha256: '',
    programVersion: '',
    notes: [],
  } as const;
  return { board, limits, request };
}

it.each([
  // 30–300 MHz hold 11 lines of 25 MHz, each solved, and 136 of 2 MHz, interpolated within two bands.
  [25, 11],
  [2, 2],
])(
  'lines of %f MHz: %i units; the same result to the last bit from one thread, two, three and none',
  async (frequencyMhz, units) => {
    const job = jobAt(frequencyMhz);
    const request = { ...job.request, limits: chooseLimits(job.limits) };
    expect(workUnits(planEstimate(job.board, request)).length).toBe(units);
    const alone = JSON.stringify(estimate(job.board, request));
    for (const threadCount of [1, 2, 3]) {
      expect(JSON.stringify(await runEstimate(job, {}, threadCount)), `${threadCount} threads`).toBe(alone);
    }
  },
);

it('tells progress up to the number of lines, and every level once', async () => {
  const job = jobAt(25);
  const told: number[] = [];
  const found: number[] = [];
  const result = await runEstimate(job, {
    onProgress: (done, total) => told.push(done / total),
    onLevels: (levels) => found.push(...levels.map(({ frequencyHz }) => frequencyHz)),
  });
  expect(told).toEqual([...told].sort((one, other) => one - other));
  expect(told.at(-1)).toBe(1);
  const expected = [...new Set(result.points.map(({ frequencyHz }) => frequencyHz))];
  expect(found.sort((one, other) => one - other)).toEqual(expected.sort((one, other) => one - other));
});

it('ends with "cancelled" when stopped, before and during the work', async () => {
  await expect(runEstimate(jobAt(25), { signal: AbortSignal.abort() })).rejects.toMatchObject({ code: 'cancelled' });
  const stop = new AbortController();
  const running = runEstimate(jobAt(2), { signal: stop.signal, onProgress: () => stop.abort() });
  await expect(running).rejects.toMatchObject({ code: 'cancelled' });
});

it('fails in words when the board cannot be modelled', async () => {
  const job = jobAt(25);
  await expect(runEstimate({ ...job, board: { ...job.board, drives: [] } })).rejects.toMatchObject({
    code: 'input',
    path: 'drives',
  });
});
