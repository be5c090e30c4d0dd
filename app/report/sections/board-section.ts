import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { type Block, heading, type Section, type Text } from '../blocks.ts';
import { boardFigure, NAMED_NETS } from '../figures/board-figure.ts';
import { layerFigure } from '../figures/layer-figure.ts';
import { countText } from '../format.ts';

/** The board, all layers at once and one by one. */
export function boardSection(board: Board, result: EstimateResult): Section {
  const layers = layerFigure(board, result);
  const blocks: Block[] = [
    {
      kind: 'together',
      blocks: [{ kind: 'figure', pictures: [boardFigure(board, result)], captions: captions(board, result) }],
    },
  ];
  if (layers) {
    const figure: Block = { kind: 'figure', pictures: [layers], captions: [] };
    blocks.push({ kind: 'together', blocks: [heading('Layers, from the top'), figure] });
  }
  return { title: 'Board', blocks };
}

function captions(board: Board, result: EstimateResult): Text[] {
  const driven = new Set(board.drives.map(({ net }) => net)).size;
  const unnamed = Math.max(0, driven - NAMED_NETS);
  return [
    'From the top, all layers, axes in mm.',
    'Grey: planes and undriven copper.',
    ...(driven > 0
      ? [
          `Heavy: ${countText(driven, 'driven net')}, dashed below the top layer${
            unnamed > 0 ? `; the ${NAMED_NETS} that emit most are named` : ''
          }.`,
          'Filled squares: driven pins; hollow: loads.',
        ]
      : []),
    ...(board.loops.length > 0 ? ['Dotted: current loops.'] : []),
    ...(board.cables.length > 0 ? ['Lines to the edge: cables.'] : []),
    ...(result.findings.length > 0 ? ['Numbers: findings.'] : []),
  ];
}
