import { type LimitLine, NO_CLASS } from '../limits/limit-line.ts';
import type { ReportLimitLine } from './figures/limit-lines.ts';

/** Limit lines as a report draws and lists them: "CISPR 32 class B, quasi-peak, 3 m". */
export const labelledLimits = (lines: readonly LimitLine[]): ReportLimitLine[] =>
  lines.map((line) => {
    const name = line.class === NO_CLASS ? line.standard : `${line.standard} class ${line.class}`;
    return {
      detector: line.detector,
      points: line.points,
      label: `${name}, ${line.detector}, ${line.distanceM} m`,
      ...(line.startsAboveFirst !== undefined && { startsAboveFirst: line.startsAboveFirst }),
    };
  });
