import type { Board } from '../../app/board/board.ts';
import { type BoardFileInput, boardFileSchema } from '../../app/board/board-file.ts';
import { toBoard } from '../../app/board/to-board.ts';
import { radiatingParts } from '../../app/estimate/radiating-parts.ts';
import { buildScene, type Scene } from '../../app/estimate/scene.ts';
import { spectrumTable } from '../../app/estimate/spectrum-table.ts';
import type { Radiator } from '../../app/fields/element-set.ts';

/** Board from a file's content, in SI. */
export const boardOf = (file: BoardFileInput): Board => toBoard(boardFileSchema.parse(file)).board;

export const OUTLINE_MM: [number, number][] = [
  [0, 0],
  [60, 0],
  [60, 40],
  [0, 40],
];

/** Scene and radiators of a board driven by `lines` waveforms, at one of their frequencies. */
export function radiatorsAt(board: Board, frequencyHz: number): { scene: Scene; radiators: Radiator[] } {
  const site = { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' } as const;
  const scene = buildScene(board, site, Math.max(frequencyHz, 1e9), 'pair-only');
  const lines = spectrumTable(board, frequencyHz * 0.999, frequencyHz * 1.001, [])[0]!;
  return { scene, radiators: radiatingParts(scene, lines).map(({ radiator }) => radiator) };
}

/** Σ I·dl and Σ |I·dl| of radiators: [x re, x im, y re, y im, z re, z im], A·m. */
export function totalMoment(radiators: readonly Radiator[]): { sum: number[]; size: number } {
  const sum = [0, 0, 0, 0, 0, 0];
  let size = 0;
  for (const { elements, currentsA } of radiators) {
    for (let e = 0; e < elements.count; e++) {
      const v = [0, 1, 2].map((axis) => elements.vectorsM[3 * e + axis]!);
      for (const axis of [0, 1, 2]) {
        sum[2 * axis]! += currentsA[2 * e]! * v[axis]!;
        sum[2 * axis + 1]! += currentsA[2 * e + 1]! * v[axis]!;
      }
      size += Math.hypot(currentsA[2 * e]!, currentsA[2 * e + 1]!) * Math.hypot(...v);
    }
  }
  return { sum, size };
}
