import { type DrawnShape, type Ipc2581Document, isCopperFunction, type Step } from '../document.ts';
import type { Path } from '../path.ts';
import { type Findings, nameList } from './findings.ts';
import type { PlainShape, ShapeResolver } from './shape-resolver.ts';

/** A drawn copper line that has a net. */
export interface CopperStroke {
  readonly layer: string;
  readonly net: string;
  readonly path: Path;
  readonly widthMm: number | undefined;
}

/** A filled copper area that has a net and may be a plane. */
interface CopperArea {
  readonly layer: string;
  readonly net: string;
  readonly ring: Path;
  readonly cutouts: readonly Path[];
  /** Place in the document: what is taken away counts for what was drawn before it. */
  readonly order: number;
}

/** Something drawn that takes copper away. */
export interface CopperVoid {
  readonly layer: string;
  readonly net: string | undefined;
  readonly shape: PlainShape;
  readonly widthMm: number | undefined;
  /** A thermal relief: bridged by spokes, so it tells the plane's net and cuts nothing out. */
  readonly isThermal: boolean;
  readonly order: number;
}

export interface Copper {
  readonly strokes: CopperStroke[];
  readonly areas: CopperArea[];
  readonly voids: CopperVoid[];
}

/** Uses of an area that are copper but no plane. */
const NOT_A_PLANE = new Set(['TEARDROP', 'THERMAL_RELIEF', 'TEXT', 'THIEVING']);

/** Sorts what is drawn on copper layers into lines, areas and voids, all references looked up. */
export function collectCopper(
  document: Ipc2581Document,
  step: Step,
  resolver: ShapeResolver,
  findings: Findings,
): Copper {
  const copper: Copper = { strokes: [], areas: [], voids: [] };
  const counts = { withoutNet: 0, hollow: 0, patterned: 0, doubleNegative: 0 };
  const undeclared = new Set<string>();

  const visit = (drawn: DrawnShape, shape: PlainShape, isNegativeLayer: boolean, order: number): void => {
    const { layer, net, usage } = drawn;
    const fill = shape.kind === 'area' ? resolver.fillWord(shape.fill) : '';
    const widthMm = shape.kind === 'stroke' ? resolver.widthMm(shape.width) : undefined;
    if (isNegativeLayer && drawn.isNegative) counts.doubleNegative++;
    else if (isNegativeLayer || drawn.isNegative || fill === 'VOID') {
      const isThermal = usage === 'THERMAL_RELIEF' || (shape.kind === 'area' && shape.isThermal);
      copper.voids.push({ layer, net, shape, widthMm, isThermal, order });
    } else if (net === undefined) counts.withoutNet++;
    else if (shape.kind === 'stroke') copper.strokes.push({ layer, net, path: shape.path, widthMm });
    else if (fill === 'HOLLOW') counts.hollow++;
    else if (!drawn.isPad && !NOT_A_PLANE.has(usage)) {
      if (fill === 'HATCH' || fill === 'MESH') counts.patterned++;
      copper.areas.push({ layer, net, ring: shape.ring, cutouts: shape.cutouts, order });
    }
  };

  step.shapes.forEach((drawn, order) => {
    const layer = document.layers.get(drawn.layer);
    if (layer === undefined) undeclared.add(drawn.layer);
    else if (isCopperFunction(layer.layerFunction)) {
      resolver.expand(drawn.shape, drawn.transform, (shape) => visit(drawn, shape, layer.isNegative, order));
    }
  });

  findings.add(
    'copper-without-net',
    counts.withoutNet,
    `${counts.withoutNet} copper shapes carry no net (text, marks, fills): they are not imported`,
  );
  findings.add(
    'hollow-areas',
    counts.hollow,
    `${counts.hollow} copper areas with a net are drawn hollow: they are no planes and are not imported`,
  );
  findings.add(
    'patterned-areas',
    counts.patterned,
    `${counts.patterned} copper areas are filled with a hatch or mesh: they are imported as solid`,
  );
  findings.add(
    'negative-on-negative',
    counts.doubleNegative,
    `${counts.doubleNegative} shapes are drawn negative on a negative layer: they are not imported`,
  );
  findings.add(
    'layer-undeclared',
    undeclared.size,
    `features lie on layers that the file does not declare (${nameList([...undeclared])}): they are not imported`,
  );
  return copper;
}
