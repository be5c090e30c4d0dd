import type { Board, Drive, Net } from '../board/board.ts';
import { type Caveat, inputError } from '../errors.ts';
import type { Finding } from '../estimate/result.ts';
import type { Line } from '../lines/cross-section.ts';
import { lineNotTemCaveat } from '../lines/validity.ts';
import { buildNetGraph, type GraphSegment, type NetGraph } from '../network/net-graph.ts';
import type { Network } from '../network/network.ts';
import { viaInductanceH } from '../network/via.ts';
import type { SegmentReference } from '../returns/reference.ts';
import { NetCoupling } from '../structure/couplings.ts';
import { endLengthsM, withEndCharges } from './end-charges.ts';
import { gapFindings } from './gap-findings.ts';
import { addNamedReturn, type TerminalEnd } from './named-return.ts';
import type { NetContext, Terminals } from './net-context.ts';
import { addPairElements, type PlacedSection, pairEpsilonR } from './pair-elements.ts';
import { addPlaces } from './places.ts';
import { planeNetChanges } from './plane-changes.ts';
import { RuleCollector, type RuledElements } from './rule-collector.ts';
import { endKinds } from './trace-end.ts';
import { crossSectionOver, lineWithOverrides, statedLine } from './trace-line.ts';

/** A driven net ready to be solved and to radiate. */
export interface NetModel {
  readonly name: string;
  readonly network: Network;
  /** In the order of `network.drives`. */
  readonly drives: readonly Drive[];
  /** In the order of `network.sections`. */
  readonly sections: readonly { readonly lengthM: number; readonly z0Ohm: number; readonly planeCount: number }[];
  /** Trace and return; where planes are solved, without the return over openings, which the plane carries itself. */
  readonly pair: RuledElements;
  /** Trace and return all the way, for frequencies at which planes are not solved. */
  readonly pairAlone: RuledElements;
  /** How the net drives planes and cables; null when they are not solved, or its return is a named path. */
  readonly coupling: NetCoupling | null;
  readonly findings: readonly Finding[];
  readonly caveats: readonly Caveat[];
}

/** More of a net than this without any plane under it, and no named return: refused, never guessed. */
const UNREFERENCED_LIMIT = 0.5;

/** Builds graph, lines, network and radiating elements of one driven net. Throws `input` when it cannot be modelled. */
export function buildNetModel(context: NetContext, net: Net): NetModel {
  const { board } = context;
  const graph = buildNetGraph(net);
  if (graph.segments.length === 0) throw inputError(`net ${net.name}`, 'drawn with at least one trace', 'none');
  const drives = board.drives.filter((drive) => drive.net === net.name);
  const terminals = terminalsOf(board, net, graph, drives);
  const references = graph.segments.map((segment) =>
    context.planes.referenceOf(segment.fromM, segment.toM, segment.layerIndex, net.name),
  );
  const bareFraction = unreferencedFraction(graph, references);

  if (bareFraction > UNREFERENCED_LIMIT) {
    if (!net.returnPath) throw noReturnError(net, bareFraction);
    const collector = new RuleCollector(context.frame);
    const named = addNamedReturn(collector, context, net, graph, terminals);
    const pair = collector.finish();
    return {
      name: net.name,
      network: withEnds(networkOf(board, graph, named.lines, terminals), named.ends),
      drives,
      sections: [...named.sections, ...named.ends].map((section) => ({ ...section, planeCount: 0 })),
      pair,
      pairAlone: pair,
      coupling: null,
      findings: [],
      caveats: lineCaveats(net.name, named.lines),
    };
  }

  const served = fillGaps(graph, references);
  const lines: Line[] = [];
  const kinds = endKinds(graph, terminals.nodes);
  const sections = graph.segments.map((segment, index): PlacedSection => {
    const { planes } = served[index]!;
    const crossSection = crossSectionOver(board, segment.layerIndex, segment.widthM, planes);
    const line = lineWithOverrides(net, crossSection);
    const notTem = lineNotTemCaveat(crossSection, line, context.maxHz);
    lines.push(notTem ? { ...line, caveats: [...line.caveats, notTem] } : line);
    return {
      index,
      fromM: segment.fromM,
      toM: segment.toM,
      lengthM: segment.lengthM,
      z0Ohm: line.z0Ohm,
      epsilonEff: line.epsilonEff,
      planes,
      endsM: endLengthsM(crossSection, line, kinds[index]!),
    };
  });
  const coupling = context.structure
    ? new NetCoupling(
        context.structure,
        sections.map((section) => ({ ...section, epsilonR: pairEpsilonR(section) })),
        `net ${net.name}`,
      )
    : null;
  const pairWith = (gaps: NetCoupling['gapsBySection']) => {
    const collector = new RuleCollector(context.frame);
    for (const section of sections) addPairElements(collector, section, context.maxHz, gaps.get(section.index));
    const placeFindings = addPlaces(collector, context, net, graph, sections, terminals.nodes);
    return { pair: collector.finish(), placeFindings };
  };
  const { pair: pairAlone, placeFindings } = pairWith(new Map());
  const hasGaps = coupling !== null && coupling.gapsBySection.size > 0;
  return {
    name: net.name,
    network: withEndCharges(networkOf(board, graph, lines, terminals), sections),
    drives,
    sections: sections.map((section) => ({ ...section, planeCount: section.planes.length })),
    pair: hasGaps ? pairWith(coupling.gapsBySection).pair : pairAlone,
    pairAlone,
    coupling,
    findings: [
      ...gapFindings(board, context.planes, net, graph, references, served),
      ...planeNetChanges(board, context.planes, net, graph, sections),
      ...placeFindings,
    ],
    caveats: lineCaveats(net.name, lines),
  };
}

