import type { Handlers } from '../../../app/contract/procedures.ts';
import { LeversThread } from '../../jobs/levers-thread.ts';
import type { HostContext } from '../context.ts';

type LeverHandlers = Pick<Handlers, 'levers.prepare' | 'levers.try' | 'levers.release'>;

export function leverHandlers({ version, projects, bases, jobs, levers }: HostContext): LeverHandlers {
  return {
    'levers.prepare': ({ projectId, jobId, document, settings }) =>
      jobs.run(jobId, async ({ signal, onProgress }) => {
        const start = {
          document: bases.document(projects.get(projectId), document),
          settings,
          programVersion: version,
        };
        const told = (done: number, total: number) => onProgress('Solving what the levers keep', done, total);
        return { leversId: levers.add(await LeversThread.prepare(start, told, signal)) };
      }),
    'levers.try': ({ leversId, sources, settings }) => levers.get(leversId).try({ sources, settings }),
    'levers.release': async ({ leversId }) => {
      levers.release(leversId);
      return {};
    },
  };
}
