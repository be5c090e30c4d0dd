import type { Net } from '../board/board.ts';
import type { Finding } from '../estimate/result.ts';
import { gaussLegendre } from '../fields/quadrature.ts';
import type { NetGraph } from '../network/net-graph.ts';
import type { NetContext } from './net-context.ts';
import type { PlacedSection } from './pair-elements.ts';
import { pointsFor } from './pair-elements.ts';
import type { Leaving } from './posts.ts';
import type { RuleCollector } from './rule-collector.ts';
import { type Detour, type NetPlace, placeCurrents } from './transitions.ts';

/**
 * Adds the vertical currents of every place of a net (pins, vias, changes of reference) and the return's detours.
 * Returns what a reviewer should look at.
 */
export function addPlaces(
  collector: RuleCollector,
  context: NetContext,
  net: Net,
  graph: NetGraph,
  sections: readonly PlacedSection[],
  terminalNodes: ReadonlySet<number>,
): Finding[] {
  const findings: Finding[] = [];
  for (const place of placesOf(net, graph, sections, terminalNodes)) {
    if (isPlainJoint(place)) continue;
    const { posts, detours, finding } = placeCurrents(context.board, context.stitches, place);
    for (const { atM, lowM, highM, terms } of posts) {
      collector.add([atM[0], atM[1], (lowM + highM) / 2], [0, 0, highM - lowM], { kind: 'ends', terms });
    }
    for (const detour of detours) addDetour(collector, detour, context.maxHz);
    if (finding) findings.push(finding);
  }
  return findings;
}

function addDetour(collector: RuleCollector, { fromM, toM, zM, terms }: Detour, maxHz: number): void {
  const dx = toM[0] - fromM[0];
  const dy = toM[1] - fromM[1];
  const rule = gaussLegendre(pointsFor(Math.hypot(dx, dy), 1, maxHz));
  for (let i = 0; i < rule.nodes.length; i++) {
    const s = rule.nodes[i]!;
    const weight = rule.weights[i]!;
    collector.add([fromM[0] + s * dx, fromM[1] + s * dy, zM], [weight * dx, weight * dy, 0], { kind: 'ends', terms });
  }
}

/** Nodes joined by vias are one place. */
function placesOf(
  net: Net,
  graph: NetGraph,
  sections: readonly PlacedSection[],
  terminalNodes: ReadonlySet<number>,
): NetPlace[] {
  const parent = graph.nodes.map((_, i) => i);
  const find = (i: number): number => {
    let root = i;
    while (parent[root] !== root) root = parent[root]!;
    return root;
  };
  const withVia = new Set<number>();
  for (const { nodeA, nodeB } of graph.vias) {
    parent[find(nodeA)] = find(nodeB);
    withVia.add(nodeA).add(nodeB);
  }
  const places = new Map<number, { leaving: Leaving[]; planes: PlacedSection['planes'][number][]; nodes: number[] }>();
  const placeOf = (node: number) => {
    const root = find(node);
    const known = places.get(root) ?? { leaving: [], planes: [], nodes: [] };
    places.set(root, known);
    return known;
  };
  for (let node = 0; node < graph.nodes.length; node++) placeOf(node).nodes.push(node);
  for (const [i, segment] of graph.segments.entries()) {
    for (const isAtB of [false, true]) {
      const place = placeOf(isAtB ? segment.nodeB : segment.nodeA);
      for (const plane of sections[i]!.planes) {
        place.planes.push(plane);
        place.leaving.push(
          { zM: plane.traceZM, isReturn: false, term: { section: i, isAtB, factor: plane.share } },
          { zM: plane.planeZM, isReturn: true, term: { section: i, isAtB, factor: -plane.share } },
        );
      }
    }
  }
  return [...places.values()].map(({ leaving, planes, nodes }) => ({
    atM: graph.nodes[nodes[0]!]!.atM,
    net: net.name,
    hasTerminal: nodes.some((node) => terminalNodes.has(node)),
    hasVia: nodes.some((node) => withVia.has(node)),
    leaving,
    planes,
  }));
}

/** All currents meet at the same heights with the same shares and nothing leaves by a pin: no vertical current. */
function isPlainJoint({ hasTerminal, hasVia, planes }: NetPlace): boolean {
  if (hasTerminal || hasVia) return false;
  const first = new Map<number, number>();
  for (const { planeZM, share } of planes) {
    const known = first.get(planeZM);
    if (known !== undefined && Math.abs(known - share) > 1e-12) return false;
    first.set(planeZM, share);
  }
  const sharesSum = [...first.values()].reduce((sum, share) => sum + share, 0);
  return Math.abs(sharesSum - 1) < 1e-9;
}
