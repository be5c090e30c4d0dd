import { PlaneIndex } from '../returns/reference.ts';
import type { Board, Drive, Load, Net, PointM } from './board.ts';

/** What one needs to know of a net to write its sources. */
export interface NetSummary {
  readonly name: string;
  /** Length of all its traces, m. */
  readonly lengthM: number;
  /** Copper layers its traces run on, top first. */
  readonly layers: readonly string[];
  readonly viaCount: number;
  /** In the order of the file. */
  readonly pins: readonly { readonly name: string; readonly layer: string; readonly atM: PointM }[];
  readonly drives: readonly Drive[];
  readonly loads: readonly Load[];
  /** Planes that carry its return, the one under most of its length first. */
  readonly references: readonly { readonly layer: string; readonly net: string; readonly lengthM: number }[];
  /** Length without any plane above or below, m. */
  readonly withoutReferenceM: number;
  /** The net names its own return path. */
  readonly hasReturnPath: boolean;
  /** The net owns a plane: ground or a supply. */
  readonly hasPlane: boolean;
}

/** All nets of a board: signals first, then nets with planes; the longest first, ties by name. */
export function summarizeNets(board: Board): NetSummary[] {
  const planes = new PlaneIndex(board);
  const planeNets = new Set(board.planes.map((plane) => plane.net));
  const drives = groupByNet(board.drives);
  const loads = groupByNet(board.loads);
  const layerOf = (index: number): string => board.stackup[index]!.name;
  return board.nets
    .map(
      (net): NetSummary => ({
        name: net.name,
        lengthM: net.traces.reduce((sum, trace) => sum + lengthOf(trace.pointsM), 0),
        layers: [...new Set(net.traces.map((trace) => trace.layerIndex))].sort((a, b) => a - b).map(layerOf),
        viaCount: net.vias.length,
        pins: net.pins.map((pin) => ({ name: pin.name, layer: layerOf(pin.layerIndex), atM: pin.atM })),
        drives: drives.get(net.name) ?? [],
        loads: loads.get(net.name) ?? [],
        ...referencesOf(net, planes, layerOf),
        hasReturnPath: net.returnPath !== undefined,
        hasPlane: planeNets.has(net.name),
      }),
    )
    .sort((a, b) => Number(a.hasPlane) - Number(b.hasPlane) || b.lengthM - a.lengthM || compareText(a.name, b.name));
}

/** By code units: the same order on every machine. */
const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

function groupByNet<T extends { readonly net: string }>(entries: readonly T[]): Map<string, T[]> {
  const byNet = new Map<string, T[]>();
  for (const entry of entries) byNet.set(entry.net, [...(byNet.get(entry.net) ?? []), entry]);
  return byNet;
}

const distanceM = (a: PointM, b: PointM): number => Math.hypot(b[0] - a[0], b[1] - a[1]);

const lengthOf = (pointsM: readonly PointM[]): number =>
  pointsM.reduce((sum, point, i) => (i === 0 ? 0 : sum + distanceM(pointsM[i - 1]!, point)), 0);

function referencesOf(
  net: Net,
  planes: PlaneIndex,
  layerOf: (index: number) => string,
): Pick<NetSummary, 'references' | 'withoutReferenceM'> {
  const found = new Map<string, { layer: string; net: string; lengthM: number }>();
  let withoutReferenceM = 0;
  for (const trace of net.traces) {
    for (const [i, toM] of trace.pointsM.entries()) {
      if (i === 0) continue;
      const fromM = trace.pointsM[i - 1]!;
      const lengthM = distanceM(fromM, toM);
      const reference = planes.referenceOf(fromM, toM, trace.layerIndex, net.name);
      withoutReferenceM += lengthM * reference.gaps.reduce((sum, gap) => sum + gap.to - gap.from, 0);
      for (const plane of reference.planes) {
        const key = JSON.stringify([plane.layerIndex, plane.net]);
        const entry = found.get(key) ?? { layer: layerOf(plane.layerIndex), net: plane.net, lengthM: 0 };
        found.set(key, { ...entry, lengthM: entry.lengthM + lengthM });
      }
    }
  }
  return { references: [...found.values()].sort((a, b) => b.lengthM - a.lengthM), withoutReferenceM };
}
