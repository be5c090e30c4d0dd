import { describe, inputError } from '../errors.ts';
import type { BoardFile, SourcesFile } from './board-file.ts';
import { oneOf } from './near-names.ts';
import { matchNames } from './net-pattern.ts';
import { References, refuseDuplicates } from './references.ts';

/**
 * A board file with the sources of a separate file added. The sources file was named on purpose, so it wins:
 *
 * - a waveform, loop or cable replaces the board file's one of the same name;
 * - the drives it states for a net replace all drives the board file has for that net, and so do its loads;
 * - `*` in a drive's or load's net name stands for any characters (`matchNames`), one entry for every net it matches;
 *   a net that the same list also names in full keeps to that entry, so `"*"` can hold the rule and names the exceptions;
 *   a pattern passes over nets with a plane (ground, supplies) and nets without the pins it needs, and a load's pattern
 *   over nets that nothing drives.
 *
 * Throws `input` with the path in the sources file for a pattern or name without a net, an unknown waveform or pin.
 */
export function mergeSources(board: BoardFile, sources: SourcesFile): BoardFile {
  for (const list of ['waveforms', 'loops', 'cables'] as const) {
    const names = (sources[list] ?? []).map((entry) => entry.name);
    refuseDuplicates(names, (i) => `${list}[${i}].name`);
  }
  const waveforms = replaceByName(board.waveforms, sources.waveforms);
  const references = new References(board.nets, waveforms);
  const netNames = board.nets.map((net) => net.name);
  for (const [i, drive] of (sources.drives ?? []).entries()) {
    references.waveform(drive.waveform, `drives[${i}].waveform`);
  }
  for (const [i, loop] of (sources.loops ?? []).entries()) references.waveform(loop.waveform, `loops[${i}].waveform`);
  const planeNets = new Set((board.planes ?? []).map((plane) => plane.net));
  const choice = { netNames, planeNets, references };
  const given = expandNets(sources.drives ?? [], 'drives', { ...choice, leastPins: 1 });
  const drives = replaceByNet(board.drives ?? [], given);
  const driven = new Set(drives.map((drive) => drive.net));
  const loads = expandNets(sources.loads ?? [], 'loads', { ...choice, driven, leastPins: 2 });
  return {
    ...board,
    waveforms,
    drives,
    loads: replaceByNet(board.loads ?? [], loads),
    loops: replaceByName(board.loops, sources.loops),
    cables: replaceByName(board.cables, sources.cables),
  };
}

function replaceByName<T extends { readonly name: string }>(own: readonly T[] = [], given: readonly T[] = []): T[] {
  const replaced = new Set(given.map((entry) => entry.name));
  return [...own.filter((entry) => !replaced.has(entry.name)), ...given];
}

function replaceByNet<T extends { readonly net: string }>(own: readonly T[], given: readonly T[]): T[] {
  const replaced = new Set(given.map((entry) => entry.net));
  return [...own.filter((entry) => !replaced.has(entry.net)), ...given];
}

/** What a pattern may stand for, and what only a full name reaches. */
interface NetChoice {
  readonly netNames: readonly string[];
  readonly planeNets: ReadonlySet<string>;
  readonly references: References;
  /** The nets to choose from; absent: all. */
  readonly driven?: ReadonlySet<string>;
  /** Pins a net needs to take an entry that names none: a driver's, for loads one more. */
  readonly leastPins: number;
}

type Entry = { readonly net: string; readonly pin?: string | undefined };

function expandNets<T extends Entry>(entries: readonly T[], list: 'drives' | 'loads', choice: NetChoice): T[] {
  const { netNames, references } = choice;
  const known = new Set(netNames);
  const inFull = new Set(entries.map((entry) => entry.net).filter((net) => known.has(net)));
  return entries.flatMap((entry, i) => {
    const path = `${list}[${i}]`;
    if (known.has(entry.net) || !entry.net.includes('*')) {
      const net = references.net(entry.net, `${path}.net`);
      if (entry.pin !== undefined) references.pin(net, entry.pin, `${path}.pin`);
      return [entry];
    }
    const nets = matchNames(entry.net, netNames).filter((net) => canTake(entry, net, choice));
    if (nets.length > 0) return nets.filter((net) => !inFull.has(net)).map((net) => ({ ...entry, net }));
    const pins = entry.pin === undefined ? 'enough pins' : `a pin ${describe(entry.pin)}`;
    const what = `a pattern that fits ${choice.driven ? 'a driven net' : 'a net'} with ${pins} and no plane`;
    throw inputError(`${path}.net`, oneOf(what, entry.net, netNames), entry.net);
  });
}

function canTake(entry: Entry, name: string, { planeNets, references, driven, leastPins }: NetChoice): boolean {
  if (planeNets.has(name) || driven?.has(name) === false) return false;
  const pins = references.net(name, '').pins ?? [];
  return entry.pin === undefined ? pins.length >= leastPins : pins.some((pin) => pin.name === entry.pin);
}
