import type { Board, Net, PointM } from '../../app/board/board.ts';
import { boardExtent } from '../../app/report/figures/board-frame.ts';
import type { BoxM } from './view.ts';

const EMPTY: BoxM = { lowXM: Infinity, lowYM: Infinity, highXM: -Infinity, highYM: -Infinity };

/** Box about points; null without any. Heights of points are left out. */
export function boxOf(pointsM: Iterable<readonly number[]>, start: BoxM | null = null): BoxM | null {
  let { lowXM, lowYM, highXM, highYM } = start ?? EMPTY;
  for (const [xM, yM] of pointsM as Iterable<PointM>) {
    lowXM = Math.min(lowXM, xM);
    lowYM = Math.min(lowYM, yM);
    highXM = Math.max(highXM, xM);
    highYM = Math.max(highYM, yM);
  }
  return lowXM <= highXM ? { lowXM, lowYM, highXM, highYM } : null;
}

export const joined = (one: BoxM, other: BoxM): BoxM => ({
  lowXM: Math.min(one.lowXM, other.lowXM),
  lowYM: Math.min(one.lowYM, other.lowYM),
  highXM: Math.max(one.highXM, other.highXM),
  highYM: Math.max(one.highYM, other.highYM),
});

export const overlap = (one: BoxM, other: BoxM): boolean =>
  one.lowXM <= other.highXM && one.highXM >= other.lowXM && one.lowYM <= other.highYM && one.highYM >= other.lowYM;

/** Outline, traces and loops, with or without what hangs on them. */
export function boardBox(board: Board, withCables: boolean): BoxM {
  const { lowX, lowY, highX, highY } = boardExtent(board);
  const box = { lowXM: lowX, lowYM: lowY, highXM: highX, highYM: highY };
  if (!withCables) return box;
  return boxOf(
    board.cables.flatMap(({ pointsM }) => pointsM),
    box,
  )!;
}

/** Traces, vias and pins of a net; when it has none of them, its planes. */
export function netBox(board: Board, net: Net): BoxM | null {
  const copper = boxOf([
    ...net.traces.flatMap(({ pointsM }) => pointsM),
    ...net.vias.map(({ atM }) => atM),
    ...net.pins.map(({ atM }) => atM),
  ]);
  return copper ?? boxOf(board.planes.filter((plane) => plane.net === net.name).flatMap(({ ringM }) => ringM));
}
