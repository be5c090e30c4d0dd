import { compareRuns } from '../../../app/compare/compare-runs.ts';
import { trendOf } from '../../../app/compare/trend.ts';
import type { Handlers, Received } from '../../../app/contract/procedures.ts';
import type { Project } from '../../db/project.ts';
import { runJob } from '../../jobs/run-job.ts';
import type { ReportSubject } from '../../reports/report-request.ts';
import { reportedRun } from '../../reports/reported-run.ts';
import type { HostContext } from '../context.ts';

type ReportHandlers = Pick<Handlers, 'runs.compare' | 'runs.trend' | 'report.render'>;

export function reportHandlers({ version, projects }: HostContext): ReportHandlers {
  return {
    'runs.compare': async ({ projectId, before, after }) => ({
      comparison: comparisonOf(projects.get(projectId), before, after),
    }),
    'runs.trend': async ({ projectId }) => ({ trend: trendOf(projects.get(projectId).trendRuns()) }),
    'report.render': async ({ projectId, subject, format, paper, author, dateText }) => {
      const project = projects.get(projectId);
      const stored = subject.kind === 'run' ? project.run(subject.run) : undefined;
      const title = {
        project: project.info().name,
        author,
        dateText,
        runNumber: stored?.run ?? null,
        note: stored?.note ?? '',
      };
      return runJob('report', { subject: subjectOf(project, subject), format, paper, title, programVersion: version });
    },
  };
}

const comparisonOf = (project: Project, before: number, after: number) =>
  compareRuns(project.run(before), project.run(after));

function subjectOf(project: Project, subject: Received<'report.render'>['subject']): ReportSubject {
  switch (subject.kind) {
    case 'run':
      return { kind: 'run', run: reportedRun(project.run(subject.run)) };
    case 'comparison':
      return { kind: 'comparison', comparison: comparisonOf(project, subject.before, subject.after) };
    case 'trend':
      return { kind: 'trend', trend: trendOf(project.trendRuns()) };
  }
}
