import type { BoardBase } from '../../app/contract/documents.ts';
import { sameData } from '../state/work.ts';

/** The last two compared, as every move of a lever asks the same again. */
let last: { readonly before: string; readonly now: string; readonly isChanged: boolean } | null = null;

/** Whether two bases differ in more than their names: in copper, stack, model or waveform files. */
export function changedLayout(bases: ReadonlyMap<string, BoardBase>, before: string, now: string): boolean {
  if (before === now) return false;
  if (last?.before !== before || last.now !== now) {
    last = { before, now, isChanged: !sameData(solvedParts(bases.get(before)), solvedParts(bases.get(now))) };
  }
  return last.isChanged;
}

function solvedParts(base: BoardBase | undefined): unknown {
  if (base === undefined) return undefined;
  const { name: _name, revision: _revision, notes: _notes, ...layout } = base.layout;
  return { layout, samples: base.samples };
}
