import { existsSync } from 'node:fs';
import type { Handlers, Output } from '../../../app/contract/procedures.ts';
import { projectNameOf } from '../../db/project.ts';
import type { HostContext } from '../context.ts';
import { newProjectFile, PROJECT_ENDING, projectFile } from '../new-project-file.ts';
import { projectBytes } from '../project-bytes.ts';
import { makeSampleProject } from '../sample-project.ts';

type ProjectHandlers = Pick<
  Handlers,
  | 'project.recent'
  | 'project.open'
  | 'project.open-sample'
  | 'project.info'
  | 'project.rename'
  | 'project.save-as'
  | 'project.export'
  | 'project.close'
>;

export function projectHandlers(context: HostContext): ProjectHandlers {
  const { projects, projectsFolder, state, events } = context;
  const listRecent = ({ file, name }: Output<'project.info'>['project']) =>
    state.addRecent({ file, name, openedAt: new Date().toISOString() });
  const open = async (file: string, create: boolean, isBegun = false): Promise<Output<'project.open'>> => {
    const project = projects.open(file, create, isBegun);
    await listRecent(project);
    return { project };
  };
  return {
    // One that was moved or deleted leads nowhere.
    'project.recent': async () => ({ projects: (await state.recent()).filter(({ file }) => existsSync(file)) }),
    'project.open': async ({ file, create }) =>
      file === undefined
        ? open(newProjectFile(projectsFolder, 'Untitled'), true, true)
        : open(projectFile(projectsFolder, file), create),
    'project.open-sample': async () => open(await makeSampleProject(projectsFolder), false),
    'project.info': async ({ projectId }) => ({ project: projects.answer(projectId) }),
    'project.rename': async ({ projectId, name }) => {
      projects.get(projectId).setName(name);
      await listRecent(projects.answer(projectId));
      events.publish('project.changed', { projectId, what: 'info', clientId: null });
      return {};
    },
    'project.save-as': async ({ projectId, file }) => {
      const original = projects.get(projectId);
      const target = projectFile(projectsFolder, file);
      // The system's dialog has asked about a file that is there; without one nobody has.
      await original.backupTo(target, context.dialogs === null ? 'refuse' : 'replace');
      const isNamedAfterFile = original.info().name === projectNameOf(original.file);
      const copy = projects.open(target, false);
      if (isNamedAfterFile && !copy.isReadOnly) projects.get(copy.projectId).setName(projectNameOf(target));
      const project = projects.answer(copy.projectId);
      await listRecent(project);
      return { project };
    },
    'project.export': async ({ projectId }) => {
      const project = projects.get(projectId);
      return { name: `${project.info().name}${PROJECT_ENDING}`, bytes: await projectBytes(project) };
    },
    'project.close': async ({ projectId }) => {
      projects.close(projectId);
      return {};
    },
  };
}
