import { compareRuns } from '../../../app/compare/compare-runs.ts';
import { trendOf } from '../../../app/compare/trend.ts';
import type { Handlers, Received } from '../../../app/contract/procedures.ts';
import type { Project } from '../../db/project.ts';
import { trendRuns } from '../../db/trend-runs.ts';
import { runJob } from '../../jobs/run-job.ts';
import type { ReportSubject } from '../../reports/report-request.ts';
import type { HostContext } from '../context.ts';

type ReportHandlers = Pick<Handlers, 'runs.compare' | 'runs.trend' | 'report.render'>;

export function reportHandlers({ version, projects }: HostContext): ReportHandlers {
  return {
    'runs.compare': async ({ projectId, before, after }) => ({
      comparison: comparisonOf(projects.get(projectId), before, after),
    }),
    'runs.trend': async ({ projectId }) => ({ trend: trendOf(trendRuns(projects.get(projectId))) }),
    'report.render': async ({ projectId, subject, ...title }) => {
      const project = projects.get(projectId);
      const request = { ...title, project: project.info().name, programVersion: version };
      return runJob('report', { ...request, subject: subjectOf(project, subject) });
    },
  };
}

const comparisonOf = (project: Project, before: number, after: number) =>
  compareRuns(project.run(before), project.run(after));

function subjectOf(project: Project, subject: Received<'report.render'>['subject']): ReportSubject {
  switch (subject.kind) {
    case 'run':
      return { kind: 'run', run: project.run(subject.run) };
    case 'comparison':
      return { kind: 'comparison', comparison: comparisonOf(project, subject.before, subject.after) };
    case 'trend':
      return { kind: 'trend', trend: trendOf(trendRuns(project)) };
  }
}
