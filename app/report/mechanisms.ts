import type { Contributor } from '../estimate/result.ts';

/** A way in which the board radiates, whoever drives it: trace pairs, current loops, the planes, one cable. */
export interface Mechanism {
  readonly kind: 'pair' | 'loop' | 'plane' | 'cable' | 'stated-cable';
  /** Of a cable; empty otherwise. */
  readonly name: string;
}

/** Order in which they are listed, cables by name. */
const KINDS: readonly Mechanism['kind'][] = ['pair', 'loop', 'plane', 'cable', 'stated-cable'];

export const inListOrder = (one: Mechanism, other: Mechanism): number =>
  KINDS.indexOf(one.kind) - KINDS.indexOf(other.kind) || (one.name === other.name ? 0 : one.name < other.name ? -1 : 1);

/** In the reader's words; `cableName` shortens or escapes the name of a cable. */
export function mechanismText({ kind, name }: Mechanism, cableName: (name: string) => string): string {
  switch (kind) {
    case 'pair':
      return 'trace pairs';
    case 'loop':
      return 'current loops';
    case 'plane':
      return 'plane';
    case 'cable':
      return cableName(name);
    case 'stated-cable':
      return `${cableName(name)} (stated current)`;
  }
}

/** Driven by the board itself through planes and cables: only there when the structure was solved. */
export const isStructural = ({ kind }: Mechanism): boolean => kind === 'plane' || kind === 'cable';

/** Hands out one object for each mechanism, so that objects can be compared and serve as keys. */
export class MechanismList {
  readonly #byPath = { net: new Map<string, Mechanism>(), loop: new Map<string, Mechanism>() };
  readonly #all = new Map<string, Mechanism>();

  /** The mechanism behind one path of a contributor. */
  of({ kind, name }: Contributor, path: string): Mechanism {
    if (kind === 'cable') return this.#one({ kind: 'stated-cable', name });
    const known = this.#byPath[kind].get(path);
    if (known) return known;
    const mechanism = this.#one(mechanismOf(kind, path));
    this.#byPath[kind].set(path, mechanism);
    return mechanism;
  }

  #one(mechanism: Mechanism): Mechanism {
    const key = `${mechanism.kind} ${mechanism.name}`;
    const held = this.#all.get(key);
    if (held) return held;
    this.#all.set(key, mechanism);
    return mechanism;
  }
}

function mechanismOf(kind: 'net' | 'loop', path: string): Mechanism {
  if (path === 'plane') return { kind: 'plane', name: '' };
  if (path === 'pair' || (kind === 'loop' && path === 'loop'))
    return { kind: kind === 'net' ? 'pair' : 'loop', name: '' };
  return { kind: 'cable', name: path };
}
