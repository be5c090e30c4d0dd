import type { ResultPoint } from '../../estimate/result.ts';
import type { Scale } from './axis.ts';
import type { Xy } from './path.ts';

/** Width of a column of the plot in which one reading hides the other. */
const COLUMN_PX = 1.2;
/** Fewer readings than this are all drawn. */
const DENSE_COUNT = 300;
/** Marks nearer than this to a worse one of their kind are left out. */
const APART_PX = 6;

/**
 * The readings a plot can show: of each detector, in each narrow column, the one with the least margin and the strongest
 * of either polarisation. In order of frequency; the worst reading is always among them.
 */
export function thinPoints(points: readonly ResultPoint[], frequency: Scale): ResultPoint[] {
  const kept = points.length <= DENSE_COUNT ? [...points] : [...strongestByColumn(points, frequency)];
  return kept.sort((one, other) => one.frequencyHz - other.frequencyHz || one.marginDb - other.marginDb);
}

function strongestByColumn(points: readonly ResultPoint[], frequency: Scale): Set<ResultPoint> {
  const best = new Map<string, ResultPoint>();
  const offer = (key: string, point: ResultPoint, measure: (point: ResultPoint) => number) => {
    const held = best.get(key);
    if (!held || measure(point) > measure(held)) best.set(key, point);
  };
  for (const point of points) {
    const column = `${Math.floor(frequency.at(point.frequencyHz) / COLUMN_PX)} ${point.detector}`;
    offer(`${column} margin`, point, ({ marginDb }) => -marginDb);
    offer(`${column} h`, point, ({ horizontalDbuvPerM }) => horizontalDbuvPerM);
    offer(`${column} v`, point, ({ verticalDbuvPerM }) => verticalDbuvPerM);
  }
  return new Set(best.values());
}

/** Of places in order of weight those that keep apart, along x or y, from every weightier one. */
export function keepApart(places: readonly Xy[]): Xy[] {
  const kept: Xy[] = [];
  for (const [x, y] of places) {
    if (kept.every(([keptX, keptY]) => Math.abs(keptX - x) >= APART_PX || Math.abs(keptY - y) >= APART_PX)) {
      kept.push([x, y]);
    }
  }
  return kept;
}
