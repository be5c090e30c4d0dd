import type { BoardFile } from '../../board/board-file.ts';
import { countText } from '../../report/format.ts';
import { shortName } from '../../report/markup.ts';
import { type Draft, pairUp, wideDraft } from './draft.ts';
import { boxMm, ringKey, sizeMm } from './rings.ts';
import { joined, lengthMmText, numberChange, placeMmText, type Words } from './words.ts';

type Plane = NonNullable<BoardFile['planes']>[number];
type Ring = NonNullable<Plane['pointsMm']>;

/** Cut-outs named one by one; of more, the number and the largest. */
const NAMED_CUTOUTS = 3;

/** Planes that are the same on both sides go first, then pairs by layer and net, then by net: a plane may change its layer. */
export function planeChanges(before: BoardFile, after: BoardFile): Draft[] {
  const exact = unpaired(pairUp(before.planes, after.planes, planeKey));
  const onLayer = pairUp(exact.left, exact.right, ({ layer, net }) => JSON.stringify([layer, net]));
  const left = unpaired(onLayer);
  const onAnyLayer = pairUp(left.left, left.right, ({ net }) => net);
  return [...onLayer.filter(({ one, other }) => one && other), ...onAnyLayer].flatMap(({ one, other }) => {
    const { layer, net } = (other ?? one)!;
    const say = (text: string) => [wideDraft('plane', text, { nets: [net] })];
    const name = `plane ${shortName(net)} on layer ${shortName(layer)}`;
    if (!one) return say(`${name} added (${areaText(other!)})`);
    if (!other) return say(`${name} removed (${areaText(one)})`);
    const move = one.layer === layer ? undefined : `moved from layer ${shortName(one.layer)} to ${shortName(layer)}`;
    const parts = joined([move, shapeText(one, other), ...cutoutTexts(one, other)]);
    if (parts === undefined) return [];
    return say(move === undefined ? `${name}: ${parts}` : `plane ${shortName(net)} ${parts}`);
  });
}

const unpaired = (pairs: readonly { one: Plane | undefined; other: Plane | undefined }[]) => ({
  left: pairs.flatMap(({ one, other }) => (one && !other ? [one] : [])),
  right: pairs.flatMap(({ one, other }) => (other && !one ? [other] : [])),
});

const planeKey = ({ layer, net, pointsMm, cutoutsMm }: Plane): string =>
  JSON.stringify([layer, net, pointsMm && ringKey(pointsMm), (cutoutsMm ?? []).map(ringKey).sort()]);

function areaText({ pointsMm }: Plane): string {
  if (!pointsMm) return 'the whole outline';
  const [widthMm, heightMm] = sizeMm(pointsMm);
  return `${lengthMmText(widthMm)} × ${lengthMmText(heightMm)} mm`;
}

function shapeText(one: Plane, other: Plane): Words {
  if (!one.pointsMm || !other.pointsMm) {
    return one.pointsMm === other.pointsMm ? undefined : `${areaText(one)} → ${areaText(other)}`;
  }
  if (ringKey(one.pointsMm) === ringKey(other.pointsMm)) return undefined;
  return numberChange('area', ringAreaMm2(one.pointsMm), ringAreaMm2(other.pointsMm), 'mm²') ?? 'another shape';
}

function ringAreaMm2(ring: Ring): number {
  let twice = 0;
  for (let i = 0; i < ring.length; i++) {
    const [[ax, ay], [bx, by]] = [ring.at(i - 1)!, ring[i]!];
    twice += ax * by - ay * bx;
  }
  return Math.abs(Number((twice / 2).toFixed(3)));
}

function cutoutTexts(one: Plane, other: Plane): Words[] {
  const pairs = pairUp(one.cutoutsMm, other.cutoutsMm, ringKey);
  const added = pairs.flatMap((pair) => (!pair.one && pair.other ? [pair.other] : []));
  const removed = pairs.flatMap((pair) => (pair.one && !pair.other ? [pair.one] : []));
  return [...cutoutsText(added, 'added'), ...cutoutsText(removed, 'removed')];
}

function cutoutsText(cutouts: readonly Ring[], verb: string): Words[] {
  if (cutouts.length <= NAMED_CUTOUTS) {
    return cutouts.map((ring) => `cut-out of ${ringSize(ring)} ${verb} at ${placeMmText(centreMm(ring))}`);
  }
  const areas = cutouts.map(ringAreaMm2);
  const largest = cutouts[areas.indexOf(areas.reduce((most, area) => Math.max(most, area), 0))]!;
  return [
    `${countText(cutouts.length, 'cut-out')} ${verb}, the largest of ${ringSize(largest)} at ${placeMmText(centreMm(largest))}`,
  ];
}

function ringSize(ring: Ring): string {
  const [widthMm, heightMm] = sizeMm(ring);
  return `${lengthMmText(widthMm)} × ${lengthMmText(heightMm)} mm`;
}

function centreMm(ring: Ring): [number, number] {
  const [left, bottom, right, top] = boxMm(ring);
  return [(left + right) / 2, (bottom + top) / 2];
}
