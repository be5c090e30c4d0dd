import { useEffect } from 'react';
import { call } from '../api/api.ts';
import { isEnabled } from '../commands/run-command.ts';
import { getState, subscribe } from '../state/app-store.ts';
import { COMMANDS } from './use-commands.ts';

const WAIT_MS = 150;

/** Keeps the system's own menu, where the host has one, like the commands: their names, and which can be used now. */
export function useSystemMenu(): void {
  useEffect(() => {
    if (getState().info?.host !== 'window') return;
    let timer: ReturnType<typeof setTimeout> | undefined;
    let shown = '';
    const show = () => {
      timer = undefined;
      const commands = COMMANDS.map((command) => ({
        name: command.name,
        label: command.label,
        group: command.group,
        keys: command.keys?.[0] ?? null,
        isEnabled: isEnabled(command),
      }));
      const next = JSON.stringify(commands);
      if (next === shown) return;
      shown = next;
      // Without a menu everything can still be done in the window.
      void call('window.menu', { commands }).catch(() => {});
    };
    const end = subscribe(() => {
      timer ??= setTimeout(show, WAIT_MS);
    });
    show();
    return () => {
      end();
      clearTimeout(timer);
    };
  }, []);
}
