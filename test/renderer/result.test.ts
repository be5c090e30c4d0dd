import { beforeEach, describe, expect, it, vi } from 'vitest';
import { AppError } from '../../app/errors.ts';
import { getState, setState } from '../../renderer/state/app-store.ts';
import { editSettings, undo } from '../../renderer/state/document.ts';
import {
  discardChanges,
  estimate,
  keepForComparison,
  shownOf,
  showTrial,
  stop,
  takePoints,
} from '../../renderer/state/result.ts';
import { sampleResult } from '../support/sample-result.ts';
import { FakeHost, later } from './fake-host.ts';
import { openDocument, present, WORK } from './open-document.ts';

/** Oracle: the rules of the interface's brief: what is shown always says what it belongs to. */

const RESULT = sampleResult();
let host: FakeHost;

beforeEach(() => {
  host = new FakeHost({
    'estimate.run': () => ({ result: structuredClone(RESULT) as never, run: 7 }),
    'runs.list': () => ({ runs: [] }),
    'job.stop': () => ({ wasRunning: true }),
  });
  openDocument();
});

const shown = () => shownOf(getState());

describe('a result', () => {
  it('belongs to what it was made of: outdated after a change, in date again when the change is undone', async () => {
    await estimate();
    expect(shown()).toMatchObject({ source: 'result', isOutdated: false });
    expect(getState().result!.run).toBe(7);
    editSettings('Distance', { distanceM: 10 });
    expect(shown()!.isOutdated).toBe(true);
    undo();
    expect(shown()!.isOutdated).toBe(false);
    editSettings('Distance', { distanceM: 10 });
    editSettings('Distance', { distanceM: WORK.settings.distanceM });
    expect(shown()!.isOutdated).toBe(false);
  });

  it('is outdated at once when the document changed while it was being made', async () => {
    const { promise, resolve } = later<never>();
    host.answer({ 'estimate.run': () => promise });
    const done = estimate();
    editSettings('Distance', { distanceM: 10 });
    resolve({ result: RESULT, run: 7 } as never);
    await done;
    expect(shown()!.isOutdated).toBe(true);
  });

  it('chooses the worst line, or keeps the chosen one where the new result has it', async () => {
    await estimate();
    expect(getState().selection.lineHz).toBe(RESULT.worst!.frequencyHz);
    const other = RESULT.points.at(-1)!.frequencyHz;
    setState(({ selection }) => ({ selection: { ...selection, lineHz: other } }));
    await estimate();
    expect(getState().selection.lineHz).toBe(other);
  });

  it('shows lines as they come, and none of a stopped estimate', async () => {
    const { promise, reject } = later<never>();
    host.answer({ 'estimate.run': () => promise });
    const done = estimate();
    const jobId = getState().jobs[0]!.id;
    takePoints({ jobId, points: RESULT.points.slice(0, 2) });
    takePoints({ jobId, points: RESULT.points.slice(2, 3) });
    takePoints({ jobId: 'of another window', points: RESULT.points });
    expect(shown()).toMatchObject({ source: 'partial', verdict: null });
    expect(shown()!.points).toEqual(RESULT.points.slice(0, 3));
    await stop();
    expect(host.inputs('job.stop')).toEqual([{ jobId }]);
    expect(getState().jobs[0]!.isStopping).toBe(true);
    reject(new AppError('cancelled', 'stopped'));
    await done;
    expect(shown()).toBeNull();
    expect(getState().failure).toBeNull();
    expect(getState().jobs).toHaveLength(0);
  });

  it('says in words why there is none', async () => {
    host.answer({
      'estimate.run': () => {
        throw new AppError('input', 'no net is driven');
      },
    });
    await estimate();
    expect(getState().failure).toBe('no net is driven');
  });

  it('gives way to a quick answer for as long as the document is the one that was answered', async () => {
    await estimate();
    keepForComparison();
    editSettings('Required margin', { requiredMarginDb: 3 });
    const { points, worst, verdict } = RESULT;
    showTrial({ points, worst, verdict, work: present() });
    expect(shown()).toMatchObject({ source: 'trial', isOutdated: false });
    editSettings('Required margin', { requiredMarginDb: 4 });
    expect(shown()).toMatchObject({ source: 'result', isOutdated: true });
  });

  it('of the kept state comes back when the change is let go', async () => {
    await estimate();
    const kept = getState().result;
    keepForComparison();
    editSettings('Distance', { distanceM: 10 });
    await estimate();
    discardChanges();
    expect(getState().result).toBe(kept);
    expect(getState().kept).toBeNull();
    expect(shown()!.isOutdated).toBe(false);
    undo();
    expect(present().settings.distanceM).toBe(10);
  });

  it('keeps one identity while nothing of it changed, so that views are not drawn again', async () => {
    await estimate();
    const before = shown();
    setState({ hover: { lineHz: 1e8, net: null, cable: null, piece: null } });
    expect(shown()).toBe(before);
    await vi.waitFor(() => expect(getState().jobs).toHaveLength(0));
  });
});
