import type { RunDocument } from '../../project/stored-run.ts';
import { shortName } from '../../report/markup.ts';
import { type Draft, draft } from './draft.ts';
import { type SampledWaveform, waveformParts, waveformWords } from './waveform-parts.ts';
import { namesText } from './words.ts';

/** Waveforms of both documents by name, those of the first under their new names. */
export interface WaveformSets {
  readonly before: ReadonlyMap<string, SampledWaveform>;
  readonly after: ReadonlyMap<string, SampledWaveform>;
  /** Old name → new name where only the name changed. */
  readonly renames: ReadonlyMap<string, string>;
}

export function waveformSets(before: RunDocument, after: RunDocument): WaveformSets {
  const [one, other] = [byName(before), byName(after)];
  const gone = [...one.values()].filter(({ waveform }) => !other.has(waveform.name));
  const added = [...other.values()].filter(({ waveform }) => !one.has(waveform.name));
  const renames = new Map<string, string>();
  const taken = new Set<string>();
  for (const old of gone) {
    const found = added.find((next) => !taken.has(next.waveform.name) && waveformParts(old, next) === undefined)
      ?.waveform.name;
    if (found === undefined) continue;
    renames.set(old.waveform.name, found);
    taken.add(found);
  }
  return {
    before: new Map([...one].map(([name, waveform]) => [renames.get(name) ?? name, waveform])),
    after: other,
    renames,
  };
}

function byName({ board, samples }: RunDocument): Map<string, SampledWaveform> {
  // A file may be called "__proto__".
  const columns = new Map(Object.entries(samples));
  return new Map(
    (board.waveforms ?? []).map((waveform) => [
      waveform.name,
      { waveform, columns: waveform.kind === 'samples' ? columns.get(waveform.file) : undefined },
    ]),
  );
}

/** Nets and loops that a waveform feeds. */
interface Users {
  readonly nets: readonly string[];
  readonly loops: readonly string[];
}

/** What changed inside waveforms of one name, said of the nets and loops they feed; unused ones under their own name. */
export function waveformChanges(before: RunDocument, after: RunDocument, sets: WaveformSets): Draft[] {
  const users = usersOf([
    { document: before, nameOf: (name) => sets.renames.get(name) ?? name },
    { document: after, nameOf: (name) => name },
  ]);
  const names = [...new Set([...sets.before.keys(), ...sets.after.keys()])];
  return names.flatMap((name) => {
    const [one, other] = [sets.before.get(name), sets.after.get(name)];
    const { nets = [], loops = [] } = users.get(name) ?? {};
    const who = namesText([...nets, ...loops]) || `waveform ${shortName(name)} (unused)`;
    if (!one || !other) {
      // A waveform that comes or goes with a drive or loop is said there.
      if (nets.length + loops.length > 0) return [];
      const text = one ? 'removed' : `added, ${waveformWords(other!.waveform)}`;
      return [draft('waveform', `${who} ${text}`)];
    }
    const parts = waveformParts(one, other);
    return parts === undefined ? [] : [draft('waveform', `${who}: ${parts}`, { nets, loops })];
  });
}

/** By the waveform's (new) name; only those that use it on both sides when there are any. */
function usersOf(
  sides: readonly { document: RunDocument; nameOf: (name: string) => string }[],
): ReadonlyMap<string, Users> {
  const users = new Map<string, { nets: Set<string>; loops: Set<string> }>();
  const of = (waveform: string) => {
    const held = users.get(waveform) ?? { nets: new Set<string>(), loops: new Set<string>() };
    users.set(waveform, held);
    return held;
  };
  for (const { document, nameOf } of sides) {
    for (const { net, waveform } of document.board.drives ?? []) of(nameOf(waveform)).nets.add(net);
    for (const { name, waveform } of document.board.loops ?? []) of(nameOf(waveform)).loops.add(name);
  }
  return new Map([...users].map(([name, { nets, loops }]) => [name, { nets: [...nets], loops: [...loops] }]));
}
