import type { Affine } from '../affine.ts';
import { ContentError } from '../attributes.ts';
import type { Ipc2581Document } from '../document.ts';
import { placeShape } from '../place-shape.ts';
import type { Fill, LineWidth, Shape } from '../shapes.ts';

export type PlainShape = Exclude<Shape, { kind: 'reference' }>;

const DEEPEST_REFERENCE = 16;
/** Ten entries of ten references each, ten deep, are a few kilobytes in the file. */
const MOST_DRAWN = 20_000_000;

/** Looks references up in the dictionaries; those that lead nowhere are counted, not refused. */
export class ShapeResolver {
  private readonly document: Ipc2581Document;
  private drawn = 0;
  /** References to entries that do not exist, or that lead back to themselves. */
  unresolved = 0;

  constructor(document: Ipc2581Document) {
    this.document = document;
  }

  /** Visits what the shape draws, in place. Throws ContentError when references multiply without end. */
  expand(shape: Shape, transform: Affine, visit: (shape: PlainShape) => void, depth = 0): void {
    this.drawn += 1 + sizeOf(shape);
    if (this.drawn > MOST_DRAWN) throw new ContentError(`draws more than ${MOST_DRAWN} numbers by reference`);
    if (shape.kind !== 'reference') {
      visit(shape);
      return;
    }
    const { standardShapes, userShapes } = this.document;
    const entry = (shape.dictionary === 'user' ? userShapes : standardShapes).get(shape.id);
    if (entry === undefined || depth >= DEEPEST_REFERENCE) {
      this.unresolved++;
      return;
    }
    for (const inner of entry) this.expand(placeShape(inner, transform), transform, visit, depth + 1);
  }

  /** Width in millimetres; undefined when none is stated. */
  widthMm(width: LineWidth | undefined): number | undefined {
    if (width === undefined || typeof width === 'number') return width;
    const found = this.document.lineWidthsMm.get(width.lineDescRef);
    if (found === undefined) this.unresolved++;
    return found;
  }

  /** Fill word; empty means filled. */
  fillWord(fill: Fill | undefined): string {
    if (fill === undefined || typeof fill === 'string') return fill ?? '';
    const found = this.document.fills.get(fill.fillDescRef);
    if (found === undefined) this.unresolved++;
    return found ?? '';
  }
}

const sizeOf = (shape: Shape): number => {
  if (shape.kind === 'reference') return 0;
  return shape.kind === 'stroke'
    ? shape.path.length
    : shape.cutouts.reduce((sum, cutout) => sum + cutout.length, shape.ring.length);
};
