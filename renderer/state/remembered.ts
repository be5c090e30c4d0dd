import { useCallback, useMemo } from 'react';
import type { z } from 'zod';
import { call } from '../api/api.ts';
import { getState, setState, useApp } from './app-store.ts';

/** Settings of the views (panel sizes, visible layers, zoomed range, theme …), remembered by the host. */

export type Scope = 'project' | 'program';

const SAVE_AFTER_MS = 400;
const PROJECT_KEY = 'views';
const PROGRAM_KEY = 'views';
const timers = new Map<Scope, ReturnType<typeof setTimeout>>();

const fullKey = (scope: Scope, key: string): string => `${scope}:${key}`;

/** Reads what is remembered in a scope; whatever is not an object counts as nothing. */
export async function loadRemembered(scope: Scope): Promise<void> {
  const projectId = scope === 'project' ? (getState().project?.projectId ?? null) : null;
  if (scope === 'project' && projectId === null) return;
  const key = scope === 'project' ? PROJECT_KEY : PROGRAM_KEY;
  const { value } = await call('settings.get', { projectId, key });
  const entries = typeof value === 'object' && value !== null ? Object.entries(value) : [];
  setState(({ remembered }) => {
    const others = [...remembered].filter(([name]) => !name.startsWith(fullKey(scope, '')));
    return {
      remembered: new Map([...others, ...entries.map(([name, item]) => [fullKey(scope, name), item] as const)]),
    };
  });
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
  const { project, remembered } = getState();
  const projectId = scope === 'project' ? (project?.projectId ?? null) : null;
  if (scope === 'project' && projectId === null) return;
  const prefix = fullKey(scope, '');
  const entries = [...remembered].filter(([name]) => name.startsWith(prefix));
  const value = Object.fromEntries(entries.map(([name, item]) => [name.slice(prefix.length), item]));
  // What a view remembers is a convenience: a host that cannot keep it must not disturb the work.
  await call('settings.put', { projectId, key: scope === 'project' ? PROJECT_KEY : PROGRAM_KEY, value }).catch(
    () => {},
  );
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
