import { cellAtIndex, type FacingCells, type Sheet } from './sheet.ts';

/** Places across an opening that lie this near (in cells, both ways) belong to one opening. */
const SAME_OPENING_CELLS = 1.5;

/**
 * Lengths (m) of the openings that cells face each other across and that leave the copper at one end: slots cut in from an edge.
 * What parts the copper from edge to edge is none: it has no end that a current could go around.
 */
export function openSlotsM(sheet: Sheet): number[] {
  const places = sheet.facing.map((pair) => placeOf(sheet, pair));
  const group = places.map((_, index) => index);
  const root = (index: number): number => {
    let at = index;
    while (group[at] !== at) at = group[at]!;
    return at;
  };
  for (const [i, one] of places.entries()) {
    for (let j = 0; j < i; j++) {
      const other = places[j]!;
      const apart = Math.max(Math.abs(one.x - other.x), Math.abs(one.y - other.y));
      if (apart <= SAME_OPENING_CELLS) group[root(i)] = root(j);
    }
  }
  const openings = new Map<number, Place[]>();
  for (const [i, place] of places.entries()) {
    const known = openings.get(root(i));
    if (known) known.push(place);
    else openings.set(root(i), [place]);
  }
  return [...openings.values()].flatMap((opening) => {
    const xs = opening.map(({ x }) => x);
    const ys = opening.map(({ y }) => y);
    const width = Math.max(...xs) - Math.min(...xs);
    const height = Math.max(...ys) - Math.min(...ys);
    const openEnds = opening.reduce((sum, place) => sum + place.openEnds, 0);
    return openEnds === 1 ? [(Math.hypot(width, height) + 1) * sheet.grid.cellM] : [];
  });
}

/** Middle of an opening between two cells, in cells from the grid's origin, and on how many sides it goes on without copper. */
interface Place {
  readonly x: number;
  readonly y: number;
  readonly openEnds: number;
}

function placeOf(sheet: Sheet, { first, second, across }: FacingCells): Place {
  const [c1, r1, c2, r2] = [sheet.columnOf[first]!, sheet.rowOf[first]!, sheet.columnOf[second]!, sheet.rowOf[second]!];
  const isBare = (step: number): boolean => {
    const [dc, dr] = across === 'x' ? [0, step] : [step, 0];
    return cellAtIndex(sheet, c1 + dc, r1 + dr) < 0 && cellAtIndex(sheet, c2 + dc, r2 + dr) < 0;
  };
  return { x: (c1 + c2 + 1) / 2, y: (r1 + r2 + 1) / 2, openEnds: [-1, 1].filter(isBare).length };
}
