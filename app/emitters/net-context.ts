import type { Board } from '../board/board.ts';
import type { NetworkDrive, NetworkLoad } from '../network/network.ts';
import type { PlaneIndex } from '../returns/reference.ts';
import type { SiteFrame } from '../site/site.ts';
import type { StructureModel } from '../structure/structure-model.ts';
import type { StitchIndex } from './transitions.ts';

/** What all nets of a board share while they are modelled. */
export interface NetContext {
  readonly board: Board;
  readonly frame: SiteFrame;
  readonly planes: PlaneIndex;
  readonly stitches: StitchIndex;
  /** Planes and cables to be solved; null: trace pairs only. */
  readonly structure: StructureModel | null;
  /** Highest frequency the elements must serve. */
  readonly maxHz: number;
}

/** Drivers and loads of a net at the nodes of its graph. */
export interface Terminals {
  readonly drives: readonly NetworkDrive[];
  readonly loads: readonly NetworkLoad[];
  readonly nodes: ReadonlySet<number>;
}
