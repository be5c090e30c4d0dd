import { inputError } from '../errors.ts';
import type { NetGraph } from '../network/net-graph.ts';
import { ETA0_OHM } from '../units/constants.ts';

/** A microstrip trace as its end sees it. */
export interface EndingTrace {
  readonly widthM: number;
  /** Dielectric between trace and plane, m, and its relative permittivity. */
  readonly heightM: number;
  readonly epsilonR: number;
  readonly z0Ohm: number;
  readonly epsilonEff: number;
}

/** What meets the trace's end: nothing else of the net (`isOpen`), and a straight piece down to the plane at a pin. */
export interface EndKind {
  readonly isOpen: boolean;
  readonly hasTerminal: boolean;
}

/** Range of the published formula in w/h; outside it the end is taken as at its border. */
const LEAST_RATIO = 0.01;
const MOST_RATIO = 100;

/** Charge of the upper half of a terminal's piece beyond that of the open end, in heights of line. */
const TERMINAL_HEIGHTS = 0.22;
/** The piece is no thicker than an eighth of the height: the range of its fit. */
const LEAST_HEIGHT_PER_RADIUS = 8;

/**
 * Length of line whose charge a trace holds at its end besides that of the line itself, m. It carries no current along the
 * trace: charge only.
 *
 * Open end: Δl/h = ξ1 ξ3 ξ5/ξ4 with u = w/h:
 *   ξ1 = 0.434907 (ε_eff^0.81 + 0.26)(u^0.8544 + 0.236) / [(ε_eff^0.81 − 0.189)(u^0.8544 + 0.87)]
 *   ξ2 = 1 + u^0.371/(2.358 ε_r + 1)             ξ3 = 1 + 0.5274 arctan(0.084 u^(1.9413/ξ2)) / ε_eff^0.9236
 *   ξ4 = 1 + 0.0377 arctan(0.067 u^1.456) [6 − 5 exp(0.036 (1 − ε_r))]       ξ5 = 1 − 0.218 exp(−7.5 u)
 * Source: M. Kirschning, R. H. Jansen, N. H. L. Koster, Electronics Letters 17(3), 123–125, 1981 (constants as they stand in
 * open circuit simulators): 2.5 % for 0.01 ≤ u ≤ 100, ε_r ≤ 50; narrow wires in air hold up to 0.05 h more (see the test).
 *
 * Terminal: a straight piece joins the pin to the plane, source or load in its middle (0 V below, the trace's voltage
 * above). Its upper half holds the electric moment of 0.22 h more, fitted to the thin-wire solution for round wires with h/a from
 * 8 to 40 so that both together hold 0.06 h; a piece under a wide trace keeps its own charge, that of a wire with h/a = 8.
 * Throws `input` unless all are positive and finite.
 */
export function traceEndM(trace: EndingTrace, { isOpen, hasTerminal }: EndKind): number {
  for (const [name, value] of Object.entries(trace)) {
    if (!(value > 0 && value < Infinity)) throw inputError(name, 'a positive finite number', value);
  }
  return (isOpen ? openEndM(trace) : 0) + (hasTerminal ? terminalM(trace) : 0);
}

function openEndM({ widthM, heightM, epsilonR, epsilonEff }: EndingTrace): number {
  const u = Math.min(MOST_RATIO, Math.max(LEAST_RATIO, widthM / heightM));
  const e = epsilonEff ** 0.81;
  const x = u ** 0.8544;
  const one = (0.434907 * (e + 0.26) * (x + 0.236)) / ((e - 0.189) * (x + 0.87));
  const two = 1 + u ** 0.371 / (2.358 * epsilonR + 1);
  const three = 1 + (0.5274 * Math.atan(0.084 * u ** (1.9413 / two))) / epsilonEff ** 0.9236;
  const four = 1 + 0.0377 * Math.atan(0.067 * u ** 1.456) * (6 - 5 * Math.exp(0.036 * (1 - epsilonR)));
  const five = 1 - 0.218 * Math.exp(-7.5 * u);
  return (heightM * one * three * five) / four;
}

function terminalM({ heightM, z0Ohm, epsilonEff }: EndingTrace): number {
  const airOhm = z0Ohm * Math.sqrt(epsilonEff);
  const pieceOhm = (ETA0_OHM / (2 * Math.PI)) * Math.acosh(LEAST_HEIGHT_PER_RADIUS);
  return TERMINAL_HEIGHTS * heightM * Math.min(1, airOhm / pieceOhm);
}

/** What the ends of each segment meet: at node A, at node B. A terminal's piece belongs to one segment of its node. */
export function endKinds(
  { nodes, segments, vias }: NetGraph,
  terminalNodes: ReadonlySet<number>,
): [EndKind, EndKind][] {
  const meeting = nodes.map(() => 0);
  for (const { nodeA, nodeB } of [...segments, ...vias]) {
    meeting[nodeA]!++;
    meeting[nodeB]!++;
  }
  const taken = new Set<number>();
  const kindAt = (node: number): EndKind => {
    const hasTerminal = terminalNodes.has(node) && !taken.has(node);
    taken.add(node);
    return { isOpen: meeting[node] === 1, hasTerminal };
  };
  return segments.map(({ nodeA, nodeB }) => [kindAt(nodeA), kindAt(nodeB)]);
}
