import type { Board, Net, Point3M } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { gaussLegendre } from '../fields/quadrature.ts';
import type { Line } from '../lines/cross-section.ts';
import { effectiveDielectric } from '../lines/dielectric.ts';
import { lineOf } from '../lines/line.ts';
import { lineNotTemCaveat } from '../lines/validity.ts';
import type { NetGraph } from '../network/net-graph.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { type Chain, chainFrom, PolylineM } from './chain.ts';
import type { EndTerm } from './element-currents.ts';
import type { NetContext, Terminals } from './net-context.ts';
import { type PlacedSection, pointsFor } from './pair-elements.ts';
import { pairEnd, pairEndSection } from './pair-end.ts';
import type { RuleCollector } from './rule-collector.ts';
import { statedLine } from './trace-line.ts';

/** Trace and return count as parallel when their distance changes by less than this, relative. */
const PARALLEL_TOLERANCE = 0.1;

export interface NamedReturn {
  readonly lines: readonly Line[];
  readonly sections: readonly PlacedSection[];
  /** End zones between the line's last node and a terminal, as short sections of line (see `pairEnd`). */
  readonly ends: readonly TerminalEnd[];
}

/** A terminal set apart from its node of the graph by an end zone. */
export interface TerminalEnd {
  readonly node: number;
  readonly lengthM: number;
  readonly z0Ohm: number;
  /** Across the terminal. */
  readonly gapCapacitanceF: number;
}

/**
 * A net without a plane over its named return path (physics 5.3, 5.6; files contract `returnPath`): the return carries
 * −I at the same fraction of its length, straight pieces join it to every driver and load pin, and the dielectric's
 * polarisation current jω C' (1 − 1/ε_eff) V ds runs across from trace to return.
 */
export function addNamedReturn(
  collector: RuleCollector,
  context: NetContext,
  net: Net,
  graph: NetGraph,
  terminals: Terminals,
): NamedReturn {
  const { board, maxHz } = context;
  const named = net.returnPath!;
  const middleZM = (layer: number) => (board.stackup[layer]!.zBottomM + board.stackup[layer]!.zTopM) / 2;
  const chain = chainFrom(graph, terminals.drives[0]?.node ?? 0, net.name);
  const back = new PolylineM(named.pointsM);
  const returnAt = (fraction: number): Point3M => {
    const [x, y] = back.at(fraction);
    return [x, y, middleZM(named.layerIndex)];
  };
  const line = withTemCaveat(
    namedReturnLine(board, net, graph, chain, returnAt),
    graph,
    chain,
    returnAt,
    middleZM,
    maxHz,
  );
  const sections = graph.segments.map(
    (segment, index): PlacedSection => ({
      index,
      fromM: segment.fromM,
      toM: segment.toM,
      lengthM: segment.lengthM,
      z0Ohm: line.z0Ohm,
      epsilonEff: line.epsilonEff,
      planes: [],
      endsM: [0, 0],
    }),
  );
  const boundFPerM = (Math.sqrt(line.epsilonEff) / (line.z0Ohm * SPEED_OF_LIGHT_M_PER_S)) * (1 - 1 / line.epsilonEff);

  for (const link of chain.links) {
    const segment = graph.segments[link.section]!;
    const z = middleZM(segment.layerIndex);
    const rule = gaussLegendre(pointsFor(segment.lengthM, line.epsilonEff, maxHz));
    for (let i = 0; i < rule.nodes.length; i++) {
      const s = rule.nodes[i]!;
      const weight = rule.weights[i]!;
      const atM = s * segment.lengthM;
      const [ax, ay] = segment.fromM;
      const [bx, by] = segment.toM;
      const here: Point3M = [ax + s * (bx - ax), ay + s * (by - ay), z];
      const along: Point3M = [weight * (bx - ax), weight * (by - ay), 0];
      collector.add(here, along, { kind: 'along', section: link.section, atM, factor: 1 });
      if (boundFPerM === 0) continue;
      const across = returnAt(chain.fractionAt(link, atM));
      collector.add(middle(here, across), scaled(minus(across, here), weight * segment.lengthM), {
        kind: 'shunt',
        section: link.section,
        atM,
        factor: boundFPerM,
      });
    }
    addReturnPieces(collector, chain, link, back, middleZM(named.layerIndex), line.epsilonEff, maxHz);
  }
  const ends: TerminalEnd[] = [];
  for (const node of terminals.nodes) {
    const [x, y] = graph.nodes[node]!.atM;
    const pin: Point3M = [x, y, middleZM(graph.nodes[node]!.layerIndex)];
    const returnPoint = returnAt(chain.fractionOfNode(node));
    const terms = endsAt(graph, node);
    if (terms.length !== 1) {
      addStraight(collector, returnPoint, pin, terms, maxHz);
      continue;
    }
    const end = pairEnd(Math.hypot(...minus(pin, returnPoint)), line.z0Ohm, line.epsilonEff);
    const section = graph.segments.length + ends.length;
    addStraight(collector, returnPoint, pin, [{ section, isAtB: false, factor: 1 }], maxHz);
    ends.push({ node, gapCapacitanceF: end.gapCapacitanceF, ...pairEndSection(end) });
  }
  return { lines: graph.segments.map(() => line), sections, ends };
}

