import { scanRequestAt } from '../estimate/line-level.ts';
import { type Scene, SOLVED_TO_HZ } from '../estimate/scene.ts';
import type { ElementSet } from '../fields/element-set.ts';
import { cylinderPlan } from '../site/cylinder-field.ts';
import { bytesPerUnit } from './kept-field.ts';
import type { UnitLines } from './kept-line.ts';

/** Bytes of a complex number in double precision. */
const COMPLEX_BYTES = 16;

/** Memory that the kept responses of these lines will take, bytes. */
export function keptBytes(scene: Scene, table: readonly UnitLines[]): number {
  const noCurrent = (elements: ElementSet) => ({ elements, currentsA: new Float64Array(0) });
  let bytes = 0;
  for (const { frequencyHz, nets, loops } of table) {
    const { kPerM, scanRadiusM, site } = scanRequestAt(scene, frequencyHz);
    const structure = frequencyHz > SOLVED_TO_HZ ? null : scene.structure;
    const sets = [
      ...nets.map(({ name }) => scene.nets.get(name)!.pair.elements),
      ...loops.map((name) => scene.loops.get(name)!.elements),
      ...scene.cables.map(({ along }) => along.elements),
      ...(structure?.parts ?? []).map(({ elements }) => elements),
    ];
    const perField = bytesPerUnit(cylinderPlan(kPerM, scanRadiusM, sets.map(noCurrent), site));
    const perSolved = (structure?.mesh.edgeCount ?? 0) * COMPLEX_BYTES;
    for (const { name, pins } of nets) {
      const own = scene.nets.get(name)!.pair.elements.count * COMPLEX_BYTES;
      bytes += pins.length * (perField + perSolved + own);
    }
    for (const name of loops) bytes += perField + perSolved + scene.loops.get(name)!.elements.count * COMPLEX_BYTES;
    bytes += scene.cables.length * perField;
  }
  return bytes;
}
