import { AppError } from '../errors.ts';
import type { EstimateHooks } from './estimate-request.ts';
import type { Scene } from './scene.ts';
import { StructureResponder } from './structure-responder.ts';

/**
 * Goes through the frequencies of a table (ascending) with one responder of the structure for all of them, null where planes
 * and cables are not solved; tells progress, and throws `cancelled` on stop.
 */
export function eachLine<L extends { readonly frequencyHz: number }, T>(
  scene: Scene,
  table: readonly L[],
  hooks: EstimateHooks,
  solve: (lines: L, responder: StructureResponder | null) => T,
): T[] {
  const throwIfStopped = () => {
    if (hooks.stop?.()) throw new AppError('cancelled', 'stopped by the user');
  };
  const frequenciesHz = table.map(({ frequencyHz }) => frequencyHz);
  const responder = scene.structure
    ? new StructureResponder(scene, scene.structure, frequenciesHz, throwIfStopped)
    : null;
  const solved = table.map((lines, done) => {
    throwIfStopped();
    hooks.onProgress?.(done, table.length);
    return solve(lines, responder);
  });
  hooks.onProgress?.(table.length, table.length);
  return solved;
}
