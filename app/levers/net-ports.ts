import type { Board, Drive, Load, Net } from '../board/board.ts';
import { drivenNets } from '../estimate/scene.ts';
import { buildNetGraph } from '../network/net-graph.ts';

/** Resistance behind which every port of a net is driven for its kept response. */
export const PORT_OHM = 50;

/** The places of one net where drivers and loads sit: between them the net is linear and stays what it is. */
export interface NetPorts {
  readonly name: string;
  /** One pin for each port, in the order in which the estimate meets them: drivers, then loads. */
  readonly pins: readonly string[];
  /** Port of every pin that shares a port's place on the copper. */
  readonly portOf: ReadonlyMap<string, number>;
  /** The return is a named path, laid from the first driver. */
  readonly hasNamedReturn: boolean;
}

/** Ports of every driven net. */
export function portsOf(board: Board): Map<string, NetPorts> {
  return new Map(drivenNets(board).map((net) => [net.name, netPorts(board, net)]));
}

function netPorts({ drives, loads }: Board, net: Net): NetPorts {
  const { pinNodes } = buildNetGraph(net);
  const pins: string[] = [];
  const portOfNode = new Map<number, number>();
  const portOf = new Map<string, number>();
  for (const { pin } of [...drives, ...loads].filter((terminal) => terminal.net === net.name)) {
    const node = pinNodes.get(pin);
    if (node !== undefined && portOfNode.has(node)) continue;
    // A pin off the copper is kept, too: building the net refuses it with its own words.
    if (node !== undefined) portOfNode.set(node, pins.length);
    pins.push(pin);
  }
  for (const [pin, node] of pinNodes) {
    const port = portOfNode.get(node);
    if (port !== undefined) portOf.set(pin, port);
  }
  return { name: net.name, pins, portOf, hasNamedReturn: net.returnPath !== undefined };
}

/** The board with a driver of 50 Ω at every port and nothing else on the nets: its drives are the unit excitations. */
export function unitBoard(board: Board, ports: ReadonlyMap<string, NetPorts>): Board {
  const drives = [...ports.values()].flatMap(({ name, pins }) =>
    pins.map(
      (pin): Drive => ({
        net: name,
        pin,
        waveform: '',
        sourceOhm: PORT_OHM,
        seriesOhm: 0,
        delayS: 0,
        isInverted: false,
        isPinChosen: false,
      }),
    ),
  );
  return { ...board, drives, loads: [] };
}

/** Drivers and loads of one net at its ports. */
export interface PortTerminals {
  /** In the order of the board's drives on this net. */
  readonly drives: readonly { readonly port: number; readonly resistanceOhm: number }[];
  readonly loads: readonly { readonly port: number; readonly resistanceOhm: number; readonly capacitanceF: number }[];
}

/**
 * The terminals of a (changed) board at a net's ports, or why they cannot be served: what radiates at a pin and how the
 * net drives the plane there depends on whether the pin is one.
 */
export function terminalsAt(
  ports: NetPorts,
  drives: readonly Drive[],
  loads: readonly Load[],
): PortTerminals | { readonly needsSolve: string } {
  const used = new Set<number>();
  for (const { pin } of [...drives, ...loads]) {
    const port = ports.portOf.get(pin);
    if (port === undefined)
      return { needsSolve: `pin ${pin} of net ${ports.name} had no driver or load when the responses were solved` };
    used.add(port);
  }
  const left = ports.pins.find((_, port) => !used.has(port));
  if (left !== undefined) return { needsSolve: `pin ${left} of net ${ports.name} has no driver or load any more` };
  if (ports.hasNamedReturn && ports.portOf.get(drives[0]!.pin) !== 0) {
    return { needsSolve: `the return path of net ${ports.name} is laid from another driver` };
  }
  return {
    drives: drives.map(({ pin, sourceOhm, seriesOhm }) => ({
      port: ports.portOf.get(pin)!,
      resistanceOhm: sourceOhm + seriesOhm,
    })),
    loads: loads.map(({ pin, resistanceOhm = Infinity, capacitanceF }) => ({
      port: ports.portOf.get(pin)!,
      resistanceOhm,
      capacitanceF,
    })),
  };
}
