import type { ScreenPoint } from './view.ts';

/** A finding's flag stands with its tip on the place; CSS pixels. */
export const FLAG = { halfWidth: 9, height: 15, tip: 6 } as const;

export function isOnFlag(tip: ScreenPoint, { x, y }: ScreenPoint): boolean {
  const up = tip.y - y;
  return Math.abs(x - tip.x) <= FLAG.halfWidth && up >= 0 && up <= FLAG.tip + FLAG.height;
}
