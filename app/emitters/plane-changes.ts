import type { Board, Net, PointM } from '../board/board.ts';
import type { Finding } from '../estimate/result.ts';
import type { NetGraph } from '../network/net-graph.ts';
import type { NetStretch, PlaneIndex } from '../returns/reference.ts';
import type { PlacedSection } from './pair-elements.ts';

/** Planes under less than this of a trace (a corner, a pad) carry no return of their own, m. */
const SHORT_STRETCH_M = 1e-3;

/** The plane net under one end of a section. */
interface EndPlane {
  readonly net: string;
  readonly layerIndex: number;
  readonly atM: PointM;
}

/**
 * Places where a trace runs from over one net's plane to over another's on the same layer: nothing joins them but capacitors,
 * which the layout does not show. (A change to a plane of another layer: `placeCurrents`.)
 */
export function planeNetChanges(
  board: Board,
  planes: PlaneIndex,
  net: Net,
  graph: NetGraph,
  sections: readonly PlacedSection[],
): Finding[] {
  const findings: Finding[] = [];
  const report = (atM: PointM, layerIndex: number, from: string, to: string): void => {
    const layer = board.stackup[layerIndex]!.name;
    findings.push({
      code: 'return-changes-plane',
      net: net.name,
      message: `the trace moves the return from ${from} on ${layer} to ${to} on ${layer}; planes of different nets: the return must cross through a capacitor`,
      atM: [atM[0], atM[1]],
      layer,
    });
  };
  const atNode = new Map<number, EndPlane[]>();
  for (const { index, fromM, toM, lengthM, planes: references } of sections) {
    const [nearest] = [...references].sort((one, other) => one.heightM - other.heightM);
    if (!nearest) continue;
    const at = (t: number): PointM => [fromM[0] + t * (toM[0] - fromM[0]), fromM[1] + t * (toM[1] - fromM[1])];
    const { layerIndex } = nearest;
    const stretches = mainStretches(planes.netsAlong(layerIndex, fromM, toM, net.name), lengthM);
    for (const [i, { net: to, from }] of stretches.entries()) {
      const before = stretches[i - 1];
      if (before && before.net !== to) report(at((Math.min(before.to, from) + from) / 2), layerIndex, before.net, to);
    }
    const [first, last] = [stretches[0], stretches.at(-1)];
    if (!first || !last) continue;
    const { nodeA, nodeB } = graph.segments[index]!;
    atNode.set(nodeA, [...(atNode.get(nodeA) ?? []), { net: first.net, layerIndex, atM: fromM }]);
    atNode.set(nodeB, [...(atNode.get(nodeB) ?? []), { net: last.net, layerIndex, atM: toM }]);
  }
  for (const [one, ...others] of atNode.values()) {
    const other = others.find(({ net: to, layerIndex }) => to !== one!.net && layerIndex === one!.layerIndex);
    if (other) report(other.atM, other.layerIndex, one!.net, other.net);
  }
  return findings;
}

/** Stretches long enough to count and not inside another net's. */
function mainStretches(stretches: readonly NetStretch[], lengthM: number): NetStretch[] {
  const leastM = Math.min(SHORT_STRETCH_M, lengthM / 2);
  const main: NetStretch[] = [];
  for (const stretch of stretches) {
    const last = main.at(-1);
    if ((stretch.to - stretch.from) * lengthM < leastM || (last && stretch.to <= last.to)) continue;
    main.push(stretch);
  }
  return main;
}
