import type { Board } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { eachLine } from '../estimate/each-line.ts';
import type { EstimateHooks, EstimateRequest } from '../estimate/estimate-request.ts';
import { judgement } from '../estimate/finish.ts';
import type { LineLevel } from '../estimate/line-level.ts';
import { type JudgedRange, judgedRange, requireSources } from '../estimate/plan.ts';
import type { EstimateResult } from '../estimate/result.ts';
import { buildScene, drivenNets, type Scene } from '../estimate/scene.ts';
import { type FrequencyLines, spectrumTable } from '../estimate/spectrum-table.ts';
import { checkNetwork } from '../network/network.ts';
import { keptBytes } from './kept-bytes.ts';
import { KeptLine, type UnitLines } from './kept-line.ts';
import { leverTable } from './lever-table.ts';
import { type NetPorts, type PortTerminals, portsOf, terminalsAt, unitBoard } from './net-ports.ts';
import { isSameValue } from './same-value.ts';

/** What a changed board is judged by; the site and what is solved stay those of the prepared one. */
export type LeverRequest = Pick<EstimateRequest, 'limits' | 'site' | 'structure' | 'maxHz' | 'requiredMarginDb'>;

/** Points, worst margin and verdict as an estimate of the changed board has them, or why the kept responses cannot tell. */
export type LeverAnswer =
  | Pick<EstimateResult, 'points' | 'worst' | 'verdict'>
  | {
      /** In words: what changed that has to be solved. */
      readonly needsSolve: string;
    };

/** Kept responses may take this much memory; more is refused. */
export const MOST_KEPT_BYTES = 1 << 30;

interface Prepared {
  readonly board: Board;
  readonly request: LeverRequest;
  readonly range: JudgedRange;
  readonly scene: Scene;
  readonly ports: ReadonlyMap<string, NetPorts>;
  /** In order of frequency. */
  readonly lines: readonly KeptLine[];
  readonly bytes: number;
}

/** Lines of one frequency are found again within this, relative: harmonics of different waveforms that meet are one. */
const SAME_FREQUENCY = 3e-9;

/**
 * The responses of a board, kept so that other waveforms, drivers and loads at the same pins are estimated without solving
 * anything again.
 *
 * Between its ports (the places with a driver or load) a net is linear and stays what it is, and so do planes, cables and
 * the field. So for each line the field of every port driven alone is kept; changed terminals and sources only change how
 * the ports are driven (`portExcitations`), and the mixture of kept fields is searched for its maximum and read as in an
 * estimate. Free to change: edges, amplitude, duty cycle, delay, inversion, clock domain and spectrum of the waveforms as
 * long as no line appears where none can be now; resistors of drivers, loads R ∥ C, which waveform drives which pin among
 * lines kept for that net; loops' waveforms; limits and required margin. Anything else answers `needsSolve`.
 *
 * Agreement with a fresh estimate: 1e-4 dB where planes and cables are solved at each line; the error of interpolating
 * them over frequency (0.1 dB) on boards with so many lines that the estimate does that. Two maxima of equal height may
 * change places.
 */
export class Levers {
  readonly #board: Board;
  readonly #request: LeverRequest;
  readonly #range: JudgedRange;
  readonly #scene: Scene;
  readonly #ports: ReadonlyMap<string, NetPorts>;
  readonly #lines: readonly KeptLine[];
  readonly keptBytes: number;

  constructor({ board, request, range, scene, ports, lines, bytes }: Prepared) {
    this.#board = board;
    this.#request = request;
    this.#range = range;
    this.#scene = scene;
    this.#ports = ports;
    this.#lines = lines;
    this.keptBytes = bytes;
  }

