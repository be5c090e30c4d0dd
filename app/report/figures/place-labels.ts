import type { Xy } from './path.ts';

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

export interface LabelRequest {
  readonly text: string;
  readonly anchor: Xy;
}

export interface PlacedLabel extends LabelRequest {
  /** Start of the text's baseline. */
  readonly at: Xy;
  /** Where a leader ends at the text; absent when the text stands beside its anchor. */
  readonly leaderTo: Xy | undefined;
}

/** Mean advance of a digit or letter over the font size, on the wide side. */
const ADVANCE = 0.58;

const textWidthPx = (text: string, fontPx: number): number => Array.from(text).length * fontPx * ADVANCE;

/** Tried in this order: a ring of places ever farther from the anchor. */
const DISTANCES_PX = [8, 20, 34, 50, 70];
const DIRECTIONS: readonly Xy[] = [
  [0, -1],
  [0.9, -0.7],
  [-0.9, -0.7],
  [1, 0],
  [-1, 0],
  [0.9, 0.7],
  [-0.9, 0.7],
  [0, 1],
];

/** What labels keep clear of. */
export interface LabelSpace {
  readonly bounds: Box;
  readonly fontPx: number;
  /** Never covered. */
  readonly obstacles?: readonly Box[];
  /** Polylines that are crossed only where there is no other way. */
  readonly lines?: readonly (readonly Xy[])[];
}

/**
 * Puts labels near their anchors, first come first served, so that none covers another, an obstacle, a leader, or the
 * edge of `bounds`. A label without a free place is left out: its line is in the table all the same.
 */
export function placeLabels(requests: readonly LabelRequest[], space: LabelSpace): PlacedLabel[] {
  const { bounds, fontPx, lines = [] } = space;
  const taken: Box[] = [...(space.obstacles ?? [])];
  const placed: PlacedLabel[] = [];
  for (const request of requests) {
    const { anchor } = request;
    const free = candidates(anchor, textWidthPx(request.text, fontPx), fontPx).filter(
      ({ box, leaderTo }) =>
        isWithin(box, bounds) &&
        !taken.some((other) => overlap(box, other)) &&
        !(leaderTo && taken.some((other) => !contains(other, anchor) && crosses(anchor, leaderTo, other))),
    );
    const found = free.find(({ box }) => !lines.some((line) => meets(line, box))) ?? free[0];
    if (!found) continue;
    taken.push(found.box);
    if (found.leaderTo) taken.push(...alongLeader(anchor, found.leaderTo));
    placed.push({ ...request, at: [found.box.left, found.box.bottom - fontPx * 0.25], leaderTo: found.leaderTo });
  }
  return placed;
}

/** Does any piece of the polyline meet the box? */
const meets = (line: readonly Xy[], box: Box): boolean =>
  line.some((point, i) => i > 0 && crosses(line[i - 1]!, point, box));

/** Small boxes along a leader, so that no later one crosses it. */
function alongLeader([ax, ay]: Xy, [bx, by]: Xy): Box[] {
  const steps = Math.ceil(Math.hypot(bx - ax, by - ay) / 3);
  return Array.from({ length: steps }, (_, i) =>
    boxAround([ax + ((bx - ax) * (i + 1)) / steps, ay + ((by - ay) * (i + 1)) / steps], 1.5),
  );
}

function candidates(anchor: Xy, width: number, height: number): { box: Box; leaderTo: Xy | undefined }[] {
  const [x, y] = anchor;
  return DISTANCES_PX.flatMap((distance) =>
    DIRECTIONS.map(([dx, dy]) => {
      // The box touches the ring with the side that faces the anchor.
      const left = x + dx * distance + (dx > 0.5 ? 0 : dx < -0.5 ? -width : -width / 2);
      const top = y + dy * distance + (dy > 0.5 ? 0 : dy < -0.5 ? -height : -height / 2);
      const box = { left, top, right: left + width, bottom: top + height };
      return { box, leaderTo: distance > DISTANCES_PX[0]! ? nearestOnBox(box, anchor) : undefined };
    }),
  );
}

const isWithin = (box: Box, bounds: Box): boolean =>
  box.left >= bounds.left && box.right <= bounds.right && box.top >= bounds.top && box.bottom <= bounds.bottom;

const overlap = (one: Box, other: Box): boolean =>
  one.left < other.right && other.left < one.right && one.top < other.bottom && other.top < one.bottom;

const contains = (box: Box, [x, y]: Xy): boolean => x >= box.left && x <= box.right && y >= box.top && y <= box.bottom;

/** Does the straight piece enter the box? Looked at every few pixels, which is finer than any text. */
function crosses([ax, ay]: Xy, [bx, by]: Xy, box: Box): boolean {
  const steps = Math.ceil(Math.hypot(bx - ax, by - ay) / 3);
  for (let i = 1; i <= steps; i++) {
    if (contains(box, [ax + ((bx - ax) * i) / steps, ay + ((by - ay) * i) / steps])) return true;
  }
  return false;
}

const nearestOnBox = (box: Box, [x, y]: Xy): Xy => [
  Math.min(box.right, Math.max(box.left, x)),
  Math.min(box.bottom, Math.max(box.top, y)),
];

/** A small square about a place that labels must not cover. */
export const boxAround = ([x, y]: Xy, half: number): Box => ({
  left: x - half,
  top: y - half,
  right: x + half,
  bottom: y + half,
});
