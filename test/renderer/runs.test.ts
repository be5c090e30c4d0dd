import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { AppError } from '../../app/errors.ts';
import { getState, type RunSummary } from '../../renderer/state/app-store.ts';
import { NOTICE_MS, notices } from '../../renderer/state/notices.ts';
import { deleteRun, finishDeletes, refreshRuns } from '../../renderer/state/runs.ts';
import { FakeHost } from './fake-host.ts';
import { openDocument } from './open-document.ts';

/** Oracle: a deleted run can be had back for as long as the notice stands, and is gone for good after it. */

let host: FakeHost;
let stored: number[];

const rowOf = (run: number): RunSummary => ({
  run,
  startedAt: '2026-01-02T03:04:05Z',
  board: 'Orchard valve controller',
  revision: 'B',
  layoutSha256: '',
  sourcesSha256: '',
  standard: 'CISPR 32',
  class: 'B',
  distanceM: 3,
  requiredMarginDb: 0,
  structure: 'solved',
  worst: null,
  verdict: 'meets',
  programVersion: '0',
  note: '',
});

const shown = () => getState().runs.map(({ run }) => run);

beforeEach(async () => {
  vi.useFakeTimers();
  stored = [1, 2, 3];
  host = new FakeHost({
    'runs.list': () => ({ runs: stored.map(rowOf) }),
    'runs.delete': ({ run }) => {
      stored = stored.filter((other) => other !== run);
      return {};
    },
  });
  openDocument();
  await refreshRuns();
});

afterEach(() => {
  for (const { key } of notices.visibleToasts) notices.close(key);
  vi.useRealTimers();
});

/** The region on the page starts the notices' clocks; here nobody is the page. */
async function letTimePass(ms: number): Promise<void> {
  notices.resumeAll();
  await vi.advanceTimersByTimeAsync(ms);
}

describe('deleting a run', () => {
  it('takes it out of the list at once, and off the project when the notice has gone', async () => {
    deleteRun(2);
    expect(shown()).toEqual([3, 1]);
    await letTimePass(NOTICE_MS - 1);
    expect(stored).toEqual([1, 2, 3]);
    await refreshRuns();
    expect(shown()).toEqual([3, 1]);
    await letTimePass(2);
    expect(stored).toEqual([1, 3]);
    expect(shown()).toEqual([3, 1]);
  });

  it('is undone by the notice’s button', async () => {
    deleteRun(2);
    const { key, content } = notices.visibleToasts[0]!;
    content.action!.run();
    notices.close(key);
    await letTimePass(2 * NOTICE_MS);
    expect(host.inputs('runs.delete')).toHaveLength(0);
    expect(shown()).toEqual([3, 2, 1]);
  });

  it('is finished before its project is closed', async () => {
    deleteRun(1);
    deleteRun(3);
    await finishDeletes();
    expect(stored).toEqual([2]);
    expect(notices.visibleToasts).toHaveLength(0);
  });

  it('says so when the host cannot, and shows the run again', async () => {
    host.answer({
      'runs.delete': () => {
        throw new AppError('file', 'the project is read only');
      },
    });
    deleteRun(2);
    await letTimePass(NOTICE_MS + 1);
    expect(notices.visibleToasts.map(({ content }) => content.text)).toEqual(['Run 2: the project is read only']);
    expect(shown()).toEqual([3, 2, 1]);
  });
});