function terminalsOf(board: Board, net: Net, graph: NetGraph, netDrives: readonly Drive[]): Terminals {
  const nodeOf = (pin: string): number => {
    const node = graph.pinNodes.get(pin);
    if (node === undefined) {
      throw inputError(`pin ${pin} of net ${net.name}`, 'on the copper of its net', 'a pin without a trace at it');
    }
    return node;
  };
  const drives = netDrives.map(({ pin, sourceOhm, seriesOhm }) => ({
    node: nodeOf(pin),
    resistanceOhm: sourceOhm + seriesOhm,
  }));
  const loads = board.loads
    .filter((load) => load.net === net.name)
    .map(({ pin, resistanceOhm, capacitanceF }) => ({
      node: nodeOf(pin),
      capacitanceF,
      ...(resistanceOhm !== undefined && { resistanceOhm }),
    }));
  return { drives, loads, nodes: new Set([...drives, ...loads].map(({ node }) => node)) };
}

function networkOf(board: Board, graph: NetGraph, lines: readonly Line[], terminals: Terminals): Network {
  const middleM = (layer: number) => (board.stackup[layer]!.zBottomM + board.stackup[layer]!.zTopM) / 2;
  return {
    nodeCount: graph.nodes.length,
    sections: graph.segments.map(({ nodeA, nodeB, lengthM }, i) => ({ nodeA, nodeB, lengthM, line: lines[i]! })),
    branches: graph.vias.map(({ nodeA, nodeB, fromLayerIndex, toLayerIndex, drillM }) => ({
      nodeA,
      nodeB,
      inductanceH: viaInductanceH(Math.abs(middleM(fromLayerIndex) - middleM(toLayerIndex)), drillM),
    })),
    drives: terminals.drives,
    loads: terminals.loads,
  };
}

/** Puts an end zone between each such terminal and its line: the terminal moves to a node of its own. */
function withEnds(network: Network, ends: readonly TerminalEnd[]): Network {
  const moved = new Map(ends.map(({ node }, i) => [node, network.nodeCount + i]));
  const place = (node: number) => moved.get(node) ?? node;
  return {
    ...network,
    nodeCount: network.nodeCount + ends.length,
    sections: [
      ...network.sections,
      ...ends.map(({ node, lengthM, z0Ohm }) => ({
        nodeA: place(node),
        nodeB: node,
        lengthM,
        line: statedLine(z0Ohm, 1),
      })),
    ],
    drives: network.drives.map((drive) => ({ ...drive, node: place(drive.node) })),
    loads: [
      ...network.loads.map((load) => ({ ...load, node: place(load.node) })),
      ...ends.map(({ node, gapCapacitanceF }) => ({ node: place(node), capacitanceF: gapCapacitanceF })),
    ],
  };
}

function unreferencedFraction(graph: NetGraph, references: readonly SegmentReference[]): number {
  let bareM = 0;
  let allM = 0;
  for (const [i, segment] of graph.segments.entries()) {
    allM += segment.lengthM;
    for (const { from, to } of references[i]!.gaps) bareM += (to - from) * segment.lengthM;
  }
  return allM > 0 ? bareM / allM : 1;
}

/** A segment without any plane takes over the planes of the nearest referenced segment of its layer (a gap finding). */
function fillGaps(graph: NetGraph, references: readonly SegmentReference[]): SegmentReference[] {
  const referenced = graph.segments.flatMap((segment, i) => (references[i]!.planes.length > 0 ? [{ segment, i }] : []));
  return references.map((reference, i) => {
    if (reference.planes.length > 0) return reference;
    const segment = graph.segments[i]!;
    const sameLayer = referenced.filter((other) => other.segment.layerIndex === segment.layerIndex);
    const nearest = closest(segment, sameLayer.length > 0 ? sameLayer : referenced);
    if (!nearest || nearest.segment.layerIndex !== segment.layerIndex) {
      throw inputError(
        `net trace of ${Math.round(segment.lengthM * 1e4) / 10} mm at (${segment.fromM.map((v) => (v * 1e3).toFixed(2)).join(', ')}) mm`,
        'over a plane (or its net must name a returnPath)',
        'a layer of this net without any plane under it',
      );
    }
    return { planes: references[nearest.i]!.planes, gaps: reference.gaps };
  });
}

function closest<T extends { readonly segment: GraphSegment }>(to: GraphSegment, among: readonly T[]): T | null {
  let best: T | null = null;
  let leastM = Infinity;
  for (const candidate of among) {
    const { fromM, toM } = candidate.segment;
    const distanceM = Math.min(
      ...[fromM, toM].flatMap((p) => [to.fromM, to.toM].map((q) => Math.hypot(p[0] - q[0], p[1] - q[1]))),
    );
    if (distanceM < leastM) {
      leastM = distanceM;
      best = candidate;
    }
  }
  return best;
}

function noReturnError(net: Net, bareFraction: number): Error {
  return inputError(
    `net ${net.name}`,
    'over a plane, or given a returnPath: without one its loop is unknown and would be a guess',
    `${Math.round(bareFraction * 100)} % of its length without any plane above or below`,
  );
}

function lineCaveats(net: string, lines: readonly Line[]): Caveat[] {
  return lines.flatMap((line) => line.caveats.map((caveat) => ({ ...caveat, where: caveat.where || `net ${net}` })));
}
