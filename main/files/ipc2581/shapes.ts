import { type Affine, IDENTITY, isIdentity, readXform } from './affine.ts';
import {
  type Attributes,
  booleanAttribute,
  type Names,
  numberAttribute,
  optionalNumber,
  wordAttribute,
} from './attributes.ts';
import { addCurve, addSegment, beginPath, type Path, transformPath } from './path.ts';
import { primitivePath } from './primitives.ts';
import type { ElementReader } from './xml-reader.ts';

/** Width in millimetres, or the id of a line description that may come later in the file. */
export type LineWidth = number | { readonly lineDescRef: string };
/** Fill word (`FILL`, `HOLLOW`, `VOID`, `HATCH`, `MESH`), or the id of a fill description; absent: filled. */
export type Fill = string | { readonly fillDescRef: string };

export type Shape =
  | { readonly kind: 'stroke'; readonly path: Path; readonly width: LineWidth | undefined }
  | {
      readonly kind: 'area';
      readonly ring: Path;
      readonly cutouts: readonly Path[];
      readonly fill: Fill | undefined;
      readonly isThermal: boolean;
    }
  | { readonly kind: 'reference'; readonly dictionary: 'standard' | 'user'; readonly id: string };

export interface ShapeContext {
  readonly mmPerUnit: number;
  readonly names: Names;
}

type Sink = (shape: Shape) => void;

/**
 * Reader for one child that draws something, in Features, Pad, UserSpecial (to any depth), dictionary entries and
 * slots alike; undefined when the child draws nothing that matters here (text, colours).
 */
export function readShape(
  context: ShapeContext,
  name: string,
  attributes: Attributes,
  sink: Sink,
): ElementReader | undefined {
  switch (name) {
    case 'Line':
    case 'Arc':
      return new StrokeReader(context, openStroke(context, name, attributes), sink);
    case 'Polyline':
      return new StrokeReader(context, [], sink);
    case 'Contour':
      return new ContourReader(context, sink);
    case 'Outline':
      return {
        child: (inner) =>
          inner === 'Polygon'
            ? new RingReader(context, [], (ring, fill) =>
                sink({ kind: 'area', ring, cutouts: [], fill, isThermal: false }),
              )
            : undefined,
      };
    case 'UserSpecial':
      return { child: (inner, innerAttributes) => readShape(context, inner, innerAttributes, sink) };
    case 'StandardPrimitiveRef':
    case 'UserPrimitiveRef': {
      const id = context.names.read(name, attributes, 'id');
      const dictionary = name === 'UserPrimitiveRef' ? 'user' : 'standard';
      if (id !== undefined) sink({ kind: 'reference', dictionary, id });
      return undefined;
    }
    default: {
      const ring = primitivePath(name, attributes, context.mmPerUnit);
      if (ring === undefined) return undefined;
      const isThermal = name === 'Thermal';
      return new RingReader(context, ring, (path, fill) =>
        sink({ kind: 'area', ring: path, cutouts: [], fill, isThermal }),
      );
    }
  }
}

/** Reads LineDesc or LineDescRef; undefined when the element is neither. */
export function readLineWidth(context: ShapeContext, name: string, attributes: Attributes): LineWidth | undefined {
  if (name === 'LineDesc') {
    const width = optionalNumber(name, attributes, 'lineWidth');
    return width === undefined ? undefined : Math.abs(width) * context.mmPerUnit;
  }
  if (name !== 'LineDescRef') return undefined;
  const lineDescRef = context.names.read(name, attributes, 'id');
  return lineDescRef === undefined ? undefined : { lineDescRef };
}

function openStroke(context: ShapeContext, name: string, attributes: Attributes): Path {
  const at = (attribute: string): number => numberAttribute(name, attributes, attribute) * context.mmPerUnit;
  const path = beginPath(at('startX'), at('startY'));
  if (name === 'Line') addSegment(path, at('endX'), at('endY'));
  else {
    const clockwise = booleanAttribute(attributes, 'clockwise', true);
    addCurve(path, at('endX'), at('endY'), at('centerX'), at('centerY'), clockwise);
  }
  return path;
}

