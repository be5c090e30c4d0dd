import type { Affine } from './affine.ts';
import type { Path } from './path.ts';
import type { Shape } from './shapes.ts';

/**
 * What is kept of a file while it streams by: millimetres, board axes as drawn, names as written. References to
 * dictionaries stay open, because a dictionary may come after the geometry.
 */
export interface Ipc2581Document {
  revision: string;
  /** FunctionMode, for words to the user only: what the file holds is judged by its content. */
  functionMode: string;
  units: string;
  mmPerUnit: number;
  readonly lineWidthsMm: Map<string, number>;
  readonly fills: Map<string, string>;
  readonly standardShapes: Map<string, readonly Shape[]>;
  readonly userShapes: Map<string, readonly Shape[]>;
  readonly specs: Map<string, Material>;
  readonly layers: Map<string, Layer>;
  readonly stackups: Stackup[];
  readonly steps: Step[];
}

/** Material facts of a Spec, or written on a stackup row itself. */
export interface Material {
  epsilonR?: number;
  lossTangent?: number;
  /** Free text; tells copper and air. */
  text: string;
}

export interface Layer {
  readonly name: string;
  readonly layerFunction: string;
  readonly side: string;
  readonly isNegative: boolean;
  /** Copper layers a DRILL or ROUT layer joins. */
  from?: string;
  to?: string;
  readonly specRefs: string[];
}

export interface Stackup {
  readonly name: string;
  readonly overallThicknessMm: number;
  readonly groups: StackupGroup[];
}

interface StackupGroup {
  readonly name: string;
  readonly rows: StackupRow[];
}

export interface StackupRow {
  readonly layerRef: string;
  readonly thicknessMm: number;
  readonly sequence: number | undefined;
  readonly specRefs: string[];
  /** Facts on the row itself (revision A). */
  readonly material: Material;
}

export interface Step {
  readonly name: string;
  repeats: number;
  profile: { readonly ring: Path; readonly cutouts: readonly Path[] } | undefined;
  /** Side layer of every component by reference designator. */
  readonly componentLayers: Map<string, string>;
  componentCount: number;
  readonly logicalNets: Set<string>;
  /** Net by `pinKey`. */
  readonly pinNets: Map<string, string>;
  readonly shapes: DrawnShape[];
  readonly pads: PinPad[];
  readonly holes: Hole[];
  readonly slots: PlatedSlot[];
  /** Names on drawn features, in order of appearance. */
  readonly netNames: Set<string>;
  /** Drawn things (shapes and pads) by layer; a layer without an entry has no LayerFeature at all. */
  readonly featureCounts: Map<string, number>;
}

/** One shape on a layer, in document order. */
export interface DrawnShape {
  readonly layer: string;
  readonly net: string | undefined;
  readonly usage: string;
  /** The Set says NEGATIVE: it takes away what was drawn before. */
  readonly isNegative: boolean;
  readonly isPad: boolean;
  readonly shape: Shape;
  /** Placement of a reference; other shapes are placed already. */
  readonly transform: Affine;
}

export interface PinPad {
  readonly layer: string;
  readonly component: string;
  readonly pin: string;
  readonly net: string | undefined;
  readonly xMm: number;
  readonly yMm: number;
}

export interface Hole {
  readonly xMm: number;
  readonly yMm: number;
  readonly diameterMm: number;
  readonly kind: 'via' | 'plated';
  readonly net: string | undefined;
  /** Layer it is drawn on; its name may hint at the span. */
  readonly layer: string | undefined;
  /** Span of the hole itself; that of a drill layer is on the layer. */
  readonly from: string | undefined;
  readonly to: string | undefined;
}

/** A plated slot joins layers like a hole; its shape may be a reference. */
export interface PlatedSlot {
  readonly net: string | undefined;
  readonly layer: string;
  readonly shapes: readonly Shape[];
  readonly transform: Affine;
}

export const pinKey = (component: string, pin: string): string => `${component}\u0000${pin}`;

const COPPER = new Set(['CONDUCTOR', 'SIGNAL', 'PLANE', 'MIXED', 'CONDFILM', 'CONDFOIL']);
const DIELECTRIC = new Set(['DIELCORE', 'DIELPREG', 'DIELBASE', 'DIELADHV', 'DIELBONDPLY', 'DIELCOVERLAY']);

export const isCopperFunction = (layerFunction: string): boolean => COPPER.has(layerFunction);
export const isDielectricFunction = (layerFunction: string): boolean => DIELECTRIC.has(layerFunction);

export const emptyDocument = (): Ipc2581Document => ({
  revision: '',
  functionMode: '',
  units: '',
  mmPerUnit: Number.NaN,
  lineWidthsMm: new Map(),
  fills: new Map(),
  standardShapes: new Map(),
  userShapes: new Map(),
  specs: new Map(),
  layers: new Map(),
  stackups: [],
  steps: [],
});

export const emptyStep = (name: string): Step => ({
  name,
  repeats: 0,
  profile: undefined,
  componentLayers: new Map(),
  componentCount: 0,
  logicalNets: new Set(),
  pinNets: new Map(),
  shapes: [],
  pads: [],
  holes: [],
  slots: [],
  netNames: new Set(),
  featureCounts: new Map(),
});
