import { useLayoutEffect } from 'react';
import { on } from '../api/api.ts';
import type { Command } from '../commands/command.ts';
import { CORE_COMMANDS } from '../commands/core-commands.ts';
import { commandOf, runCommand } from '../commands/run-command.ts';
import { getState } from '../state/app-store.ts';
import { showTab } from '../state/tabs.ts';
import { followNativeMenu } from './native-menu.ts';
import { PANELS } from './panels.ts';

const TABS: readonly Command[] = PANELS.filter(({ place }) => place === 'tab').map(({ name, label }, i) => ({
  name: `tab.${name}`,
  label: `Show ${label}`,
  group: 'View',
  keys: [`Alt+${i + 1}`],
  isEnabled: () => getState().history !== null,
  run: () => {
    showTab(name);
    document.querySelector<HTMLElement>(`[role="tab"][data-key="${name}"]`)?.focus();
  },
}));

/** Everything that can be done, with what the parts bring. */
export const COMMANDS: readonly Command[] = [
  ...CORE_COMMANDS,
  ...TABS,
  ...PANELS.flatMap(({ commands }) => commands ?? []),
];

/** A command that is known to exist. */
export const commandNamed = (name: string): Command => COMMANDS.find((command) => command.name === name)!;

/** Keys and native menus run commands. */
export function useCommands(): void {
  // Before the first picture: the keys work as soon as anything is seen.
  useLayoutEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      const command = commandOf(COMMANDS, event);
      if (command === undefined) return;
      event.preventDefault();
      runCommand(command);
    };
    window.addEventListener('keydown', onKeyDown);
    const end = on('app.command', ({ name }) => {
      const command = COMMANDS.find((candidate) => candidate.name === name);
      if (command !== undefined) runCommand(command);
    });
    const endMenu = followNativeMenu(COMMANDS);
    return () => {
      window.removeEventListener('keydown', onKeyDown);
      end();
      endMenu();
    };
  }, []);
}
