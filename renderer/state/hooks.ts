import { useMemo } from 'react';
import { useShallow } from 'zustand/react/shallow';
import type { Board } from '../../app/board/board.ts';
import type { BoardBase } from '../../app/contract/documents.ts';
import type { Detector, ResultPoint } from '../../app/estimate/result.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import type { Problem } from '../../app/schema/parse-with.ts';
import { type DetailState, type Job, type JobKind, type Selection, useApp } from './app-store.ts';
import { type Shown, shownOf } from './result.ts';
import type { Work } from './work.ts';

/** Reading the store. Each hook redraws its component only when what it returns has changed. */

export const useWork = (): Work | null => useApp(({ history }) => history?.present ?? null);
export const useSources = (): SourcesPart | null => useApp(({ history }) => history?.present.sources ?? null);
export const useSettings = (): RunSettings | null => useApp(({ history }) => history?.present.settings ?? null);
export const useBase = (): BoardBase | null =>
  useApp(({ history, bases }) => (history === null ? null : (bases.get(history.present.baseId) ?? null)));

/** The SI model; its copper keeps its identity while only sources change. */
export const useBoard = (): Board | null => useApp(({ model }) => model?.board ?? null);

const NONE: readonly Problem[] = [];

/** What is wrong with the document, all of it or what lies under a path (`drives[2]`). */
export function useProblems(under = ''): readonly Problem[] {
  const problems = useApp(({ model }) => model?.problems ?? NONE);
  return useMemo(() => problems.filter(({ path }) => isUnder(path, under)), [problems, under]);
}

const isUnder = (path: string, under: string): boolean =>
  under === '' || path === under || path.startsWith(`${under}.`) || path.startsWith(`${under}[`);

export const useShown = (): Shown | null => useApp(shownOf);
export const useIsOutdated = (): boolean => useApp((state) => shownOf(state)?.isOutdated ?? false);

export const useSelection = (): Selection => useApp(({ selection }) => selection);
export const useDetail = (): DetailState => useApp(({ detail }) => detail);
export const useJob = (kind: JobKind): Job | undefined => useApp(({ jobs }) => jobs.find((job) => job.kind === kind));

/** The reading of the chosen line: of the chosen detector, else the one with the smallest margin. */
export function useSelectedPoint(): ResultPoint | null {
  const shown = useShown();
  const { lineHz, detector } = useSelection();
  return useMemo(() => pointAt(shown?.points ?? [], lineHz, detector), [shown, lineHz, detector]);
}

function pointAt(points: readonly ResultPoint[], lineHz: number | null, detector: Detector | null): ResultPoint | null {
  const ofLine = points.filter((point) => point.frequencyHz === lineHz);
  const asked = ofLine.find((point) => point.detector === detector);
  const smallest = () => ofLine.reduce((least, point) => (point.marginDb < least.marginDb ? point : least));
  return asked ?? (ofLine.length > 0 ? smallest() : null);
}

export interface UndoLabels {
  readonly undo: string | null;
  readonly redo: string | null;
}

export const useUndoLabels = (): UndoLabels =>
  useApp(
    useShallow(({ history }) => ({
      undo: history?.past.at(-1)?.label ?? null,
      redo: history?.future[0]?.label ?? null,
    })),
  );
