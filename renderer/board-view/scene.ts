import type { Board, Cable } from '../../app/board/board.ts';
import type { LineDetail } from '../../app/contract/line-detail.ts';
import type { Finding } from '../../app/estimate/result.ts';
import type { Palette } from '../theme/palette.ts';
import type { CopperBatches } from './copper-batches.ts';
import type { LayerSight } from './hit-test.ts';
import type { NetShape } from './net-shape.ts';

/** What a chosen line colours: the pieces by what they radiate, the planes by their current, or nothing. */
export type Colouring = 'shares' | 'current' | 'none';

export type PieceDetail = LineDetail['pieces'][number];
export type CurrentMap = NonNullable<LineDetail['currentMap']>;

/** What changes seldom: drawn once a view, then moved. */
export interface StillScene {
  readonly board: Pick<Board, 'stackup'>;
  readonly copper: CopperBatches;
  /** Driven nets stand out a little. */
  readonly driven: readonly NetShape[];
  readonly sight: LayerSight;
  /** Copper layers in the order of drawing: the farthest first, the active one last. */
  readonly layerOrder: readonly number[];
  readonly pieces: readonly PieceDetail[];
  readonly currentMap: CurrentMap | null;
  readonly colouring: Colouring;
  readonly cables: readonly Cable[];
  readonly palette: Palette;
}

/** What follows pointer and choice. */
export interface LiveScene {
  readonly sight: LayerSight;
  readonly selected: NetShape | null;
  readonly hovered: NetShape | null;
  readonly cables: readonly Cable[];
  readonly selectedCable: string | null;
  readonly hoveredCable: string | null;
  readonly piece: PieceDetail | null;
  readonly findings: readonly Finding[];
  readonly selectedFinding: number | null;
  readonly palette: Palette;
}
