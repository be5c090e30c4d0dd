import type { DocumentRef } from '../../app/contract/documents.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';

/** All that a result depends on, and all that undo goes over: the copper by its id, what switches on it, the test. */
export interface Work {
  readonly baseId: string;
  readonly sources: SourcesPart;
  readonly settings: RunSettings;
}

export const documentRefOf = ({ baseId, sources }: Work): DocumentRef => ({ baseId, sources });

/** Whether two states give the same result. */
export function sameWork(a: Work, b: Work): boolean {
  if (a === b) return true;
  return a.baseId === b.baseId && sameData(a.sources, b.sources) && sameData(a.settings, b.settings);
}

/** Equality of plain data; absent and undefined keys are the same, the order of keys does not count. */
export function sameData(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) || Array.isArray(b)) {
    return Array.isArray(a) && Array.isArray(b) && a.length === b.length && a.every((item, i) => sameData(item, b[i]));
  }
  const [left, right] = [a as Record<string, unknown>, b as Record<string, unknown>];
  const keys = new Set([...Object.keys(left), ...Object.keys(right)]);
  return [...keys].every((key) => sameData(left[key], right[key]));
}
