import type { Handlers } from '../../../app/contract/procedures.ts';
import { fileError } from '../../../app/errors.ts';
import { judge } from '../../../app/estimate/points.ts';
import { chooseLimits } from '../../../app/limits/choose.ts';
import { estimateJob } from '../../jobs/estimate-job.ts';
import { runEstimate } from '../../jobs/run-estimate.ts';
import { runJob } from '../../jobs/run-job.ts';
import type { HostContext } from '../context.ts';

type EstimateHandlers = Pick<Handlers, 'estimate.run' | 'estimate.line-detail' | 'job.stop' | 'validate.run'>;

export function estimateHandlers({ version, projects, bases, jobs, events }: HostContext): EstimateHandlers {
  return {
    'estimate.run': ({ projectId, jobId, document, settings, store, note }) =>
      jobs.run(jobId, async ({ signal, onProgress, onPoints }) => {
        const project = projects.get(projectId);
        // Known before the long work.
        if (store && project.isReadOnly)
          throw fileError(project.file, 'is read-only: estimate without keeping the run');
        const draft = { document: bases.document(project, document), settings };
        const startedAt = new Date().toISOString();
        const startedAtMs = performance.now();
        const job = estimateJob(draft.document, settings, version);
        const limits = chooseLimits(job.limits, job.catalogue);
        const result = await runEstimate(job, {
          onProgress: (done, total) => onProgress('Estimating', done, total),
          onLevels: (levels) => onPoints(judge(levels, limits).points),
          signal,
        });
        if (!store || signal.aborted) return { result, run: null };
        const durationS = (performance.now() - startedAtMs) / 1000;
        const run = project.addRun({ ...draft, startedAt, durationS, result, note });
        for (const what of ['runs', 'info'] as const) {
          events.publish('project.changed', { projectId, what, clientId: null });
        }
        return { result, run };
      }),
    'estimate.line-detail': ({ projectId, jobId, document, settings, frequencyHz }) =>
      jobs.run(jobId, async ({ signal, onProgress }) => {
        const job = estimateJob(bases.document(projects.get(projectId), document), settings, version);
        const told = (done: number, total: number) => onProgress('Looking at the line', done, total);
        return { detail: await runJob('line detail', { ...job, frequencyHz }, told, signal) };
      }),
    'job.stop': async ({ jobId }) => ({ wasRunning: jobs.stop(jobId) }),
    'validate.run': ({ jobId }) =>
      jobs.run(jobId, async ({ signal }) => ({ checks: await runJob('validate', null, undefined, signal) })),
  };
}
