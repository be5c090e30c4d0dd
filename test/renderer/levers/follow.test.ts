import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Input } from '../../../app/contract/procedures.ts';
import { AppError } from '../../../app/errors.ts';
import { prepare, startFollowing, useLevers } from '../../../renderer/levers/follow.ts';
import { changedLayout } from '../../../renderer/levers/same-copper.ts';
import { getState, setState, subscribe } from '../../../renderer/state/app-store.ts';
import { editSources, undo } from '../../../renderer/state/document.ts';
import { shownOf } from '../../../renderer/state/result.ts';
import { sampleResult } from '../../support/sample-result.ts';
import { FakeHost, later } from '../fake-host.ts';
import { BASE, openDocument, present, WORK } from '../open-document.ts';

/** Oracle: what is shown always belongs to the newest document that was answered; one question at a time. */

const RESULT = sampleResult();
const answer = (marginDb: number) => ({
  points: RESULT.points as never,
  worst: { frequencyHz: 1e8, marginDb },
  verdict: 'meets' as const,
});
const withSeries = (seriesOhm: number) =>
  editSources('Series', (sources) => ({
    ...sources,
    drives: sources.drives!.map((drive) => ({ ...drive, seriesOhm })),
  }));
const seriesOf = (input: Input<'levers.try'>): number => input.sources.drives![0]!.seriesOhm!;
const settled = () =>
  vi.waitFor(() => expect([getState().isTrying, useLevers.getState().answered]).toEqual([false, present()]));

let host: FakeHost;
let stopFollowing: () => void;

beforeEach(async () => {
  host = new FakeHost({
    'levers.prepare': () => ({ leversId: 'kept' }),
    'levers.try': (input) => answer(seriesOf(input)),
    'levers.release': () => ({}),
    'job.stop': () => ({ wasRunning: true }),
  });
  openDocument();
  stopFollowing = startFollowing();
  setState({ result: { result: RESULT, work: WORK, run: 1 } });
  await prepare();
  await settled();
});

afterEach(() => {
  stopFollowing();
  useLevers.setState({ isPreparing: false, prepared: null, needsSolve: null, failure: null, answered: null });
});

describe('the kept responses', () => {
  it('make what is shown the state to compare against, and show an estimated state as estimated', () => {
    expect(getState().kept!.work).toBe(WORK);
    expect(shownOf(getState())).toMatchObject({ source: 'result', isOutdated: false });
  });

  it('answer every change, undo too', async () => {
    withSeries(12);
    expect(shownOf(getState())!.isOutdated).toBe(false);
    await settled();
    expect(shownOf(getState())).toMatchObject({ source: 'trial', worst: { marginDb: 12 } });
    undo();
    await settled();
    expect(shownOf(getState())!.source).toBe('result');
  });

  it('are asked one question at a time, and of those that wait only the newest', async () => {
    const first = later<ReturnType<typeof answer>>();
    host.answer({ 'levers.try': () => first.promise });
    const before = host.inputs('levers.try').length;
    for (const ohm of [1, 2, 3, 4]) withSeries(ohm);
    expect(host.inputs('levers.try')).toHaveLength(before + 1);
    host.answer({ 'levers.try': (input) => answer(seriesOf(input)) });
    first.resolve(answer(1));
    await settled();
    expect(host.inputs('levers.try').slice(before).map(seriesOf)).toEqual([1, 4]);
    expect(shownOf(getState())!.worst!.marginDb).toBe(4);
  });

  it('say what has to be solved, and the last result is then out of date', async () => {
    host.answer({ 'levers.try': () => ({ needsSolve: 'the cables are others' }) });
    withSeries(5);
    await settled();
    expect(useLevers.getState().needsSolve).toEqual({ reason: 'the cables are others', work: present() });
    expect(shownOf(getState())).toMatchObject({ source: 'result', isOutdated: true });
  });

  it('that the host let go are forgotten, so that they are prepared again', async () => {
    host.answer({
      'levers.try': () => {
        throw new AppError('input', 'these responses were let go', 'leversId');
      },
    });
    withSeries(5);
    await vi.waitFor(() => expect(useLevers.getState()).toMatchObject({ prepared: null, failure: null }));
    expect(shownOf(getState())).toMatchObject({ source: 'result', isOutdated: true });
  });

  it('are never between being prepared and being there, where a view would ask for them once more', async () => {
    const gaps: string[] = [];
    const look = () => {
      const { isPreparing, prepared, failure } = useLevers.getState();
      if (!isPreparing && prepared === null && failure === null && getState().jobs.length === 0) gaps.push('gap');
    };
    const ends = [useLevers.subscribe(look), subscribe(look)];
    await prepare();
    for (const end of ends) end();
    expect(gaps).toEqual([]);
    expect(useLevers.getState()).toMatchObject({ isPreparing: false, prepared: { leversId: 'kept' } });
  });

  it('are not wanted after stop, and a failure says why', async () => {
    host.answer({
      'levers.prepare': () => {
        throw new AppError('cancelled', 'stopped');
      },
    });
    await prepare();
    expect(useLevers.getState()).toMatchObject({ prepared: null, failure: { kind: 'stopped' } });
    host.answer({
      'levers.prepare': () => {
        throw new AppError('input', 'too much memory');
      },
    });
    await prepare();
    expect(useLevers.getState().failure).toEqual({ kind: 'failed', message: 'too much memory' });
  });

  it('are let go with their project', () => {
    setState({ project: { ...getState().project!, projectId: 'another' } });
    expect(useLevers.getState().prepared).toBeNull();
    expect(host.inputs('levers.release')).toEqual([{ leversId: 'kept' }]);
  });
});

describe('a layout', () => {
  it('is the same under another revision, and another with another stack or other waveform files', () => {
    const revised = { ...BASE, layout: { ...BASE.layout, revision: 'Z', notes: 'new' } };
    const thicker = {
      ...BASE,
      layout: { ...BASE.layout, stackup: BASE.layout.stackup.map((row) => ({ ...row, thicknessMm: 1 })) },
    };
    const sampled = { ...BASE, samples: { 'a.csv': { timesS: [0, 1], values: [0, 1] } } };
    const bases = new Map(Object.entries({ a: BASE, b: revised, c: thicker, d: sampled }));
    expect(['a', 'b', 'c', 'd'].map((id) => changedLayout(bases, 'a', id))).toEqual([false, false, true, true]);
  });
});
