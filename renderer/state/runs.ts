import { call } from '../api/api.ts';
import { getState, setState } from './app-store.ts';
import { attempt, notify } from './notices.ts';

/** The ledger's rows: reading, notes, deleting with a way back. */

export async function refreshRuns(): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  const { runs } = await call('runs.list', { projectId: project.projectId });
  if (getState().project?.projectId !== project.projectId) return;
  setState(({ vanishingRuns }) => ({
    runs: runs.filter(({ run }) => !vanishingRuns.has(run)).sort((a, b) => b.run - a.run),
  }));
}

export async function refreshMeasurements(): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  const { measurements } = await call('measurements.list', { projectId: project.projectId });
  if (getState().project?.projectId === project.projectId) setState({ measurements });
}

export async function setNote(run: number, note: string): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  await call('runs.note', { projectId: project.projectId, run, note });
  setState(({ runs }) => ({ runs: runs.map((row) => (row.run === run ? { ...row, note } : row)) }));
}

/** Takes the run out of the list at once and deletes it when the notice with its way back has gone. */
export function deleteRun(run: number): void {
  const { project } = getState();
  if (project === null) return;
  const { projectId } = project;
  let isWanted = false;
  setState(({ runs, vanishingRuns }) => ({
    runs: runs.filter((row) => row.run !== run),
    vanishingRuns: new Set(vanishingRuns).add(run),
  }));
  const release = () =>
    setState(({ vanishingRuns }) => ({ vanishingRuns: new Set([...vanishingRuns].filter((other) => other !== run)) }));
  const keep = () => {
    isWanted = true;
    release();
    void attempt('Runs', refreshRuns);
  };
  notify({ tone: 'plain', text: `Run ${run} deleted`, action: { label: 'Undo', run: keep } }, () => {
    if (isWanted) return;
    void attempt(`Run ${run}`, async () => {
      try {
        await call('runs.delete', { projectId, run });
      } finally {
        release();
      }
      await refreshRuns();
    });
  });
}
