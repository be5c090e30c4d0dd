/** Keys of commands: `Mod+Shift+Z`. Mod is Ctrl, on a Mac Command. */

export interface KeyPress {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
  readonly shiftKey: boolean;
}

interface Chord {
  readonly key: string;
  readonly mod: boolean;
  readonly alt: boolean;
  readonly shift: boolean;
}

function chordOf(keys: string): Chord {
  const parts = keys.split('+');
  const has = (name: string) => parts.includes(name);
  return { key: parts.at(-1)!, mod: has('Mod'), alt: has('Alt'), shift: has('Shift') };
}

/** A sign that needs Shift on some keyboards (`?`) is compared as a sign: Shift does not count. */
const isSign = (key: string): boolean => key.length === 1 && key.toLowerCase() === key.toUpperCase() && !/\d/.test(key);

export function isPressed(keys: string, press: KeyPress, isMac: boolean): boolean {
  const chord = chordOf(keys);
  const mod = isMac ? press.metaKey : press.ctrlKey;
  const other = isMac ? press.ctrlKey : press.metaKey;
  if (mod !== chord.mod || other || press.altKey !== chord.alt) return false;
  if (!isSign(chord.key) && press.shiftKey !== chord.shift) return false;
  return press.key.toLowerCase() === chord.key.toLowerCase();
}

const MAC_SIGNS: Readonly<Record<string, string>> = { Mod: '⌘', Alt: '⌥', Shift: '⇧' };
const SHOWN: Readonly<Record<string, string>> = {
  Mod: 'Ctrl',
  Escape: 'Esc',
  ArrowLeft: '←',
  ArrowRight: '→',
  ArrowUp: '↑',
  ArrowDown: '↓',
};

/** As people read it: "Ctrl+Shift+Z", "⌘⇧Z". */
export function keysText(keys: string, isMac: boolean): string {
  const parts = keys.split('+');
  if (isMac) return parts.map((part) => MAC_SIGNS[part] ?? SHOWN[part] ?? part).join('');
  return parts.map((part) => SHOWN[part] ?? part).join('+');
}

export const IS_MAC = typeof navigator !== 'undefined' && /Mac/.test(navigator.platform);
