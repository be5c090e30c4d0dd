import { attempt } from '../state/notices.ts';
import type { Command } from './command.ts';
import { IS_MAC, isPressed, keysText } from './keys.ts';

export const isEnabled = (command: Command): boolean => command.isEnabled?.() ?? true;

/** Runs a command that is enabled; a failure becomes a notice. */
export function runCommand(command: Command): void {
  if (isEnabled(command)) void attempt(command.label.replace(/…$/, ''), async () => command.run());
}

/** The first of its keys, for people. */
export const keysOf = ({ keys }: Command): string | undefined =>
  keys?.[0] === undefined ? undefined : keysText(keys[0], IS_MAC);

/** Elements that use keys of their own. */
const TEXT = 'input, textarea, [contenteditable="true"]';
const OWN_ARROWS =
  '[role="tab"], [role="menu"], [role="listbox"], [role="grid"], [role="slider"], [role="separator"], [role="radiogroup"], select, [data-own-arrows]';

/**
 * Finds the command of a key press. In a text field only keys with Mod or a function key count, and undo is the field's own
 * while it holds something not yet taken over.
 */
export function commandOf(commands: readonly Command[], event: KeyboardEvent): Command | undefined {
  if (event.defaultPrevented || event.isComposing) return undefined;
  const command = commands.find(({ keys }) => keys?.some((key) => isPressed(key, event, IS_MAC)));
  // What lies over the window has the keys for itself.
  if (document.querySelector('[role="dialog"]') !== null) return undefined;
  if (command === undefined || !(event.target instanceof Element)) return command;
  const field = event.target.closest(TEXT);
  const isPlain = !event.ctrlKey && !event.metaKey && !event.altKey && event.key !== 'F1';
  if (field !== null && (isPlain || field.hasAttribute('data-dirty'))) return undefined;
  if (event.key.startsWith('Arrow') && event.target.closest(OWN_ARROWS) !== null) return undefined;
  return command;
}
