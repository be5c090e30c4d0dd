import { expect, test } from 'vitest';
import { AppError } from '../../../app/errors.ts';
import { EventBus } from '../../../main/rpc/event-bus.ts';
import { type JobControl, RunningJobs } from '../../../main/rpc/running-jobs.ts';

/** Oracle: the contract's words on long procedures, and the brief's ten messages a second. */

function jobs() {
  const events = new EventBus();
  const told: { name: string; payload: unknown }[] = [];
  events.subscribe((name, payload) => told.push({ name, payload }));
  return { jobs: new RunningJobs(events), told };
}

/** Work that goes on until it is stopped. */
const untilStopped = ({ signal }: JobControl): Promise<never> =>
  new Promise((_, reject) => signal.addEventListener('abort', () => reject(new Error('thread ended'))));

test('a value comes through; the id is free again', async () => {
  const { jobs: running } = jobs();
  expect(await running.run('a', async () => 1)).toBe(1);
  expect(await running.run('a', async () => 2)).toBe(2);
  expect(running.count).toBe(0);
});

test('a stopped job fails as cancelled, whatever its work makes of it', async () => {
  const { jobs: running } = jobs();
  const failing = running.run('a', untilStopped);
  const finishing = running.run('b', async ({ signal }) => {
    await new Promise((resolve) => signal.addEventListener('abort', resolve));
    return 'done all the same';
  });
  expect(running.stop('a')).toBe(true);
  expect(running.stop('b')).toBe(true);
  await expect(failing).rejects.toMatchObject({ code: 'cancelled' });
  await expect(finishing).rejects.toMatchObject({ code: 'cancelled' });
  expect(running.stop('a')).toBe(false);
});

test('a failure that was no stop stays what it is', async () => {
  const { jobs: running } = jobs();
  const failure = new AppError('input', 'wrong');
  await expect(running.run('a', () => Promise.reject(failure))).rejects.toBe(failure);
});

test('one id runs once, and not without end', async () => {
  const { jobs: running } = jobs();
  const all = Array.from({ length: 12 }, (_, i) => running.run(String(i), untilStopped));
  await expect(running.run('3', async () => 1)).rejects.toMatchObject({ code: 'busy' });
  await expect(running.run('more', async () => 1)).rejects.toMatchObject({ code: 'busy' });
  await running.stopAll();
  expect((await Promise.allSettled(all)).map(({ status }) => status)).toEqual(all.map(() => 'rejected'));
  expect(await running.run('more', async () => 1)).toBe(1);
});

test('progress: at most ten a second, a new stage and the end always', async () => {
  const { jobs: running, told } = jobs();
  await running.run('a', async ({ onProgress }) => {
    const untilMs = performance.now() + 350;
    for (let done = 0; performance.now() < untilMs; done++) onProgress('first', done, 1e12);
    onProgress('second', 0, 2);
    onProgress('second', 1, 2);
    onProgress('second', 2, 2);
  });
  const stages = told.map(({ payload }) => payload as { stage: string; done: number });
  // 350 ms: at 0, 100, 200, 300.
  expect(stages.filter(({ stage }) => stage === 'first').length).toBeLessThanOrEqual(4);
  expect(stages.filter(({ stage }) => stage === 'first').length).toBeGreaterThanOrEqual(2);
  expect(stages.filter(({ stage }) => stage === 'second').map(({ done }) => done)).toEqual([0, 2]);
});

test('a stopped job says nothing more', async () => {
  const { jobs: running, told } = jobs();
  const job = running.run('a', async ({ signal, onProgress, onPoints }) => {
    await new Promise((resolve) => signal.addEventListener('abort', resolve));
    onProgress('late', 1, 2);
    onPoints([{} as never]);
  });
  running.stop('a');
  expect((await job.catch((error: unknown) => error)) instanceof AppError).toBe(true);
  expect(told).toEqual([]);
});