  /** Throws `input` for sources that cannot be estimated at all. */
  try(board: Board, request: LeverRequest): LeverAnswer {
    requireSources(board);
    const reason = this.#changedModel(board, request) ?? this.#changedRange(board, request);
    if (reason) return { needsSolve: reason };
    const terminals = new Map<string, PortTerminals>();
    for (const { name } of drivenNets(board)) {
      const own = this.#terminalsOf(board, name);
      if ('needsSolve' in own) return own;
      terminals.set(name, own);
    }
    const levels: LineLevel[] = [];
    const table = spectrumTable(board, this.#range.fromHz, this.#range.toHz, this.#statedHz());
    let at = 0;
    for (const { frequencyHz, lines } of table) {
      while (at < this.#lines.length && this.#lines[at]!.frequencyHz < frequencyHz * (1 - SAME_FREQUENCY)) at++;
      const kept = this.#lines[at];
      const missing = lines.find(({ kind, name }) => !kept?.has(kind, name));
      if (!kept || kept.frequencyHz > frequencyHz * (1 + SAME_FREQUENCY) || missing) {
        const source = missing ?? lines[0]!;
        return {
          needsSolve: `${source.kind} ${source.name} has a line at ${frequencyHz / 1e6} MHz, where none was solved`,
        };
      }
      const level = kept.level(lines, terminals);
      if (level) levels.push(level);
    }
    const { points, worst, verdict } = judgement(levels, request, { range: this.#range, scene: this.#scene });
    return { points, worst: worst ? { frequencyHz: worst.frequencyHz, marginDb: worst.marginDb } : null, verdict };
  }

  #statedHz(): number[] {
    return this.#scene.cables.flatMap(({ table }) => table.map(({ frequencyHz }) => frequencyHz));
  }

  #changedModel(board: Board, { site, structure }: LeverRequest): string | null {
    const known = this.#board;
    if (!isSameValue(site, this.#request.site)) return 'the site is another one';
    if (structure !== this.#request.structure) return 'planes and cables are solved or left out now';
    for (const part of ['outlineM', 'stackup', 'planes', 'nets', 'structure'] as const) {
      if (!isSameValue(board[part], known[part])) return 'the layout is another one';
    }
    if (!isSameValue(board.cables, known.cables)) return 'the cables are others';
    for (const loop of board.loops) {
      const before = known.loops.find(({ name }) => name === loop.name);
      if (!before || !isSameValue(before.pointsM, loop.pointsM)) return `loop ${loop.name} lies elsewhere`;
    }
    return null;
  }

  #changedRange(board: Board, request: LeverRequest): string | null {
    const { fromHz, toHz } = judgedRange(board, request);
    const isSame = fromHz === this.#range.fromHz && toHz === this.#range.toHz;
    return isSame ? null : `the judged range is another one (${fromHz / 1e6} to ${toHz / 1e6} MHz)`;
  }

  #terminalsOf(board: Board, name: string): PortTerminals | { readonly needsSolve: string } {
    const ports = this.#ports.get(name);
    if (!ports) return { needsSolve: `net ${name} had no driver when the responses were solved` };
    const own = <T extends { readonly net: string }>(all: readonly T[]) => all.filter(({ net }) => net === name);
    const terminals = terminalsAt(ports, own(board.drives), own(board.loads));
    if ('needsSolve' in terminals) return terminals;
    const atPort = <T extends { readonly port: number }>(all: readonly T[]) =>
      all.map((terminal) => ({ ...terminal, node: terminal.port }));
    checkNetwork({
      nodeCount: ports.pins.length,
      sections: [],
      branches: [],
      drives: atPort(terminals.drives),
      loads: atPort(terminals.loads),
    });
    return terminals;
  }
}

/**
 * Solves and keeps the responses of a board. Throws `input` when the board cannot be estimated, or when its responses would
 * take more memory than `mostBytes`; `cancelled` on stop.
 */
export function prepareLevers(
  board: Board,
  request: LeverRequest,
  hooks: EstimateHooks = {},
  mostBytes = MOST_KEPT_BYTES,
): Levers {
  requireSources(board);
  const range = judgedRange(board, request);
  const ports = portsOf(board);
  const scene = buildScene(unitBoard(board, ports), request.site, range.toHz, request.structure);
  const statedHz = scene.cables.flatMap(({ table }) => table.map(({ frequencyHz }) => frequencyHz));
  const table = leverTable(board, range, statedHz).map((row) => unitLinesOf(row, ports));
  const bytes = keptBytes(scene, table);
  if (bytes > mostBytes) {
    const mb = (value: number) => `${Math.ceil(value / 2 ** 20)} MB`;
    throw inputError(
      'levers',
      `of a board whose kept responses take at most ${mb(mostBytes)}`,
      `${mb(bytes)} for ${table.length} frequencies: fewer driven nets, data of a shorter sequence or a lower upper end need less`,
    );
  }
  const lines = eachLine(scene, table, hooks, (unitLines, responder) => new KeptLine(scene, unitLines, responder));
  const levers = new Levers({ board, request, range, scene, ports, lines, bytes });
  // The board as it is: what cannot be estimated is refused here, and the first change starts from its maxima.
  levers.try(board, request);
  return levers;
}

function unitLinesOf({ frequencyHz, lines }: FrequencyLines, ports: ReadonlyMap<string, NetPorts>): UnitLines {
  const names = (kind: 'net' | 'loop') => [
    ...new Set(lines.filter((line) => line.kind === kind).map(({ name }) => name)),
  ];
  return { frequencyHz, nets: names('net').map((name) => ports.get(name)!), loops: names('loop') };
}
