import type { LayoutPart } from '../../app/project/board-parts.ts';

type NetFile = LayoutPart['nets'][number];
type PointMm = readonly [xMm: number, yMm: number];

/** A pin of the moved copper has to be within a pad's reach of one of the net's vias (as where copper is joined). */
const PAD_REACH_MM = 0.6;

/**
 * A net's traces of one copper layer on another one, same path and width; the layout, or why it cannot be, in words.
 *
 * Refused where the copper would come apart: a pin on the old layer without a via of the net beside it that reaches the new one,
 * a via that joined the traces to another layer and does not reach the new one; and on a layer that holds a plane. Whether
 * the new place is free of other nets' copper is the layout program's business.
 */
export function withTracesMoved(layout: LayoutPart, name: string, from: string, to: string): LayoutPart | string {
  const net = layout.nets.find((candidate) => candidate.name === name);
  const index = new Map(layout.stackup.map((row, i) => [row.name, i]));
  const target = index.get(to);
  if (net === undefined || target === undefined) return `There is no net ${name} or no layer ${to}`;
  const plane = layout.planes?.find(({ layer }) => layer === to);
  if (plane !== undefined) return `${to} holds the plane ${plane.net}: traces there would have to be cut into it`;
  const moved = (net.traces ?? []).filter(({ layer }) => layer === from);
  const meets = (at: PointMm, reachMm: number) =>
    moved.some(({ pointsMm, widthMm }) => distanceToLineMm(at, pointsMm) <= reachMm + widthMm / 2);
  const source = index.get(from)!;
  const spans = ({ fromLayer, toLayer }: NonNullable<NetFile['vias']>[number], layer: number) => {
    const [a, b] = [index.get(fromLayer)!, index.get(toLayer)!];
    return layer >= Math.min(a, b) && layer <= Math.max(a, b);
  };
  for (const via of net.vias ?? []) {
    if (!spans(via, source) || spans(via, target) || !meets(via.atMm, via.drillMm)) continue;
    return `The via at ${placeText(via.atMm)} joins ${from} but does not reach ${to}: the net would come apart there`;
  }
  for (const pin of net.pins ?? []) {
    if (pin.layer !== from || !meets(pin.atMm, PAD_REACH_MM)) continue;
    const hasVia = net.vias?.some(
      (via) => spans(via, source) && spans(via, target) && distanceMm(via.atMm, pin.atMm) <= PAD_REACH_MM,
    );
    if (!hasVia)
      return `Pin ${pin.name} is on ${from} and has no via to ${to} beside it: place one in the layout first`;
  }
  const traces = (net.traces ?? []).map((trace) => (trace.layer === from ? { ...trace, layer: to } : trace));
  return { ...layout, nets: layout.nets.map((other) => (other === net ? { ...net, traces } : other)) };
}

const placeText = ([xMm, yMm]: PointMm): string => `${Number(xMm.toFixed(2))} / ${Number(yMm.toFixed(2))} mm`;

const distanceMm = ([ax, ay]: PointMm, [bx, by]: PointMm): number => Math.hypot(ax - bx, ay - by);

function distanceToLineMm(at: PointMm, points: readonly PointMm[]): number {
  let least = Infinity;
  for (const [i, to] of points.slice(1).entries()) {
    const from = points[i]!;
    const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
    const square = dx * dx + dy * dy;
    const along = square === 0 ? 0 : ((at[0] - from[0]) * dx + (at[1] - from[1]) * dy) / square;
    const part = Math.min(1, Math.max(0, along));
    least = Math.min(least, distanceMm(at, [from[0] + part * dx, from[1] + part * dy]));
  }
  return least;
}
