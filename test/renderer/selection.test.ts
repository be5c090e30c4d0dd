import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { LineDetail } from '../../app/contract/line-detail.ts';
import { AppError } from '../../app/errors.ts';
import { getState, setState } from '../../renderer/state/app-store.ts';
import {
  clearSelection,
  selectLine,
  selectNet,
  selectPiece,
  stepBackSelection,
  stepLine,
} from '../../renderer/state/selection.ts';
import { sampleResult } from '../support/sample-result.ts';
import { FakeHost, later } from './fake-host.ts';
import { openDocument, WORK } from './open-document.ts';

/** Oracle: what must be on the screen and what the host may be asked for, written out. */

const RESULT = sampleResult();
const FREQUENCIES_HZ = [...new Set(RESULT.points.map(({ frequencyHz }) => frequencyHz))].sort((a, b) => a - b);
const WAIT_MS = 200;

let host: FakeHost;

function detailAt(frequencyHz: number): LineDetail {
  const pattern = { horizontalDbuvPerM: [30], verticalDbuvPerM: [31] };
  return {
    frequencyHz,
    polarization: 'vertical',
    antennaHeightM: 1,
    turntableDeg: 0,
    levelDbuvPerM: 31,
    azimuth: { turntableDeg: [0], ...pattern },
    height: { antennaHeightM: [1], ...pattern },
    pieces: [{ net: 'CLK', layer: 'TOP', fromM: [0, 0, 0], toM: [0.01, 0, 0], levelDbuvPerM: 31, currentRmsA: 0.001 }],
    currentMap: null,
  };
}

beforeEach(() => {
  vi.useFakeTimers();
  host = new FakeHost({
    'estimate.line-detail': ({ frequencyHz }) => ({ detail: detailAt(frequencyHz) }),
    'job.stop': () => ({ wasRunning: true }),
  });
  openDocument();
  // A state of its own in every test: what is loaded is kept by it.
  setState({ result: { result: RESULT, work: { ...WORK }, run: null } });
});

afterEach(() => {
  clearSelection();
  vi.useRealTimers();
});

describe('the chosen line', () => {
  it('is looked at closely, once', async () => {
    selectLine(FREQUENCIES_HZ[0]!);
    expect(getState().detail.kind).toBe('loading');
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().detail).toMatchObject({ kind: 'ready', detail: { frequencyHz: FREQUENCIES_HZ[0] } });
    selectLine(FREQUENCIES_HZ[1]!);
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    selectLine(FREQUENCIES_HZ[0]!);
    expect(getState().detail.kind).toBe('ready');
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('estimate.line-detail')).toHaveLength(2);
  });

  it('asks only for the line that stays while the keys step quickly', async () => {
    for (let i = 0; i < 4; i++) {
      stepLine(RESULT.points, 1);
      await vi.advanceTimersByTimeAsync(50);
    }
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('estimate.line-detail').map(({ frequencyHz }) => frequencyHz)).toEqual([FREQUENCIES_HZ[3]]);
  });

  it('stops the work for a line that is chosen no more, and does not show it when it comes late', async () => {
    const { promise, resolve } = later<{ detail: LineDetail }>();
    host.answer({ 'estimate.line-detail': () => promise });
    selectLine(FREQUENCIES_HZ[0]!);
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    const { jobId } = host.inputs('estimate.line-detail')[0]!;
    selectLine(null);
    expect(host.inputs('job.stop')).toEqual([{ jobId }]);
    resolve({ detail: detailAt(FREQUENCIES_HZ[0]!) });
    await vi.advanceTimersByTimeAsync(0);
    expect(getState().detail.kind).toBe('none');
  });

  it('says in words why it cannot be looked at', async () => {
    host.answer({
      'estimate.line-detail': () => {
        throw new AppError('input', 'no net radiates there');
      },
    });
    selectLine(FREQUENCIES_HZ[0]!);
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().detail).toMatchObject({ kind: 'failed', message: 'no net radiates there' });
  });

  it('steps in order of frequency, each once, and stays at the ends', () => {
    const seen: (number | null)[] = [];
    for (let i = 0; i <= FREQUENCIES_HZ.length; i++) {
      stepLine(RESULT.points, 1);
      seen.push(getState().selection.lineHz);
    }
    expect(seen).toEqual([...FREQUENCIES_HZ, FREQUENCIES_HZ.at(-1)]);
    stepLine(RESULT.points, -1);
    expect(getState().selection.lineHz).toBe(FREQUENCIES_HZ.at(-2));
  });

  it('is left step by step: piece, net, line', async () => {
    selectLine(FREQUENCIES_HZ[0]!);
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    selectNet('DATA0');
    selectPiece(0);
    expect(getState().selection).toMatchObject({ net: 'CLK', piece: 0 });
    expect(stepBackSelection()).toBe(true);
    expect(getState().selection).toMatchObject({ net: 'CLK', piece: null });
    stepBackSelection();
    stepBackSelection();
    expect(getState().selection).toMatchObject({ net: null, lineHz: null });
    expect(stepBackSelection()).toBe(false);
  });
});
