/** Undo and redo of one value, as plain data. Every step knows what it was called and what was before it. */

interface Step<T> {
  readonly label: string;
  /** The value before the step in `past`, after it in `future`. */
  readonly value: T;
}

export interface History<T> {
  /** Oldest first. */
  readonly past: readonly Step<T>[];
  readonly present: T;
  /** Next to be done again first. */
  readonly future: readonly Step<T>[];
  /** Edits with the same key shortly after one another are one step. */
  readonly merge: { readonly key: string; readonly atMs: number } | null;
}

const MOST_STEPS = 200;
/** A pause longer than this between two keystrokes or moves makes two steps. */
const MERGE_WITHIN_MS = 1500;
/** Begins the merge keys of gestures, which say themselves where they end (a pointer let go): there a pause makes no step. */
export const GESTURE = 'gesture ';

export const startHistory = <T>(present: T): History<T> => ({ past: [], present, future: [], merge: null });

/** The history with an edit at its end. `mergeKey` joins it with the edit before of the same key, unless a pause lies between. */
export function edited<T>(
  history: History<T>,
  label: string,
  value: T,
  atMs: number,
  mergeKey: string | null = null,
): History<T> {
  if (value === history.present) return history;
  const merge = mergeKey === null ? null : { key: mergeKey, atMs };
  const isSameGesture =
    history.merge !== null &&
    history.merge.key === mergeKey &&
    (mergeKey.startsWith(GESTURE) || atMs - history.merge.atMs <= MERGE_WITHIN_MS);
  if (isSameGesture && history.past.length > 0) return { ...history, present: value, future: [], merge };
  const past = [...history.past, { label, value: history.present }].slice(-MOST_STEPS);
  return { past, present: value, future: [], merge };
}

export function undone<T>(history: History<T>): History<T> {
  const step = history.past.at(-1);
  if (step === undefined) return history;
  return {
    past: history.past.slice(0, -1),
    present: step.value,
    future: [{ label: step.label, value: history.present }, ...history.future],
    merge: null,
  };
}

export function redone<T>(history: History<T>): History<T> {
  const [step, ...future] = history.future;
  if (step === undefined) return history;
  return {
    past: [...history.past, { label: step.label, value: history.present }],
    present: step.value,
    future,
    merge: null,
  };
}
