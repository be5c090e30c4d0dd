import type { Mesh } from './mesh.ts';

/**
 * What an excitation does to the mesh at one frequency, before it is solved: e.m.f. along each edge (the −jωA part, V),
 * potential at each node (V) and current injected into each node (A); re and im apart.
 */
export interface Incident {
  readonly emfRe: Float64Array;
  readonly emfIm: Float64Array;
  readonly potentialRe: Float64Array;
  readonly potentialIm: Float64Array;
  readonly injectedRe: Float64Array;
  readonly injectedIm: Float64Array;
}

export const emptyIncident = ({ edgeCount, nodeCount }: Mesh): Incident => ({
  emfRe: new Float64Array(edgeCount),
  emfIm: new Float64Array(edgeCount),
  potentialRe: new Float64Array(nodeCount),
  potentialIm: new Float64Array(nodeCount),
  injectedRe: new Float64Array(nodeCount),
  injectedIm: new Float64Array(nodeCount),
});

/** Takes everything out, for the next excitation. */
export function clearIncident(incident: Incident): void {
  for (const values of Object.values(incident)) values.fill(0);
}
