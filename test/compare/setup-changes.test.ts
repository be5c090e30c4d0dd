import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { emptyResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';
import { BOARD, RUN } from './kiln-board.ts';

/** Sentences are compared with ones written by hand; lengths, areas and slopes in them follow from the drawn points. */

describe('set-up in words', () => {
  const changed = (change: Parameters<typeof storedRun>[2], limit: object = {}, version = '0.1.0') => {
    const result = emptyResult();
    const other = { ...result, program: { version }, limit: { ...result.limit, ...limit } };
    return compareRuns(RUN, storedRun(BOARD as BoardFileInput, other, change));
  };

  it('says limit, distance, site and program', () => {
    const { changes } = changed(
      { settings: { distanceM: 10, class: 'A', site: 'free-space', orientation: 'upright', measuredFrom: 'center' } },
      { class: 'A', distanceM: 10 },
      '0.2.0',
    );
    expect(changes.map(({ text }) => text)).toEqual([
      'board flat → upright',
      'distance 3 → 10 m',
      'distance measured from the boundary → turntable axis',
      'site: ground plane → free space',
      'limit: class B → class A',
      'program version 0.1.0 → 0.2.0',
    ]);
  });

  it('warns when margins are not comparable, not when only the required margin differs', () => {
    const warned = (comparison: ReturnType<typeof changed>) => comparison.warnings.map(({ code }) => code);
    expect(warned(changed({ settings: { distanceM: 10 } }))).toEqual(['setups-differ']);
    expect(warned(changed({ settings: { site: 'free-space' } }))).toEqual(['setups-differ']);
    expect(warned(changed({ settings: { structure: 'pair-only' } }))).toEqual(['setups-differ']);
    expect(warned(changed({ settings: { limitFile: { lines: [] } } }))).toEqual(['setups-differ']);
    expect(warned(changed({}, {}, '9'))).toEqual(['programs-differ']);
    expect(warned(changed({}, { maxHz: 2e9 }))).toEqual(['ranges-differ']);
    const demand = changed({ settings: { requiredMarginDb: 3 } }, { requiredMarginDb: 3 });
    expect(warned(demand)).toEqual([]);
    expect(demand.changes.map(({ text }) => text)).toEqual(['required margin 6 → 3 dB']);
  });
});
