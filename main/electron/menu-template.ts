import type { MenuItemConstructorOptions } from 'electron';
import type { MenuCommands } from '../rpc/context.ts';

/** The menu bar: the window's commands by their groups, and beside them what only the system can do. `run` is given a command's name. */
export function menuTemplate(
  commands: MenuCommands,
  run: (name: string) => void,
  platform: string,
): MenuItemConstructorOptions[] {
  const isMac = platform === 'darwin';
  const groups = [...new Set(commands.map(({ group }) => group))];
  const menus = groups.map((group): MenuItemConstructorOptions => {
    const own = commands.filter((command) => command.group === group).map((command) => itemOf(command, run));
    return { label: group, submenu: [...own, ...systemItems(group, isMac)] };
  });
  return isMac ? [{ role: 'appMenu' }, ...menus, { role: 'windowMenu' }] : menus;
}

const itemOf = (command: MenuCommands[number], run: (name: string) => void): MenuItemConstructorOptions => ({
  label: command.label,
  enabled: command.isEnabled,
  ...(command.keys !== null && { accelerator: acceleratorOf(command.keys) }),
  // Shown only: the window itself listens to keys, and a text field may have another use for them.
  registerAccelerator: false,
  click: () => run(command.name),
});

const SYSTEM_NAMES = new Map([
  ['Mod', 'CommandOrControl'],
  ['ArrowLeft', 'Left'],
  ['ArrowRight', 'Right'],
  ['ArrowUp', 'Up'],
  ['ArrowDown', 'Down'],
  ['+', 'Plus'],
]);

/** `Mod+Shift+Z` in the system's words. */
const acceleratorOf = (keys: string): string =>
  keys
    .split('+')
    .map((key) => SYSTEM_NAMES.get(key) ?? key)
    .join('+');

function systemItems(group: string, isMac: boolean): MenuItemConstructorOptions[] {
  switch (group) {
    case 'File':
      return isMac ? [{ type: 'separator' }, { role: 'close' }] : [{ type: 'separator' }, { role: 'quit' }];
    case 'Edit':
      return [{ type: 'separator' }, { role: 'cut' }, { role: 'copy' }, { role: 'paste' }, { role: 'selectAll' }];
    case 'View':
      return [
        { type: 'separator' },
        { role: 'resetZoom' },
        { role: 'zoomIn' },
        { role: 'zoomOut' },
        { role: 'togglefullscreen' },
      ];
    default:
      return [];
  }
}
