import { beforeEach, describe, expect, it } from 'vitest';
import { getState } from '../../renderer/state/app-store.ts';
import { editLayout, editSettings, editSources, redo, undo } from '../../renderer/state/document.ts';
import { FakeHost } from './fake-host.ts';
import { BASE, openDocument, present, WORK } from './open-document.ts';

/** Oracle: what a user expects of each step, written out. */

let host: FakeHost;

beforeEach(() => {
  host = new FakeHost({});
  openDocument();
});

const model = () => getState().model!;

describe('the document', () => {
  it('undoes and redoes over sources and settings alike', () => {
    editSettings('Distance', { distanceM: 10 });
    editSources('No drives', (sources) => ({ ...sources, drives: [] }));
    expect(model().board.drives).toHaveLength(0);
    undo();
    expect(model().board.drives.length).toBeGreaterThan(0);
    expect(present().settings.distanceM).toBe(10);
    undo();
    expect(present()).toBe(WORK);
    undo();
    expect(present()).toBe(WORK);
    redo();
    redo();
    expect(present().settings.distanceM).toBe(10);
    expect(model().board.drives).toHaveLength(0);
  });

  it('keeps the identity of the copper while sources change', () => {
    const before = model().board;
    editSources('Delay', (sources) => ({
      ...sources,
      drives: sources.drives!.map((drive) => ({ ...drive, delayNs: 3 })),
    }));
    const { board } = model();
    expect(board).not.toBe(before);
    expect(board.drives[0]!.delayS).toBeCloseTo(3e-9, 15);
    expect(board.nets).toBe(before.nets);
    expect(board.planes).toBe(before.planes);
    expect(board.stackup).toBe(before.stackup);
    expect(board.outlineM).toBe(before.outlineM);
  });

  it('keeps the last board while a source is half typed, and says what is missing and where', () => {
    const before = model().board;
    editSources('Waveform', (sources) => ({
      ...sources,
      drives: sources.drives!.map((drive, i) => (i === 0 ? { ...drive, waveform: 'not yet made' } : drive)),
    }));
    expect(model().board).toBe(before);
    expect(model().problems).toHaveLength(1);
    expect(model().problems[0]!.path).toBe('drives[0].waveform');
    expect(model().problems[0]!.text).toContain('not yet made');
    undo();
    expect(model().problems).toHaveLength(0);
  });

  it('lists every problem that the schema finds', () => {
    editSources('Waveforms', (sources) => ({
      ...sources,
      waveforms: [
        { kind: 'trapezoid', name: '', frequencyMhz: 25, lowV: 0, highV: 1, dutyPercent: 50, riseNs: 1, fallNs: 1 },
        { kind: 'trapezoid', name: 'b', frequencyMhz: 25, lowV: 0, highV: 1, dutyPercent: 50, riseNs: 30, fallNs: 30 },
      ],
    }));
    expect(model().problems.map(({ path }) => path)).toEqual(['waveforms[0].name', 'waveforms[1].riseNs']);
  });

  it('makes a change of the copper a step of its own base, kept by the host first', async () => {
    const otherId = 'b'.repeat(64);
    host.answer({ 'base.put': () => ({ baseId: otherId }) });
    await editLayout('Revision C', (layout) => ({ ...layout, revision: 'C' }));
    expect(present().baseId).toBe(otherId);
    expect(model().board.revision).toBe('C');
    undo();
    expect(model().board.revision).toBe(BASE.layout.revision);
    expect(host.inputs('base.put')).toHaveLength(1);
  });

  it('refuses a layout that is none, and stays as it was', async () => {
    await expect(editLayout('Nothing', (layout) => ({ ...layout, stackup: [] }))).rejects.toThrow(/stackup/);
    expect(present()).toBe(WORK);
    expect(host.calls).toHaveLength(0);
  });
});
