import type { StructureModel } from '../structure/structure-model.ts';
import type { EstimatePlan } from './plan.ts';
import type { ResultPoint, StructureCurrentMap } from './result.ts';
import { SOLVED_TO_HZ } from './scene.ts';
import { StructureResponder } from './structure-responder.ts';

const MOST_MAPS = 3;

/** Currents of planes and cables at the worst lines (points in order of margin); empty when they are not solved. */
export function currentMaps(
  { scene, table }: EstimatePlan,
  points: readonly Pick<ResultPoint, 'frequencyHz'>[],
): StructureCurrentMap[] {
  const model = scene.structure;
  if (!model) return [];
  const worst = [...new Set(points.map(({ frequencyHz }) => frequencyHz))].filter((hz) => hz <= SOLVED_TO_HZ);
  const lines = worst.slice(0, MOST_MAPS).flatMap((hz) => table.filter(({ frequencyHz }) => frequencyHz === hz));
  const responder = new StructureResponder(
    scene,
    model,
    lines.map(({ frequencyHz }) => frequencyHz),
  );
  return lines.flatMap((own) => {
    const answer = responder.answer(own);
    return answer ? [mapOf(model, own.frequencyHz, [...answer.currentsByDomain.values()])] : [];
  });
}

/** Rms of the domains' powers. Density of a cell: mean of its two edges in each direction, over the cell's side. */
function mapOf(model: StructureModel, frequencyHz: number, domains: readonly Float64Array[]): StructureCurrentMap {
  const { mesh } = model;
  const { grid, cellCount } = mesh.sheet;
  const power = new Float64Array(cellCount);
  for (const currents of domains) {
    const alongX = new Float64Array(2 * cellCount);
    const alongY = new Float64Array(2 * cellCount);
    for (let e = 0; e < mesh.xEdgeCount + mesh.yEdgeCount; e++) {
      const out = e < mesh.xEdgeCount ? alongX : alongY;
      for (const cell of [mesh.edgeFrom[e]!, mesh.edgeTo[e]!]) {
        out[2 * cell]! += currents[2 * e]! / (2 * grid.cellM);
        out[2 * cell + 1]! += currents[2 * e + 1]! / (2 * grid.cellM);
      }
    }
    for (let i = 0; i < 2 * cellCount; i++) power[i >> 1]! += alongX[i]! ** 2 + alongY[i]! ** 2;
  }
  return {
    frequencyHz,
    cellM: grid.cellM,
    cells: Array.from({ length: cellCount }, (_, cell) => ({
      atM: [mesh.nodeCentreM[3 * cell]!, mesh.nodeCentreM[3 * cell + 1]!] as const,
      densityRmsAPerM: Math.sqrt(power[cell]! / 2),
    })),
    cables: mesh.wires.map(({ name, pieces, jointM }, w) => {
      const edges = pieces.map((_, i) => mesh.wireEdgeStart[w]! + i);
      const middleM = (e: number) =>
        [0, 1, 2].map((axis) => mesh.edgeCentreM[3 * e + axis]!) as [number, number, number];
      const currentRmsA = edges.map((e) =>
        Math.sqrt(domains.reduce((sum, i) => sum + i[2 * e]! ** 2 + i[2 * e + 1]! ** 2, 0) / 2),
      );
      // From the joint (with the first piece's current) through the middles of the pieces.
      return { name, pointsM: [jointM, ...edges.map(middleM)], currentRmsA: [currentRmsA[0]!, ...currentRmsA] };
    }),
  };
}
