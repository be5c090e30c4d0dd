import { call } from '../api/api.ts';
import type { Command } from '../commands/command.ts';
import { isEnabled } from '../commands/run-command.ts';
import { getState, subscribe } from '../state/app-store.ts';

const SETTLE_MS = 150;

/** Keeps the system's menu, where the host has one, as the commands are. The returned function ends it. */
export function followNativeMenu(commands: readonly Command[]): () => void {
  if (getState().info?.host !== 'window') return () => undefined;
  let shown = '';
  const show = () => {
    const entries = commands.map((command) => ({
      name: command.name,
      label: command.label,
      group: command.group,
      keys: command.keys?.[0] ?? null,
      isEnabled: isEnabled(command),
    }));
    const text = JSON.stringify(entries);
    if (text === shown) return;
    shown = text;
    void call('window.menu', { commands: entries });
  };
  let timer: ReturnType<typeof setTimeout> | undefined;
  show();
  const end = subscribe(() => {
    clearTimeout(timer);
    timer = setTimeout(show, SETTLE_MS);
  });
  return () => {
    clearTimeout(timer);
    end();
  };
}
