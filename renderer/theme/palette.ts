import { useSyncExternalStore } from 'react';
import { LEVEL_COLOURS } from '../../app/report/figures/level-colours.ts';

/** The tokens as plain colours, for canvases and charts, which know no CSS variables. */

export type ThemeName = 'light' | 'dark';

const NAMES = [
  'paper',
  'paper-panel',
  'ink',
  'ink-quiet',
  'hair',
  'edge',
  'grid',
  'accent',
  'focus',
  'over',
  'short',
  'short-fill',
  'fine',
  'plane',
  'copper',
  'horizontal',
  'vertical',
  'category-1',
  'category-2',
  'category-3',
  'category-4',
  'category-5',
  'category-6',
  'category-7',
  'ghost',
  'bar',
  'bar-path',
  'bar-back',
] as const;

export type ColorName = (typeof NAMES)[number];

export interface Palette {
  readonly theme: ThemeName;
  /** `color('over')`: the token `--over` as `rgb(…)`. */
  readonly color: (name: ColorName) => string;
  /** The even sequential map, weakest first; the strongest always stands out most from the paper. */
  readonly levels: readonly string[];
  readonly font: string;
}

const darkQuery = matchMedia('(prefers-color-scheme: dark)');
const listeners = new Set<() => void>();
let cached: Palette | null = null;

/** Takes a choice of theme, or the system's. */
export function applyTheme(choice: ThemeName | 'system'): void {
  if (choice === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = choice;
  forget();
}

function forget(): void {
  cached = null;
  for (const listener of listeners) listener();
}

darkQuery.addEventListener('change', forget);

function themeNow(): ThemeName {
  const chosen = document.documentElement.dataset.theme;
  if (chosen === 'light' || chosen === 'dark') return chosen;
  return darkQuery.matches ? 'dark' : 'light';
}

function readPalette(): Palette {
  const probe = document.createElement('span');
  probe.hidden = true;
  document.body.append(probe);
  const colors = new Map<ColorName, string>();
  for (const name of NAMES) {
    probe.style.color = `var(--${name})`;
    colors.set(name, getComputedStyle(probe).color);
  }
  const font = getComputedStyle(document.body).fontFamily;
  probe.remove();
  const theme = themeNow();
  return {
    theme,
    color: (name) => colors.get(name)!,
    levels: theme === 'dark' ? LEVEL_COLOURS.toReversed() : LEVEL_COLOURS,
    font,
  };
}

export function currentPalette(): Palette {
  cached ??= readPalette();
  return cached;
}

const listen = (listener: () => void): (() => void) => {
  listeners.add(listener);
  return () => listeners.delete(listener);
};

/** The palette of the theme in force; a component that uses it is drawn again when the theme changes. */
export const usePalette = (): Palette => useSyncExternalStore(listen, currentPalette);
