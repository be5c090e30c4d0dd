/** Numbers and paths of an SVG figure: two decimals of a pixel are finer than any printer. */

export type Xy = readonly [x: number, y: number];

/** Fewest digits that place a pixel; the same bytes everywhere. */
export const px = (value: number): string => {
  const rounded = Math.round(value * 100) / 100;
  return Object.is(rounded, -0) ? '0' : String(rounded);
};

/** Polyline as path data; consecutive points that fall on one place are dropped. */
export function linePath(points: readonly Xy[]): string {
  let path = '';
  let last = '';
  for (const [x, y] of points) {
    const place = `${px(x)} ${px(y)}`;
    if (place === last) continue;
    path += `${path === '' ? 'M' : 'L'}${place}`;
    last = place;
  }
  return path;
}

/** Closed ring as path data; empty when it has no extent. */
export function ringPath(points: readonly Xy[]): string {
  const path = linePath(points);
  return path.includes('L') ? `${path}Z` : '';
}

/** A straight dash centred at a place. */
export const dashPath = (x: number, y: number, halfX: number, halfY: number): string =>
  `M${px(x - halfX)} ${px(y - halfY)}L${px(x + halfX)} ${px(y + halfY)}`;
