import { type Affine, isIdentity, scaleOf } from './affine.ts';
import { transformPath } from './path.ts';
import type { Shape } from './shapes.ts';

/** The shape where it lies on the board; a reference stays as it is, its transform is applied when it is looked up. */
export function placeShape(shape: Shape, transform: Affine): Shape {
  if (shape.kind === 'reference' || isIdentity(transform)) return shape;
  if (shape.kind === 'area') {
    const cutouts = shape.cutouts.map((cutout) => transformPath(cutout, transform));
    return { ...shape, ring: transformPath(shape.ring, transform), cutouts };
  }
  const { width } = shape;
  const scaled = typeof width === 'number' ? width * scaleOf(transform) : width;
  return { ...shape, path: transformPath(shape.path, transform), width: scaled };
}
