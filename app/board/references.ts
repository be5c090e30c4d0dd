import { describe, inputError } from '../errors.ts';
import type { BoardFile } from './board-file.ts';
import { oneOf } from './near-names.ts';

type NetFile = BoardFile['nets'][number];

/** Looks names of a file up; a name that is not there is an error with the nearest ones. */
export class References {
  readonly #nets: ReadonlyMap<string, NetFile>;
  readonly #unitOf: ReadonlyMap<string, 'V' | 'A' | undefined>;

  /** `quantity` absent: the waveform's unit is not known yet and not asked for. */
  constructor(
    nets: readonly NetFile[],
    waveforms: readonly { readonly name: string; readonly quantity?: 'V' | 'A' }[],
  ) {
    this.#nets = new Map(nets.map((net) => [net.name, net]));
    this.#unitOf = new Map(waveforms.map((waveform) => [waveform.name, waveform.quantity]));
  }

  net(name: string, path: string): NetFile {
    const net = this.#nets.get(name);
    if (net === undefined) throw inputError(path, oneOf('the name of a net', name, [...this.#nets.keys()]), name);
    return net;
  }

  waveform(name: string, path: string, unit?: 'V' | 'A'): void {
    if (!this.#unitOf.has(name)) {
      throw inputError(path, oneOf('the name of a waveform', name, [...this.#unitOf.keys()]), name);
    }
    const own = this.#unitOf.get(name);
    if (unit === undefined || own === undefined || own === unit) return;
    const [wanted, has] = unit === 'V' ? ['volts, as for any drive', 'amperes'] : ['amperes, as for any loop', 'volts'];
    throw inputError(path, `a waveform in ${wanted} (this one is in ${has})`, name);
  }

  pin(net: NetFile, name: string, path: string): void {
    const names = (net.pins ?? []).map((pin) => pin.name);
    if (!names.includes(name)) throw inputError(path, oneOf(`a pin of net ${describe(net.name)}`, name, names), name);
  }
}

/** Refuses the second of two equal names in a list. */
export function refuseDuplicates(names: readonly string[], pathOf: (index: number) => string): void {
  const firstAt = new Map<string, number>();
  for (const [i, name] of names.entries()) {
    const first = firstAt.get(name);
    if (first !== undefined) throw inputError(pathOf(i), `a name not used before (${pathOf(first)} has it)`, name);
    firstAt.set(name, i);
  }
}
