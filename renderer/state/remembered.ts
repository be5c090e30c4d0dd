import { useCallback, useMemo } from 'react';
import type { z } from 'zod';
import { call } from '../api/api.ts';
import { getState, setState, useApp } from './app-store.ts';

/** Settings of the views (panel sizes, visible layers, zoomed range, theme …), remembered by the host. */

export type Scope = 'project' | 'program';

const SAVE_AFTER_MS = 400;
/** Under which the host keeps each scope's values, as one object. */
const KEY = 'views';
const timers = new Map<Scope, ReturnType<typeof setTimeout>>();

const fullKey = (scope: Scope, key: string): string => `${scope}:${key}`;

/** Reads what is remembered in a scope; whatever is not an object counts as nothing. */
export async function loadRemembered(scope: Scope): Promise<void> {
  const projectId = scope === 'project' ? (getState().project?.projectId ?? null) : null;
  if (scope === 'project' && projectId === null) return;
  const { value } = await call('settings.get', { projectId, key: KEY });
  const entries = typeof value === 'object' && value !== null ? Object.entries(value) : [];
  setState(({ remembered }) => ({
    remembered: new Map([
      ...without(scope, remembered),
      ...entries.map(([name, item]) => [fullKey(scope, name), item] as const),
    ]),
  }));
}

const without = (scope: Scope, remembered: ReadonlyMap<string, unknown>): [string, unknown][] =>
  [...remembered].filter(([name]) => !name.startsWith(fullKey(scope, '')));

/** Saves what still waits for the open project, and forgets it: another one is about to be opened. */
export async function leaveRemembered(): Promise<void> {
  const timer = timers.get('project');
  if (timer !== undefined) {
    clearTimeout(timer);
    await save('project');
  }
  setState(({ remembered }) => ({ remembered: new Map(without('project', remembered)) }));
}

export function remember(scope: Scope, key: string, value: unknown): void {
  setState(({ remembered }) => ({ remembered: new Map(remembered).set(fullKey(scope, key), value) }));
  clearTimeout(timers.get(scope));
  timers.set(
    scope,
    setTimeout(() => void save(scope), SAVE_AFTER_MS),
  );
}

async function save(scope: Scope): Promise<void> {
  timers.delete(scope);
  const { project, remembered } = getState();
  const projectId = scope === 'project' ? (project?.projectId ?? null) : null;
  if (scope === 'project' && projectId === null) return;
  const prefix = fullKey(scope, '');
  const entries = [...remembered].filter(([name]) => name.startsWith(prefix));
  const value = Object.fromEntries(entries.map(([name, item]) => [name.slice(prefix.length), item]));
  // What a view remembers is a convenience: a host that cannot keep it must not disturb the work.
  await call('settings.put', { projectId, key: KEY, value }).catch(() => {});
}

/**
 * A remembered value and its setter, like `useState`. The schema guards against what an older version left behind;
 * give it and `initial` from module level. Keys begin with the part's folder: `board-view.hidden-layers`.
 */
export function useRemembered<T>(
  key: string,
  schema: z.ZodType<T>,
  initial: T,
  scope: Scope = 'project',
): readonly [T, (value: T) => void] {
  const raw = useApp(({ remembered }) => remembered.get(fullKey(scope, key)));
  const value = useMemo(() => {
    const parsed = schema.safeParse(raw);
    return parsed.success ? parsed.data : initial;
  }, [raw, schema, initial]);
  const set = useCallback((next: T) => remember(scope, key, next), [scope, key]);
  return [value, set];
}
