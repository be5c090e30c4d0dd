import { ContentError } from '../attributes.ts';
import { flattenPath, type Path, type PointMm } from '../path.ts';

/** Arcs of outlines, planes and traces lie within 1 µm of their chords. */
const ARC_TOLERANCE_MM = 0.001;
/** Clearances are etched no finer than this. */
const CLEARANCE_TOLERANCE_MM = 0.005;
/** A 60 MB board has one to two million; beyond this the memory would not hold. */
const MOST_POINTS = 5_000_000;

/** Turns paths into points, within a budget: a small file can hold arcs that would fill any memory. */
export class Flattener {
  private points = 0;

  /** Outline, plane or trace. Throws ContentError when the file's points exceed the budget. */
  exact(path: Path): PointMm[] {
    return this.counted(flattenPath(path, ARC_TOLERANCE_MM));
  }

  clearance(path: Path): PointMm[] {
    return this.counted(flattenPath(path, CLEARANCE_TOLERANCE_MM));
  }

  private counted(points: PointMm[]): PointMm[] {
    this.points += points.length;
    if (this.points > MOST_POINTS) throw new ContentError(`draws more than ${MOST_POINTS} points`);
    return points;
  }
}
