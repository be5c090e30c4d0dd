import type { Handlers } from '../../../app/contract/procedures.ts';
import { AppError } from '../../../app/errors.ts';
import { writeBytes } from '../../files/write-text.ts';
import type { Dialogs, HostContext } from '../context.ts';

type DialogHandlers = Pick<
  Handlers,
  'window.menu' | 'dialog.open-project' | 'dialog.save-project' | 'dialog.save-bytes'
>;

export function dialogHandlers(context: HostContext): DialogHandlers {
  const dialogs = (): Dialogs => {
    if (context.dialogs === null) throw new AppError('input', 'this host has no dialogs: give the file by its path');
    return context.dialogs;
  };
  return {
    'window.menu': async ({ commands }) => {
      context.showMenu?.(commands);
      return {};
    },
    'dialog.open-project': async () => ({ file: await dialogs().openProject() }),
    'dialog.save-project': async ({ name }) => ({ file: await dialogs().saveProject(name) }),
    'dialog.save-bytes': async ({ name, bytes }) => {
      const file = await dialogs().saveFile(name);
      if (file !== null) await writeBytes(file, bytes);
      return { file };
    },
  };
}
