import type { Handlers, Output } from '../../../app/contract/procedures.ts';
import { CAUTIONS } from '../../../app/report/cautions.ts';
import type { HostContext } from '../context.ts';

type AppHandlers = Pick<Handlers, 'app.info' | 'settings.get' | 'settings.put'>;

export function appHandlers(context: HostContext): AppHandlers {
  const { kind, version, dialogs, projects, state, startFile } = context;
  return {
    'app.info': async () => {
      const startProject = startFile === null ? null : projects.open(startFile, true);
      return { version, host: kind, hasDialogs: dialogs !== null, startProject, cautions: [...CAUTIONS] };
    },
    'settings.get': async ({ projectId, key }) => ({
      value: (projectId === null ? await state.setting(key) : projects.get(projectId).uiState(key)) ?? null,
    }),
    'settings.put': async ({ projectId, key, value }) => {
      if (projectId === null) await state.putSetting(key, value);
      else projects.get(projectId).putUiState(key, value);
      return {} satisfies Output<'settings.put'>;
    },
  };
}
