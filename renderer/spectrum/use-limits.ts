import { useMemo } from 'react';
import { chooseLimits } from '../../app/limits/choose.ts';
import { parseLimitFile } from '../../app/limits/limit-file.ts';
import { limitRequestOf, type RunSettings } from '../../app/project/run-settings.ts';
import type { ReportLimitLine } from '../../app/report/figures/limit-lines.ts';
import { labelledLimits } from '../../app/report/limit-labels.ts';
import { useApp } from '../state/app-store.ts';
import { useSettings, useShown } from '../state/hooks.ts';

export interface JudgedLimits {
  readonly lines: readonly ReportLimitLine[];
  readonly range: readonly [fromHz: number, toHz: number];
  readonly requiredMarginDb: number;
}

const WHOLE_RANGE = [30e6, 1e9] as const;

/** The limit lines of what is shown: of the last result, or of the present set-up while there is none. */
export function useLimits(): JudgedLimits {
  const present = useSettings();
  const result = useApp((state) => state.result);
  const isOfResult = useShown()?.source === 'result';
  const settings = isOfResult ? (result?.work.settings ?? present) : present;
  const judgedToHz = result?.result.limit.maxHz;
  return useMemo(() => limitsOf(settings, judgedToHz), [settings, judgedToHz]);
}

function limitsOf(settings: RunSettings | null, judgedToHz: number | undefined): JudgedLimits {
  const none = { lines: [], range: WHOLE_RANGE, requiredMarginDb: settings?.requiredMarginDb ?? 0 };
  if (settings === null) return none;
  try {
    const catalogue = settings.limitFile === undefined ? undefined : parseLimitFile(settings.limitFile);
    const lines = labelledLimits(chooseLimits(limitRequestOf(settings), catalogue).lines);
    const fromHz = Math.min(...lines.map(({ points }) => points[0]![0]));
    const lastHz = Math.max(...lines.map(({ points }) => points.at(-1)![0]));
    const toHz = Math.min(lastHz, judgedToHz ?? settings.maxHz ?? 1e9);
    return { ...none, lines, range: toHz > fromHz ? [fromHz, toHz] : [fromHz, lastHz] };
  } catch {
    // A set-up without limit lines is told where it is made; the spectrum then has none to draw.
    return none;
  }
}
