import { call } from '../api/api.ts';
import { getState } from '../state/app-store.ts';
import { saveDraft } from '../state/draft.ts';
import { notify } from '../state/notices.ts';
import { chooseProject, closeProject, openFiles, openProject, openSample, saveProjectAs } from '../state/project.ts';
import { saveBytes } from '../state/save-bytes.ts';
import { chooseFiles } from './choose-files.ts';
import type { Command } from './command.ts';

const hasProject = (): boolean => getState().project !== null;
const hasDialogs = (): boolean => getState().info?.hasDialogs ?? false;

async function save(): Promise<void> {
  await saveDraft();
  const { draft } = getState();
  if (draft.kind === 'saved') notify({ tone: 'plain', text: 'Saved. Changes are also saved by themselves.' });
  if (draft.kind === 'failed') throw new Error(draft.message);
}

async function exportProject(): Promise<void> {
  const { project } = getState();
  if (project === null) return;
  await saveDraft();
  const { name, bytes } = await call('project.export', { projectId: project.projectId });
  await saveBytes(name, 'application/octet-stream', new Uint8Array(bytes));
}

export const FILE_COMMANDS: readonly Command[] = [
  {
    name: 'file.open',
    label: 'Open layout, board or sources file…',
    group: 'File',
    keys: ['Mod+O'],
    run: async () => openFiles(await chooseFiles()),
  },
  { name: 'project.new', label: 'New project', group: 'File', run: () => openProject() },
  { name: 'project.sample', label: 'Open the sample project', group: 'File', run: openSample },
  { name: 'project.open', label: 'Open project…', group: 'File', isEnabled: hasDialogs, run: chooseProject },
  { name: 'project.save', label: 'Save', group: 'File', keys: ['Mod+S'], isEnabled: hasProject, run: save },
  {
    name: 'project.save-as',
    label: 'Save project as…',
    group: 'File',
    keys: ['Mod+Shift+S'],
    isEnabled: () => hasProject() && hasDialogs(),
    run: saveProjectAs,
  },
  { name: 'project.export', label: 'Export project file', group: 'File', isEnabled: hasProject, run: exportProject },
  { name: 'project.close', label: 'Close project', group: 'File', isEnabled: hasProject, run: closeProject },
];
