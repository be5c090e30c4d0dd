import { trendRunOf } from '../../app/compare/trend-run.ts';
import type { TrendRun } from '../../app/compare/types.ts';
import type { Project } from './project.ts';

/** Every run of a project as a point of its trend. */
export const trendRuns = (project: Project): TrendRun[] =>
  project.runs().map(({ run }) => trendRunOf(project.run(run)));
