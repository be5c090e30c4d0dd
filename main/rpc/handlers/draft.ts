import type { Handlers } from '../../../app/contract/procedures.ts';
import type { HostContext } from '../context.ts';

type DraftHandlers = Pick<Handlers, 'draft.load' | 'draft.save'>;

export function draftHandlers({ projects, bases, events }: HostContext): DraftHandlers {
  return {
    'draft.load': async ({ projectId }) => {
      const draft = projects.get(projectId).draft();
      if (draft === undefined) return { draft: null };
      const { document, settings, version } = draft;
      return { draft: { document: bases.refer(document), settings, version } };
    },
    'draft.save': async ({ projectId, document, settings, basedOn, clientId }) => {
      const project = projects.get(projectId);
      const version = project.saveDraft({ document: bases.document(project, document), settings }, basedOn);
      events.publish('project.changed', { projectId, what: 'draft', clientId });
      return { version };
    },
  };
}
