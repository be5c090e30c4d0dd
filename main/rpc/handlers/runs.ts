import type { Handlers } from '../../../app/contract/procedures.ts';
import type { HostContext } from '../context.ts';

type RunHandlers = Pick<Handlers, 'runs.list' | 'runs.load' | 'runs.note' | 'runs.delete'>;

export function runHandlers({ projects, bases, events }: HostContext): RunHandlers {
  const changed = (projectId: string) => {
    events.publish('project.changed', { projectId, what: 'runs', clientId: null });
  };
  return {
    'runs.list': async ({ projectId }) => ({ runs: projects.get(projectId).runs() }),
    'runs.load': async ({ projectId, run }) => {
      const { document, settings, result, durationS: _, ...summary } = projects.get(projectId).run(run);
      return { summary, result, settings, document: bases.refer(document) };
    },
    'runs.note': async ({ projectId, run, note }) => {
      projects.get(projectId).setNote(run, note);
      changed(projectId);
      return {};
    },
    'runs.delete': async ({ projectId, run }) => {
      projects.get(projectId).deleteRun(run);
      changed(projectId);
      return {};
    },
  };
}
