import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { AppError } from '../../app/errors.ts';
import { type Draft, getState } from '../../renderer/state/app-store.ts';
import { editSettings, editSources, undo } from '../../renderer/state/document.ts';
import { keepMine, startAutosave, takeForeignDraft, takeTheirs } from '../../renderer/state/draft.ts';
import { FakeHost, later } from './fake-host.ts';
import { openDocument, present, WORK } from './open-document.ts';

/** Oracle: the host's rule (a save based on another version than the newest is refused) and what a user must not lose. */

const WAIT_MS = 1000;

let host: FakeHost;
let stored: Draft;
let endAutosave: () => void;

const draftOf = (distanceM: number, version: number): Draft => ({
  document: { baseId: WORK.baseId, sources: WORK.sources },
  settings: { ...WORK.settings, distanceM },
  version,
});

beforeEach(() => {
  vi.useFakeTimers();
  stored = draftOf(3, 1);
  host = new FakeHost({
    'draft.load': () => ({ draft: stored }),
    'draft.save': (input) => {
      if (input.basedOn !== stored.version) throw new AppError('busy', 'saved by another window');
      stored = { document: WORK, settings: { ...WORK.settings, ...input.settings }, version: stored.version + 1 };
      return { version: stored.version };
    },
  });
  openDocument();
  endAutosave = startAutosave();
});

afterEach(() => {
  endAutosave();
  vi.useRealTimers();
});

describe('the draft', () => {
  it('is saved once, after the last of several quick changes', async () => {
    editSettings('Distance', { distanceM: 5 }, 'distance');
    await vi.advanceTimersByTimeAsync(300);
    editSettings('Distance', { distanceM: 10 }, 'distance');
    expect(getState().draft.kind).toBe('waiting');
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('draft.save')).toHaveLength(1);
    expect(stored.settings.distanceM).toBe(10);
    expect(getState().draft).toEqual({ kind: 'saved', version: 2 });
  });

  it('waits for a slow save before the next one, and takes neither for a foreign change', async () => {
    const slow = later<{ version: number }>();
    host.answer({ 'draft.save': () => slow.promise });
    editSettings('Distance', { distanceM: 5 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    host.answer({ 'draft.save': ({ basedOn }) => ({ version: basedOn + 1 }) });
    editSettings('Distance', { distanceM: 10 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('draft.save')).toHaveLength(1);
    slow.resolve({ version: 2 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('draft.save').map(({ basedOn, settings }) => [basedOn, settings?.distanceM])).toEqual([
      [1, 5],
      [2, 10],
    ]);
    expect(getState().draft).toEqual({ kind: 'saved', version: 3 });
  });

  it('is saved already when the change is undone before its save', async () => {
    editSettings('Distance', { distanceM: 5 });
    undo();
    expect(getState().draft.kind).toBe('saved');
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('draft.save')).toHaveLength(0);
    expect(getState().draft.kind).toBe('saved');
  });

  it('is not saved while a source is half typed', async () => {
    editSources('Name', (sources) => ({
      ...sources,
      waveforms: sources.waveforms!.map((wave) => ({ ...wave, name: '' })),
    }));
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().draft.kind).toBe('incomplete');
    expect(host.inputs('draft.save')).toHaveLength(0);
    undo();
    editSettings('Distance', { distanceM: 10 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().draft.kind).toBe('saved');
  });

  it('says why it could not be saved, and tries again with the next change', async () => {
    const { 'draft.save': save } = { 'draft.save': () => ({ version: 2 }) };
    host.answer({
      'draft.save': () => {
        throw new AppError('file', 'the disk is full');
      },
    });
    editSettings('Distance', { distanceM: 10 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().draft).toEqual({ kind: 'failed', version: 1, message: 'the disk is full' });
    host.answer({ 'draft.save': save });
    editSettings('Distance', { distanceM: 5 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().draft).toEqual({ kind: 'saved', version: 2 });
  });

  it('is the other window’s when nothing here is unsaved; one step back leads to what was here', async () => {
    stored = draftOf(30, 2);
    await takeForeignDraft();
    expect(present().settings.distanceM).toBe(30);
    expect(getState().draft).toEqual({ kind: 'saved', version: 2 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(host.inputs('draft.save')).toHaveLength(0);
    undo();
    expect(present()).toBe(WORK);
  });

  it('is a conflict when both changed it, and the user chooses: theirs', async () => {
    stored = draftOf(30, 2);
    editSettings('Distance', { distanceM: 10 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().draft.kind).toBe('conflict');
    expect(present().settings.distanceM).toBe(10);
    expect(stored.settings.distanceM).toBe(30);
    takeTheirs();
    expect(present().settings.distanceM).toBe(30);
    expect(getState().draft).toEqual({ kind: 'saved', version: 2 });
    undo();
    expect(present().settings.distanceM).toBe(10);
  });

  it('is a conflict when both changed it, and the user chooses: mine', async () => {
    stored = draftOf(30, 2);
    editSettings('Distance', { distanceM: 10 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    await keepMine();
    expect(stored.settings.distanceM).toBe(10);
    expect(stored.version).toBe(3);
    expect(getState().draft).toEqual({ kind: 'saved', version: 3 });
  });

  it('is no conflict when the other window saved the same', async () => {
    stored = draftOf(10, 2);
    editSettings('Distance', { distanceM: 10 });
    await vi.advanceTimersByTimeAsync(WAIT_MS);
    expect(getState().draft).toEqual({ kind: 'saved', version: 2 });
  });
});
