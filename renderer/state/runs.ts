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

const vanishing = new Set<() => Promise<void>>();

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
  const listAgain = () => {
    setState(({ vanishingRuns }) => ({
      vanishingRuns: new Set([...vanishingRuns].filter((other) => other !== run)),
    }));
    return attempt('Runs', refreshRuns);
  };
  const keep = () => {
    isWanted = true;
    void listAgain();
  };
  let removed = Promise.resolve();
  const onClose = () => {
    vanishing.delete(finish);
    if (isWanted) return;
    const remove = async () => void (await call('runs.delete', { projectId, run }));
    removed = attempt(`Run ${run}`, remove).then(listAgain);
  };
  const dismiss = notify({ tone: 'plain', text: `Run ${run} deleted`, action: { label: 'Undo', run: keep } }, onClose);
  const finish = () => {
    dismiss();
    return removed;
  };
  vanishing.add(finish);
}

/** Ends the time to undo of every deleted run: the project is about to be closed. */
export async function finishDeletes(): Promise<void> {
  await Promise.all([...vanishing].map((finish) => finish()));
}
