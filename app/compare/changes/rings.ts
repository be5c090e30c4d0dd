type PointMm = readonly [number, number];

/** Width and height of what encloses the points. */
export function sizeMm(pointsMm: readonly PointMm[]): [widthMm: number, heightMm: number] {
  const [left, bottom, right, top] = boxMm(pointsMm);
  return [right - left, top - bottom];
}

export function boxMm(pointsMm: readonly PointMm[]): [left: number, bottom: number, right: number, top: number] {
  return pointsMm.reduce<[number, number, number, number]>(
    ([left, bottom, right, top], [x, y]) => [
      Math.min(left, x),
      Math.min(bottom, y),
      Math.max(right, x),
      Math.max(top, y),
    ],
    [Infinity, Infinity, -Infinity, -Infinity],
  );
}

/** The ring, wherever it starts and whichever way it runs; places to the nanometre. */
export function ringKey(pointsMm: readonly PointMm[]): string {
  const places = pointsMm.map(([x, y]) => `${nanometres(x)} ${nanometres(y)}`);
  if (places.length > 1 && places[0] === places.at(-1)) places.pop();
  const least = places.reduce((held, place, i) => (place < places[held]! ? i : held), 0);
  const turned = [...places.slice(least), ...places.slice(0, least)];
  const back = [turned[0]!, ...turned.slice(1).reverse()];
  return [turned.join(','), back.join(',')].sort()[0]!;
}

/** Of a coordinate in mm. File coordinates are whole nanometres; a conversion's rounding does not leave them. */
export const nanometres = (valueMm: number): number => Math.round(valueMm * 1e6) + 0;
