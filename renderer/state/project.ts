import type { Output } from '../../app/contract/procedures.ts';
import { refuseUpload } from '../../app/contract/upload-size.ts';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import { call } from '../api/api.ts';
import { EMPTY_PROJECT, getState, type Project, setState } from './app-store.ts';
import { needBase, showWork } from './document.ts';
import { forgetDraft, saveDraft, takeSaved } from './draft.ts';
import { runJob } from './jobs.ts';
import { leaveRemembered, loadRemembered } from './remembered.ts';
import { loadRun, showResult } from './result.ts';
import { finishDeletes, refreshMeasurements, refreshRuns } from './runs.ts';
import { clearSelection } from './selection.ts';
import { documentRefOf, sameWork } from './work.ts';

/** Opening projects and files. */

export async function openSample(): Promise<void> {
  const { project } = await call('project.open-sample', {});
  await showProject(project);
}

/** A project by its path; without one, a new project of the program's own folder. */
export async function openProject(file?: string): Promise<void> {
  const { project } = await call('project.open', { ...(file !== undefined && { file }), create: file === undefined });
  await showProject(project);
}

export async function chooseProject(): Promise<void> {
  const { file } = await call('dialog.open-project', {});
  if (file !== null) await openProject(file);
}

/** A copy under another name, open from then on. */
export async function saveProjectAs(): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  await saveDraft();
  const { file } = await call('dialog.save-project', { name: project.name });
  if (file === null) return;
  const { project: copy } = await call('project.save-as', { projectId: project.projectId, file });
  await showProject(copy);
}

export async function renameProject(name: string): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  await call('project.rename', { projectId: project.projectId, name });
  await refreshInfo();
}

export async function refreshInfo(): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  const { project: fresh } = await call('project.info', { projectId: project.projectId });
  if (getState().project?.projectId === fresh.projectId) setState({ project: fresh });
}

export async function refreshRecent(): Promise<void> {
  const { projects } = await call('project.recent', {});
  setState({ recent: projects });
}

/** Back to the start page. The draft is saved first. */
export async function closeProject(): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  await saveDraft();
  await leaveProject();
  setState({ project: null, ...EMPTY_PROJECT });
  await refreshRecent();
}

async function leaveProject(): Promise<void> {
  const { project } = getState();
  clearSelection();
  forgetDraft();
  await Promise.all([leaveRemembered(), finishDeletes()]);
  if (project !== null) await call('project.close', { projectId: project.projectId });
}

export async function showProject(project: Project): Promise<void> {
  if (getState().project?.projectId !== project.projectId) await leaveProject();
  setState({ ...EMPTY_PROJECT, project, isOpening: true });
  try {
    await Promise.all([loadRemembered('project'), refreshRuns(), refreshMeasurements(), showDraft(project)]);
    await showNewestRun();
  } catch (error) {
    // One that cannot be read is not left half open.
    await leaveProject();
    setState({ project: null, ...EMPTY_PROJECT });
    throw error;
  } finally {
    setState({ isOpening: false });
  }
}

async function showDraft({ projectId }: Project): Promise<void> {
  const { draft } = await call('draft.load', { projectId });
  if (draft === null) return;
  await needBase(projectId, draft.document.baseId);
  const work = { ...draft.document, settings: draft.settings };
  takeSaved(work, draft.version);
  showWork('Open', work);
}

/** The newest run is what the window shows first; the draft stays as it is, the run is marked outdated when it differs. */
async function showNewestRun(): Promise<void> {
  const { project, runs, history } = getState();
  const [newest] = runs;
  if (project === null || newest === undefined) return;
  if (history === null) {
    await loadRun(newest.run);
    return;
  }
  const { document, settings, result } = await call('runs.load', { projectId: project.projectId, run: newest.run });
  await needBase(project.projectId, document.baseId);
  const stored = { ...document, settings };
  const work = sameWork(stored, history.present) ? history.present : stored;
  showResult({ result, work, run: newest.run });
}

/** Board files, layouts, sources files and waveform tables, chosen or dropped. Without a project a new one is begun. */
export async function openFiles(files: readonly File[]): Promise<void> {
  if (files.length === 0) return;
  const isBegun = getState().project === null;
  if (isBegun) await openProject();
  const { projectId } = getState().project!;
  const names = files.map((file) => file.name).join(', ');
  let read: Output<'board.open'>;
  try {
    read = await runJob('open', `Reading ${names}`, (jobId) => readFiles(projectId, jobId, files));
  } catch (error) {
    // What was begun for files that cannot be used is not left behind.
    if (isBegun && getState().project?.projectId === projectId) await closeProject();
    throw error;
  }
  const { baseId, base, sources, summary } = read;
  if (getState().project?.projectId !== projectId) return;
  const before = getState().history?.present;
  const settings = before?.settings ?? runSettingsSchema.parse({});
  showWork(`Open ${names}`, { baseId, sources, settings }, base);
  if (baseId !== before?.baseId) {
    clearSelection();
    setState({ importSummary: summary ?? null });
  }
  if (isBegun) await renameProject(projectName(base.layout.name, files, summary !== undefined));
}

/** A begun project is called as its board; layout programs often call every board the same, so a layout's file counts. */
function projectName(boardName: string, files: readonly File[], isLayout: boolean): string {
  const ofFile = files[0]!.name.replace(/(?:\.(?:board|sources))?\.\w+$/, '');
  return (isLayout ? ofFile : boardName).slice(0, 200) || 'Untitled';
}

/** The document that the files make, upon the present one where there is one. */
async function readFiles(projectId: string, jobId: string, files: readonly File[]): Promise<Output<'board.open'>> {
  // Before reading: a file may be larger than the window's memory.
  for (const file of files) refuseUpload(file.name, file.size);
  const uploadIds: string[] = [];
  for (const file of files) {
    const bytes = new Uint8Array(await file.arrayBuffer());
    uploadIds.push((await call('file.upload', { name: file.name, bytes })).uploadId);
  }
  const present = getState().history?.present;
  return call('board.open', { projectId, jobId, uploadIds, ...(present && { onto: documentRefOf(present) }) });
}
