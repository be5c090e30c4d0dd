import { Menu } from 'electron';
import type { MenuCommands } from '../rpc/context.ts';
import { menuTemplate } from './menu-template.ts';

/** Shows the window's commands in the system's menu. */
export function showMenu(commands: MenuCommands, run: (name: string) => void): void {
  Menu.setApplicationMenu(Menu.buildFromTemplate(menuTemplate(commands, run, process.platform)));
}
