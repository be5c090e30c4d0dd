import { call, on } from '../api/api.ts';
import { getState, setState } from './app-store.ts';
import { CLIENT_ID, startAutosave, takeForeignDraft } from './draft.ts';
import { takeProgress } from './jobs.ts';
import { attempt } from './notices.ts';
import { openProject, refreshInfo, refreshRecent, showProject } from './project.ts';
import { loadRemembered } from './remembered.ts';
import { takePoints } from './result.ts';
import { refreshMeasurements, refreshRuns } from './runs.ts';

/** Wires the store to the host's events and shows what the host was started with. */
export async function start(): Promise<void> {
  on('job.progress', takeProgress);
  on('job.points', takePoints);
  on('project.changed', ({ projectId, what, clientId }) => {
    if (projectId === getState().project?.projectId && clientId !== CLIENT_ID)
      void attempt('Project', () => refresh(what));
  });
  on('app.open-file', ({ file }) => void attempt(file, () => openProject(file)));
  startAutosave();
  const [info] = await Promise.all([call('app.info', {}), loadRemembered('program'), refreshRecent()]);
  setState({ info });
  if (info.startProject !== null) await showProject(info.startProject);
}

/** Events may have been missed: everything that another window could have changed is read again. */
export function refreshAll(): void {
  void attempt('Project', async () => {
    await Promise.all((['info', 'runs', 'draft', 'measurements'] as const).map(refresh));
  });
}

function refresh(what: 'info' | 'runs' | 'draft' | 'measurements'): Promise<void> {
  switch (what) {
    case 'info':
      return refreshInfo();
    case 'runs':
      return refreshRuns();
    case 'draft':
      return takeForeignDraft();
    case 'measurements':
      return refreshMeasurements();
  }
}
