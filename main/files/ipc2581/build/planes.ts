import type { BoardFileInput } from '../../../../app/board/board-file.ts';
import { ContentError } from '../attributes.ts';
import { type Ipc2581Document, isCopperFunction, type Step } from '../document.ts';
import type { Path, PointMm } from '../path.ts';
import type { Copper } from './copper.ts';
import { type Findings, nameList } from './findings.ts';
import type { Flattener } from './flattener.ts';
import { type BoardFrame, type BoxMm, boxOf, ringAreaMm2 } from './frame.ts';
import { guessPlaneNet } from './plane-net.ts';
import { voidRings } from './void-rings.ts';

type FilePlane = NonNullable<BoardFileInput['planes']>[number];

/** One cell of the default grid that solves the planes (5 mm): smaller copper is no plane to it … */
const CELL_MM2 = 25;
/** … but on a small board a plane may be smaller than a cell. */
const BOARD_SHARE = 0.02;

/** Overlapping planes and negative shapes multiply. */
const MOST_CUTS = 1_000_000;

export interface PlaneContext {
  readonly document: Ipc2581Document;
  readonly step: Step;
  readonly frame: BoardFrame;
  readonly flattener: Flattener;
  readonly findings: Findings;
  /** Area of the outline; 0 when the file has none. */
  readonly boardMm2: number;
  /** Openings of the board itself. */
  readonly boardCutouts: readonly Path[];
}

/**
 * Planes of the board: every filled area with a net of at least 25 mm² or 2 % of the board (whichever is less),
 * cutouts off, that is no teardrop, thermal relief, text or thieving; and one plane over the whole outline for every
 * negative copper layer. Contours stay as drawn, slits included; what is drawn negative later becomes a cutout.
 */
export function buildPlanes(context: PlaneContext, copper: Copper): FilePlane[] {
  return [...positivePlanes(context, copper), ...negativePlanes(context, copper)];
}

function positivePlanes(context: PlaneContext, copper: Copper): FilePlane[] {
  const { frame, flattener, findings, boardMm2 } = context;
  const leastMm2 = boardMm2 > 0 ? Math.min(CELL_MM2, BOARD_SHARE * boardMm2) : CELL_MM2;
  const cuts = drawnCuts(context, copper);
  const planes: FilePlane[] = [];
  let small = 0;
  let cutCount = 0;
  for (const area of copper.areas) {
    const pointsMm = frame.ring(flattener.exact(area.ring));
    if (pointsMm === undefined) continue;
    const cutoutsMm = rings(
      area.cutouts.map((cutout) => flattener.exact(cutout)),
      frame,
    );
    if (ringAreaMm2(pointsMm) - cutoutsMm.reduce((sum, ring) => sum + ringAreaMm2(ring), 0) < leastMm2) {
      small++;
      continue;
    }
    const box = boxOf(pointsMm)!;
    for (const cut of cuts.get(area.layer) ?? []) {
      if (cut.order < area.order || !doBoxesMeet(cut.box, box)) continue;
      if (++cutCount > MOST_CUTS) throw new ContentError(`cuts more than ${MOST_CUTS} negative shapes out of planes`);
      cutoutsMm.push(cut.ring);
    }
    planes.push(filePlane(area.layer, area.net, pointsMm, cutoutsMm));
  }
  const rule = `smaller than ${Math.round(leastMm2 * 10) / 10} mm²`;
  findings.add('small-areas', small, `${small} copper areas with a net are ${rule}: they count as pads, not as planes`);
  findings.add('negative-sets', cutCount, `${cutCount} shapes drawn negative are cut out of the planes below them`);
  return planes;
}

interface Cut {
  readonly order: number;
  readonly ring: PointMm[];
  readonly box: BoxMm;
}

/** What is drawn negative on positive layers, by layer. */
function drawnCuts({ document, frame, flattener }: PlaneContext, copper: Copper): Map<string, Cut[]> {
  const byLayer = new Map<string, Cut[]>();
  for (const taken of copper.voids) {
    if (taken.isThermal || document.layers.get(taken.layer)?.isNegative) continue;
    const cuts = byLayer.get(taken.layer) ?? [];
    byLayer.set(taken.layer, cuts);
    for (const ring of rings(voidRings(taken, flattener), frame))
      cuts.push({ order: taken.order, ring, box: boxOf(ring)! });
  }
  return byLayer;
}

function negativePlanes(context: PlaneContext, copper: Copper): FilePlane[] {
  const { document, step, frame, flattener, findings } = context;
  const guessed: string[] = [];
  const unknown: string[] = [];
  const planes: FilePlane[] = [];
  for (const { name: layer, layerFunction, isNegative } of document.layers.values()) {
    // Without a LayerFeature the layer was not exported: no reason to invent a plane.
    if (!isNegative || !isCopperFunction(layerFunction) || !step.featureCounts.has(layer)) continue;
    const voids = copper.voids.filter((taken) => taken.layer === layer);
    const thermalNets = voids.flatMap(({ isThermal, net }) => (isThermal && net !== undefined ? [net] : []));
    const net = guessPlaneNet(layer, thermalNets, new Set([...step.netNames, ...step.logicalNets]));
    if (net === undefined) unknown.push(layer);
    else guessed.push(`${layer} as ${net}`);
    const cutting = voids.filter(({ isThermal }) => !isThermal);
    const drawn = [...cutting.flatMap((taken) => voidRings(taken, flattener)), ...openings(context)];
    planes.push(filePlane(layer, net ?? `unknown net (${layer})`, undefined, rings(drawn, frame)));
  }
  findings.add(
    'negative-plane-net-guessed',
    guessed.length,
    `negative planes name no net; imported over the whole outline with a guessed net: ${nameList(guessed)}`,
  );
  findings.add(
    'negative-plane-net-unknown',
    unknown.length,
    `negative planes name no net, and nothing tells which it is: ${nameList(unknown)}; edit the planes' nets`,
  );
  return planes;
}

const openings = ({ boardCutouts, flattener }: PlaneContext): PointMm[][] =>
  boardCutouts.map((cutout) => flattener.exact(cutout));

function filePlane(layer: string, net: string, pointsMm: PointMm[] | undefined, cutoutsMm: PointMm[][]): FilePlane {
  return {
    layer,
    net,
    ...(pointsMm === undefined ? {} : { pointsMm }),
    ...(cutoutsMm.length === 0 ? {} : { cutoutsMm }),
  };
}

/** Rings in board coordinates; those that collapse to a line are left out. */
const rings = (drawn: readonly PointMm[][], frame: BoardFrame): PointMm[][] =>
  drawn.map((points) => frame.ring(points)).filter((ring) => ring !== undefined);

const doBoxesMeet = (a: BoxMm, b: BoxMm): boolean =>
  a.minX <= b.maxX && b.minX <= a.maxX && a.minY <= b.maxY && b.minY <= a.maxY;
