import type { Command } from '../commands/command.ts';
import { isEnabled, keysOf, runCommand } from '../commands/run-command.ts';
import type { MenuGroup } from '../components/menu.tsx';

const GROUPS: readonly Command['group'][] = ['File', 'Edit', 'Estimate', 'View', 'Help'];

/** The commands as a menu, group by group. */
export const menuGroups = (commands: readonly Command[]): MenuGroup[] =>
  GROUPS.map((label) => ({
    label,
    entries: commands
      .filter(({ group }) => group === label)
      .map((command) => ({
        name: command.name,
        label: command.label,
        keys: keysOf(command),
        isDisabled: !isEnabled(command),
        run: () => runCommand(command),
      })),
  })).filter(({ entries }) => entries.length > 0);
