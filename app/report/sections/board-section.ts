import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { boardFigure, NAMED_NETS } from '../figures/board-figure.ts';
import { layerFigure } from '../figures/layer-figure.ts';
import { countText } from '../format.ts';
import { type Markup, markup } from '../markup.ts';

/** The board, all layers at once and one by one. */
export function boardSection(board: Board, result: EstimateResult): Markup {
  const driven = new Set(board.drives.map(({ net }) => net)).size;
  const unnamed = Math.max(0, driven - NAMED_NETS);
  const layers = layerFigure(board, result);
  return markup`<section class="keep"><h2>Board</h2>
<figure>${boardFigure(board, result)}
<figcaption><span>From the top, all layers, axes in mm.</span><span>Grey: planes and undriven copper.</span>${
    driven > 0 &&
    markup`<span>Heavy: ${countText(driven, 'driven net')}, dashed below the top layer${
      unnamed > 0 && `; the ${NAMED_NETS} that emit most are named`
    }.</span><span>Filled squares: driven pins; hollow: loads.</span>`
  }${board.loops.length > 0 && markup`<span>Dotted: current loops.</span>`}${
    board.cables.length > 0 && markup`<span>Lines to the edge: cables.</span>`
  }${result.findings.length > 0 && markup`<span>Numbers: findings.</span>`}</figcaption></figure></section>
${layers && markup`<section class="keep"><h3>Layers, from the top</h3><figure>${layers}</figure></section>`}`;
}
