import type { Input } from '../../app/contract/procedures.ts';
import type { RunSummary } from '../../app/project/stored-run.ts';

export type ReportSubject = Input<'report.render'>['subject'];

/** What a report can be about: the run that is shown, that run against the newest of another revision, the trend. */
export function reportSubjects(
  runs: readonly RunSummary[],
  shownRun: number | null,
): { readonly name: 'run' | 'comparison' | 'trend'; readonly label: string; readonly subject: ReportSubject }[] {
  const run = runs.find((row) => row.run === shownRun) ?? runs[0];
  if (run === undefined) return [];
  const earlier = runs.filter((row) => row.run < run.run);
  const other = earlier.find(({ revision }) => revision !== run.revision) ?? earlier[0];
  const nameOf = ({ run: number, revision }: RunSummary) =>
    `run ${number}${revision === '' ? '' : `, revision ${revision}`}`;
  return [
    { name: 'run', label: `Estimate: ${nameOf(run)}`, subject: { kind: 'run', run: run.run } },
    ...(other
      ? [
          {
            name: 'comparison' as const,
            label: `Comparison: ${nameOf(run)} against ${nameOf(other)}`,
            subject: { kind: 'comparison' as const, before: other.run, after: run.run },
          },
        ]
      : []),
    { name: 'trend', label: 'Trend over all revisions', subject: { kind: 'trend' } },
  ];
}
