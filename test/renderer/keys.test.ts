import { describe, expect, it } from 'vitest';
import { isPressed, type KeyPress, keysText } from '../../renderer/commands/keys.ts';

/** Oracle: `KeyboardEvent.key` as the UI Events specification gives it for each press. */

const press = (key: string, modifiers: Partial<KeyPress> = {}): KeyPress => ({
  key,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
  shiftKey: false,
  ...modifiers,
});

describe('keys of commands', () => {
  it.each([
    ['Mod+Z', press('z', { ctrlKey: true }), false, true],
    ['Mod+Z', press('Z', { ctrlKey: true, shiftKey: true }), false, false],
    ['Mod+Shift+Z', press('Z', { ctrlKey: true, shiftKey: true }), false, true],
    ['Mod+Z', press('z', { metaKey: true }), false, false],
    ['Mod+Z', press('z', { metaKey: true }), true, true],
    ['Mod+Z', press('z', { ctrlKey: true }), true, false],
    ['Mod+Z', press('z', { ctrlKey: true, altKey: true }), false, false],
    ['?', press('?', { shiftKey: true }), false, true],
    ['?', press('?'), false, true],
    ['?', press('?', { ctrlKey: true }), false, false],
    ['Escape', press('Escape'), false, true],
    ['ArrowRight', press('ArrowRight'), false, true],
    ['ArrowRight', press('ArrowRight', { shiftKey: true }), false, false],
    ['Alt+1', press('1', { altKey: true }), false, true],
    ['Mod+.', press('.', { ctrlKey: true }), false, true],
    ['F1', press('F1'), false, true],
  ])('%s', (keys, event, isMac, expected) => {
    expect(isPressed(keys, event, isMac)).toBe(expected);
  });

  it('read as on the user’s keyboard', () => {
    expect(keysText('Mod+Shift+Z', false)).toBe('Ctrl+Shift+Z');
    expect(keysText('Mod+Shift+Z', true)).toBe('⌘⇧Z');
    expect(keysText('Escape', false)).toBe('Esc');
  });
});
