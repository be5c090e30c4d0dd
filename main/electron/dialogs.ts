import { type BrowserWindow, dialog } from 'electron';
import type { Dialogs } from '../rpc/context.ts';
import { PROJECT_ENDING } from '../rpc/new-project-file.ts';
import { fileNameOf } from './file-name.ts';

const PROJECTS = { name: 'Quietboard project', extensions: [PROJECT_ENDING.slice(1)] };

/** The system's dialogs, over the program's window. */
export function systemDialogs(window: () => BrowserWindow | null): Dialogs {
  const save = async (options: Electron.SaveDialogOptions): Promise<string | null> => {
    const parent = window();
    const answer = await (parent ? dialog.showSaveDialog(parent, options) : dialog.showSaveDialog(options));
    return answer.canceled || answer.filePath === '' ? null : answer.filePath;
  };
  return {
    openProject: async () => {
      const parent = window();
      const options: Electron.OpenDialogOptions = { filters: [PROJECTS], properties: ['openFile'] };
      const answer = await (parent ? dialog.showOpenDialog(parent, options) : dialog.showOpenDialog(options));
      return answer.canceled ? null : (answer.filePaths[0] ?? null);
    },
    saveProject: (name) => save({ defaultPath: fileNameOf(`${name}${PROJECT_ENDING}`), filters: [PROJECTS] }),
    saveFile: (name) => save({ defaultPath: fileNameOf(name) }),
  };
}