/** The return under one link of the chain: −I(s) of that section, in pieces between the return's corners. */
function addReturnPieces(
  collector: RuleCollector,
  chain: Chain,
  link: Chain['links'][number],
  back: PolylineM,
  zM: number,
  epsilonEff: number,
  maxHz: number,
): void {
  for (const [from, to] of back.piecesBetween(link.from, link.to)) {
    const [x1, y1] = back.at(from);
    const [x2, y2] = back.at(to);
    const rule = gaussLegendre(pointsFor(Math.hypot(x2 - x1, y2 - y1), epsilonEff, maxHz));
    for (let i = 0; i < rule.nodes.length; i++) {
      const s = rule.nodes[i]!;
      const weight = rule.weights[i]!;
      collector.add([x1 + s * (x2 - x1), y1 + s * (y2 - y1), zM], [weight * (x2 - x1), weight * (y2 - y1), 0], {
        kind: 'along',
        section: link.section,
        atM: chain.placeOn(link, from + s * (to - from)),
        factor: link.isReversed ? 1 : -1,
      });
    }
  }
}

function addStraight(
  collector: RuleCollector,
  fromM: Point3M,
  toM: Point3M,
  terms: readonly EndTerm[],
  maxHz: number,
): void {
  const step = minus(toM, fromM);
  const rule = gaussLegendre(pointsFor(Math.hypot(...step), 1, maxHz));
  for (let i = 0; i < rule.nodes.length; i++) {
    const s = rule.nodes[i]!;
    const position: Point3M = [fromM[0] + s * step[0], fromM[1] + s * step[1], fromM[2] + s * step[2]];
    collector.add(position, scaled(step, rule.weights[i]!), { kind: 'ends', terms });
  }
}

function endsAt(graph: NetGraph, node: number): EndTerm[] {
  return graph.segments.flatMap(({ nodeA, nodeB }, section) => [
    ...(nodeA === node ? [{ section, isAtB: false, factor: 1 }] : []),
    ...(nodeB === node ? [{ section, isAtB: true, factor: 1 }] : []),
  ]);
}

/** Measured values when the net states both; else coplanar strips, which need a parallel return on the same layer. */
function namedReturnLine(
  board: Board,
  net: Net,
  graph: NetGraph,
  chain: Chain,
  returnAt: (fraction: number) => Point3M,
): Line {
  if (net.z0Ohm !== undefined && net.epsilonEff !== undefined) return statedLine(net.z0Ohm, net.epsilonEff);
  const first = graph.segments[0]!;
  const distancesM = chain.links.flatMap((link) => {
    const { fromM, toM, lengthM } = graph.segments[link.section]!;
    return [0.25, 0.5, 0.75].map((s) => {
      const [x, y] = returnAt(chain.fractionAt(link, s * lengthM));
      return Math.hypot(fromM[0] + s * (toM[0] - fromM[0]) - x, fromM[1] + s * (toM[1] - fromM[1]) - y);
    });
  });
  const leastM = Math.min(...distancesM);
  const mostM = Math.max(...distancesM);
  const isParallel = mostM - leastM < PARALLEL_TOLERANCE * mostM && leastM > first.widthM;
  if (!isParallel || net.returnPath!.layerIndex !== first.layerIndex) {
    throw inputError(
      `net ${net.name}: z0Ohm and epsilonEff`,
      'given, since trace and returnPath are no parallel strips on one layer',
      `a distance of ${(leastM * 1e3).toFixed(2)} to ${(mostM * 1e3).toFixed(2)} mm`,
    );
  }
  const rows = board.stackup.filter((row) => row.kind === 'dielectric' && row.thicknessM > 0);
  const substrate = rows.length > 0 ? effectiveDielectric(rows) : { epsilonR: 1, tanDelta: 0 };
  const strips = lineOf({
    kind: 'coplanar-strips',
    widthM: first.widthM,
    thicknessM: board.stackup[first.layerIndex]!.thicknessM,
    centreDistanceM: (leastM + mostM) / 2,
    ...substrate,
    substrateM: rows.reduce((sum, row) => sum + row.thicknessM, 0),
  });
  return { ...strips, z0Ohm: net.z0Ohm ?? strips.z0Ohm, epsilonEff: net.epsilonEff ?? strips.epsilonEff };
}

/** The line with a caveat when trace and return are too far apart for one at the upper end. */
function withTemCaveat(
  line: Line,
  graph: NetGraph,
  chain: Chain,
  returnAt: (fraction: number) => Point3M,
  middleZM: (layer: number) => number,
  maxHz: number,
): Line {
  let apartM = 0;
  for (const link of chain.links) {
    const { fromM, toM, layerIndex, lengthM } = graph.segments[link.section]!;
    for (const [s, [x, y]] of [
      [0, fromM],
      [1, toM],
    ] as const) {
      const across = minus([x, y, middleZM(layerIndex)], returnAt(chain.fractionAt(link, s * lengthM)));
      apartM = Math.max(apartM, Math.hypot(...across));
    }
  }
  const { widthM } = graph.segments[0]!;
  const section = { kind: 'coplanar-strips', widthM, thicknessM: 0, centreDistanceM: apartM, substrateM: 0 } as const;
  const caveat = lineNotTemCaveat({ ...section, epsilonR: 1, tanDelta: 0 }, line, maxHz);
  return caveat ? { ...line, caveats: [...line.caveats, caveat] } : line;
}

const minus = (a: Point3M, b: Point3M): Point3M => [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
const scaled = (a: Point3M, factor: number): Point3M => [a[0] * factor, a[1] * factor, a[2] * factor];
const middle = (a: Point3M, b: Point3M): Point3M => [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2, (a[2] + b[2]) / 2];
