import type { BoardFile } from '../../board/board-file.ts';
import { countText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';
import type { Renames } from '../own-levels.ts';
import { copperKeys, type Net, sharedNanometres } from './copper-key.ts';
import { type Draft, draft, pairUp, sameData, wideDraft } from './draft.ts';
import { chainLengthMm, sameChain } from './place-text.ts';
import { traceText } from './trace-text.ts';
import { joined, lengthMmText, numberChange, numberText, ohmChange, placeMmText, type Words } from './words.ts';

type Scale = (valueMm: number) => number;
type Via = NonNullable<Net['vias']>[number];

/**
 * What changed about each net's copper, one change a net. `before` has layers and nets under their new names.
 * The copper of a net that carries a plane (its vias above all) takes part in the returns of every other net.
 */
export function netChanges(before: BoardFile, after: BoardFile): Draft[] {
  const planeNets = new Set([...(before.planes ?? []), ...(after.planes ?? [])].map(({ net }) => net));
  return pairUp(before.nets, after.nets, ({ name }) => name).flatMap(({ one, other }) => {
    const { name } = (other ?? one)!;
    if (one && other && sameData(one, other)) return [];
    const say = planeNets.has(name) ? wideDraft : draft;
    const subject = { nets: [name] };
    if (!one) return [say('net', `net ${shortName(name)} added (${netText(other!)})`, subject)];
    if (!other) return [say('net', `net ${shortName(name)} removed (${netText(one)})`, subject)];
    const scale = sharedNanometres([...coordinates(one), ...coordinates(other)]);
    const copper = joined([
      traceText(one.traces, other.traces, scale),
      viaText(one.vias ?? [], other.vias ?? [], scale),
      pinText(one, other, scale),
    ]);
    const overrides = joined([
      ohmChange('stated Z0', one.z0Ohm, other.z0Ohm),
      numberChange('stated effective permittivity', one.epsilonEff, other.epsilonEff, ''),
      returnText(one.returnPath, other.returnPath),
    ]);
    const text = joined([copper, overrides]);
    const kind = copper?.startsWith('trace') ? 'trace' : 'net';
    return text === undefined ? [] : [say(kind, `${shortName(name)}: ${text}`, subject)];
  });
}

const lengthMmOf = ({ traces }: Net): number =>
  (traces ?? []).reduce((sum, { pointsMm }) => sum + chainLengthMm(pointsMm), 0);

function netText(net: Net): string {
  const vias = net.vias?.length ?? 0;
  return `${lengthMmText(lengthMmOf(net))} mm of trace${vias > 0 ? `, ${countText(vias, 'via')}` : ''}`;
}

function coordinates({ traces, vias, pins }: Net): number[] {
  return [
    ...(traces ?? []).flatMap(({ widthMm, pointsMm }) => [widthMm, ...pointsMm.flat()]),
    ...(vias ?? []).flatMap(({ atMm, drillMm }) => [drillMm, ...atMm]),
    ...(pins ?? []).flatMap(({ atMm }) => atMm),
  ];
}

const placeKey = ([x, y]: readonly [number, number], scale: Scale): string => `${scale(x)} ${scale(y)}`;

/** From either end: a via from TOP to BOT is one from BOT to TOP. */
const viaKey = ({ atMm, fromLayer, toLayer }: Via, scale: Scale): string =>
  JSON.stringify([placeKey(atMm, scale), ...[fromLayer, toLayer].sort()]);

function viaText(before: readonly Via[], after: readonly Via[], scale: Scale): Words {
  const pairs = pairUp(before, after, (via) => viaKey(via, scale));
  const added = pairs.flatMap(({ one, other }) => (!one && other ? [other] : []));
  const removed = pairs.flatMap(({ one, other }) => (one && !other ? [one] : []));
  const drilled = pairs.filter(({ one, other }) => one && other && scale(one.drillMm) !== scale(other.drillMm));
  const moved = Math.min(added.length, removed.length);
  const first = drilled[0];
  return joined([
    moved > 0 ? `${countText(moved, 'via')} moved` : undefined,
    comeOrGone(added, added.length - moved, 'added'),
    comeOrGone(removed, removed.length - moved, 'removed'),
    first &&
      `drill of ${countText(drilled.length, 'via')} ${numberText(first.one!.drillMm)} → ${numberText(first.other!.drillMm)} mm`,
  ]);
}

function comeOrGone(vias: readonly Via[], count: number, verb: string): Words {
  if (count <= 0) return undefined;
  return count === 1 && vias.length === 1
    ? `via ${verb} at ${placeMmText(vias[0]!.atMm)}`
    : `${countText(count, 'via')} ${verb}`;
}

/** Pins by name; the first that moved is named, the others counted. */
function pinText(before: Net, after: Net, scale: Scale): Words {
  const pairs = pairUp(before.pins, after.pins, ({ name }) => name);
  const added = pairs.flatMap(({ one, other }) => (!one && other ? [other.name] : []));
  const removed = pairs.flatMap(({ one, other }) => (one && !other ? [one.name] : []));
  const moved = pairs.filter(
    ({ one, other }) =>
      one && other && (one.layer !== other.layer || placeKey(one.atMm, scale) !== placeKey(other.atMm, scale)),
  );
  const first = moved[0];
  return joined([
    first && pinMove(first.one!, first.other!),
    moved.length > 1 ? `${countText(moved.length - 1, 'other pin')} moved` : undefined,
    comeOrGonePins(added, 'added'),
    comeOrGonePins(removed, 'removed'),
  ]);
}

type Pin = NonNullable<Net['pins']>[number];

function pinMove(one: Pin, other: Pin): string {
  const side = one.layer === other.layer ? '' : ` from ${shortName(one.layer)} to ${shortName(other.layer)}`;
  const [from, to] = [placeMmText(one.atMm), placeMmText(other.atMm)];
  const way = from === to ? '' : ` from ${from.replace(' mm', '')} to ${to}`;
  return `pin ${shortName(other.name)} moved${side}${way}`;
}

const comeOrGonePins = (names: readonly string[], verb: string): Words =>
  names.length === 0
    ? undefined
    : names.length === 1
      ? `pin ${shortName(names[0]!)} ${verb}`
      : `${countText(names.length, 'pin')} ${verb}`;

function returnText(before: Net['returnPath'], after: Net['returnPath']): Words {
  if (!before || !after) return before === after ? undefined : `named return path ${after ? 'added' : 'removed'}`;
  const isSame = before.layer === after.layer && sameChain(before.pointsMm, after.pointsMm);
  return isSame ? undefined : 'another named return path';
}

/**
 * Nets that probably only changed their name: gone and new ones with exactly the same copper, pins' places included,
 * where no third net has it too.
 */
export function netRenames(before: BoardFile, after: BoardFile): Renames {
  const [was, is] = [before, after].map(({ nets }) => new Set(nets.map(({ name }) => name))) as [
    Set<string>,
    Set<string>,
  ];
  const gone = byCopper(before.nets.filter(({ name }) => !is.has(name)));
  const added = byCopper(after.nets.filter(({ name }) => !was.has(name)));
  const renames = new Map<string, string>();
  for (const [key, names] of gone) {
    const next = added.get(key);
    if (names.length === 1 && next?.length === 1) renames.set(names[0]!, next[0]!);
  }
  return renames;
}

/** Names by copper; nets without any have nothing to be known by. */
function byCopper(nets: readonly Net[]): Map<string, string[]> {
  const found = new Map<string, string[]>();
  for (const net of nets) {
    const scale = sharedNanometres(coordinates(net));
    const places = [
      ...(net.vias ?? []).map((via) => viaKey(via, scale)),
      ...(net.pins ?? []).map(({ atMm, layer }) => JSON.stringify([layer, placeKey(atMm, scale)])),
    ].sort();
    const key = JSON.stringify([[...copperKeys(net.traces, scale)].sort(), places]);
    if ((net.traces ?? []).length + places.length === 0) continue;
    found.set(key, [...(found.get(key) ?? []), net.name]);
  }
  return found;
}
