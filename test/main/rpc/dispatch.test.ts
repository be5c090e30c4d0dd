import { describe, expect, test } from 'vitest';
import { type Handlers, procedures } from '../../../app/contract/procedures.ts';
import { AppError } from '../../../app/errors.ts';
import { createDispatch } from '../../../main/rpc/dispatch.ts';

/** Oracle: the contract (`app/contract`) and the rule that every answer is a `Reply`. */

const logged: unknown[] = [];
const dispatchWith = (own: Partial<Handlers>) =>
  createDispatch(own as Handlers, (where, error) => logged.push([where, error]));

describe('dispatch', () => {
  test('a value comes back as the contract has it', async () => {
    const dispatch = dispatchWith({ 'job.stop': async ({ jobId }) => ({ wasRunning: jobId === 'a' }) });
    expect(await dispatch('job.stop', { jobId: 'a' })).toEqual({ ok: true, value: { wasRunning: true } });
    expect(await dispatch('job.stop', { jobId: 'b' })).toEqual({ ok: true, value: { wasRunning: false } });
  });

  test('defaults are filled in before the handler sees the input', async () => {
    let seen: unknown;
    const dispatch = dispatchWith({
      'report.render': async (input) => {
        seen = input;
        return { name: 'a', mediaType: 'b', bytes: new Uint8Array([1]) };
      },
    });
    const reply = await dispatch('report.render', { projectId: 'p', subject: { kind: 'trend' }, format: 'csv' });
    expect(reply.ok).toBe(true);
    expect(seen).toEqual({
      projectId: 'p',
      subject: { kind: 'trend' },
      format: 'csv',
      paper: 'A4',
      author: '',
      dateText: '',
    });
  });

  test.each([
    ['a missing key', {}, 'jobId', 'jobId must be a text; received nothing'],
    ['another type', { jobId: 3 }, 'jobId', 'jobId must be a text; received 3'],
    ['an empty text', { jobId: '' }, 'jobId', 'jobId must be a text of at least 1 character; received ""'],
    [
      'an unknown key',
      { jobId: 'a', x: 1 },
      'x',
      'x must be left out: this key is not known here (known: jobId); received 1',
    ],
  ])('%s is told with its place', async (_name, input, path, message) => {
    const dispatch = dispatchWith({ 'job.stop': () => expect.unreachable('the handler must not be called') });
    expect(await dispatch('job.stop', input)).toEqual({ ok: false, error: { code: 'input', message, path } });
  });

  test.each([null, undefined, 'text', 3, []])('an input that is no object: %s', async (input) => {
    const reply = await dispatchWith({})('app.info', input);
    expect(reply).toMatchObject({ ok: false, error: { code: 'input' } });
  });

  test.each(['', 'nothing', '__proto__', 'constructor', 'toString', 'valueOf'])('no procedure: "%s"', async (name) => {
    const reply = await dispatchWith({})(name, {});
    expect(reply).toMatchObject({ ok: false, error: { code: 'input', path: 'procedure' } });
  });

  test('a failure in words keeps code, words and place', async () => {
    const dispatch = dispatchWith({
      'job.stop': async () => {
        throw new AppError('busy', 'wait a little', 'here');
      },
    });
    expect(await dispatch('job.stop', { jobId: 'a' })).toEqual({
      ok: false,
      error: { code: 'busy', message: 'wait a little', path: 'here' },
    });
  });

  test.each([
    ['an unforeseen error', new TypeError('secret of /home/me')],
    ['an internal one', new AppError('internal', 'secret of /home/me')],
    ['no error at all', 'secret of /home/me'],
  ])('%s is kept, and only its number told', async (_name, thrown) => {
    logged.length = 0;
    const dispatch = dispatchWith({
      'job.stop': async () => {
        throw thrown;
      },
    });
    const reply = await dispatch('job.stop', { jobId: 'a' });
    expect(reply).toMatchObject({ ok: false, error: { code: 'internal' } });
    expect(JSON.stringify(reply)).toContain('number 1;');
    expect(JSON.stringify(reply)).not.toContain('secret');
    expect(logged).toEqual([['job.stop', thrown]]);
  });

  test('a handler that throws at once is no other case', async () => {
    const dispatch = dispatchWith({
      'job.stop': () => {
        throw new AppError('file', 'x: gone');
      },
    });
    expect(await dispatch('job.stop', { jobId: 'a' })).toEqual({
      ok: false,
      error: { code: 'file', message: 'x: gone' },
    });
  });

  test('an answer that breaks the contract is our failure, not the caller’s data', async () => {
    logged.length = 0;
    const dispatch = dispatchWith({ 'job.stop': async () => ({ wasRunning: 'perhaps' }) as never });
    const reply = await dispatch('job.stop', { jobId: 'a' });
    expect(reply).toMatchObject({ ok: false, error: { code: 'internal' } });
    expect(String(logged)).toContain('the answer of job.stop breaks its contract');
  });
});

test('long procedures can be stopped: all that report progress take a job id', () => {
  const withJob = Object.entries(procedures)
    .filter(([, { input }]) => 'jobId' in input.shape)
    .map(([name]) => name);
  expect(withJob.sort()).toEqual([
    'board.open',
    'estimate.line-detail',
    'estimate.run',
    'job.stop',
    'levers.prepare',
    'validate.run',
  ]);
});