/** Adds PolyBegin, PolyStepSegment or PolyStepCurve to the path, in document order. */
function readStep(context: ShapeContext, path: Path, name: string, attributes: Attributes): void {
  const at = (attribute: string): number => numberAttribute(name, attributes, attribute) * context.mmPerUnit;
  // A file that lacks PolyBegin starts at its first step.
  if (name === 'PolyBegin' || (path.length === 0 && name.startsWith('PolyStep')))
    path.push(...beginPath(at('x'), at('y')));
  else if (name === 'PolyStepSegment') addSegment(path, at('x'), at('y'));
  else if (name === 'PolyStepCurve') {
    // The schemas of all revisions make clockwise the default.
    const clockwise = booleanAttribute(attributes, 'clockwise', true);
    addCurve(path, at('x'), at('y'), at('centerX'), at('centerY'), clockwise);
  }
}

class StrokeReader implements ElementReader {
  private readonly context: ShapeContext;
  private readonly path: Path;
  private readonly sink: Sink;
  private width: LineWidth | undefined;

  constructor(context: ShapeContext, path: Path, sink: Sink) {
    this.context = context;
    this.path = path;
    this.sink = sink;
  }

  child(name: string, attributes: Attributes): undefined {
    const width = readLineWidth(this.context, name, attributes);
    if (width !== undefined) this.width = width;
    else readStep(this.context, this.path, name, attributes);
    return undefined;
  }

  end(): void {
    if (this.path.length > 0) this.sink({ kind: 'stroke', path: this.path, width: this.width });
  }
}

/** A Polygon, a Cutout, or a primitive that already has its outline; all may carry a fill and a transform. */
class RingReader implements ElementReader {
  private readonly context: ShapeContext;
  private readonly path: Path;
  private readonly done: (ring: Path, fill: Fill | undefined) => void;
  private fill: Fill | undefined;
  private transform: Affine = IDENTITY;

  constructor(context: ShapeContext, path: Path, done: (ring: Path, fill: Fill | undefined) => void) {
    this.context = context;
    this.path = path;
    this.done = done;
  }

  child(name: string, attributes: Attributes): undefined {
    if (name === 'Xform') this.transform = readXform(attributes, this.context.mmPerUnit);
    else if (name === 'FillDesc') this.fill = wordAttribute(attributes, 'fillProperty');
    else if (name === 'FillDescRef') {
      const fillDescRef = this.context.names.read(name, attributes, 'id');
      if (fillDescRef !== undefined) this.fill = { fillDescRef };
    } else readStep(this.context, this.path, name, attributes);
    return undefined;
  }

  end(): void {
    if (this.path.length === 0) return;
    this.done(isIdentity(this.transform) ? this.path : transformPath(this.path, this.transform), this.fill);
  }
}

/** Polygon with cutouts; Profile has the same form. */
export class ContourReader implements ElementReader {
  private readonly context: ShapeContext;
  private readonly sink: Sink;
  private ring: Path | undefined;
  private readonly cutouts: Path[] = [];
  private fill: Fill | undefined;

  constructor(context: ShapeContext, sink: Sink) {
    this.context = context;
    this.sink = sink;
  }

  child(name: string): ElementReader | undefined {
    if (name === 'Polygon') {
      return new RingReader(this.context, [], (ring, fill) => {
        this.ring = ring;
        this.fill = fill;
      });
    }
    return name === 'Cutout' ? new RingReader(this.context, [], (ring) => this.cutouts.push(ring)) : undefined;
  }

  end(): void {
    if (this.ring === undefined) return;
    this.sink({ kind: 'area', ring: this.ring, cutouts: this.cutouts, fill: this.fill, isThermal: false });
  }
}
