import type { Step } from '../document.ts';
import { type Path, type PointMm, pathVertices } from '../path.ts';
import type { Copper } from './copper.ts';
import type { Findings } from './findings.ts';
import type { Flattener } from './flattener.ts';
import { BoardFrame, boxOf, hasArea, ringAreaMm2, roundMm } from './frame.ts';

export interface Outline {
  /** Undefined when the file draws no usable profile. */
  readonly ringMm: PointMm[] | undefined;
  readonly cutouts: readonly Path[];
  /** Box of the profile's vertices, or of the copper when there is none. */
  readonly sizeMm: readonly [widthMm: number, heightMm: number];
  readonly areaMm2: number;
  readonly frame: BoardFrame;
}

/** The board's outline, moved so that the lower-left corner of its box is the origin. */
export function buildOutline(step: Step, copper: Copper, flattener: Flattener, findings: Findings): Outline {
  const profile = step.profile;
  const points = profile === undefined ? undefined : flattener.exact(profile.ring);
  const isUsable = points !== undefined && hasArea(points);
  const drawn = isUsable ? points : copperPoints(copper);
  const box = boxOf(drawn) ?? { minX: 0, minY: 0, maxX: 0, maxY: 0 };
  const sizeBox = (isUsable ? boxOf(pathVertices(profile!.ring)) : undefined) ?? box;
  const frame = new BoardFrame([box.minX, box.minY]);
  if (!isUsable)
    findings.add('no-outline', 1, 'the file draws no board outline: the box of the copper takes its place');
  const [shiftX, shiftY] = [roundMm(-box.minX), roundMm(-box.minY)];
  findings.add(
    'coordinates-shifted',
    shiftX === 0 && shiftY === 0 ? 0 : 1,
    `coordinates are shifted by (${shiftX}, ${shiftY}) mm: the outline's lower-left corner is the origin`,
  );
  const cutouts = isUsable ? profile!.cutouts : [];
  findings.add(
    'board-cutouts',
    cutouts.length,
    `the board has ${cutouts.length} openings: they are cut out of negative planes; drawn copper leaves them free itself`,
  );
  const ringMm = isUsable ? frame.ring(points) : undefined;
  return {
    ringMm,
    cutouts,
    sizeMm: [roundMm(sizeBox.maxX - sizeBox.minX), roundMm(sizeBox.maxY - sizeBox.minY)],
    areaMm2: ringMm === undefined ? 0 : ringAreaMm2(ringMm),
    frame,
  };
}

const copperPoints = ({ strokes, areas }: Copper): PointMm[] => [
  ...strokes.flatMap(({ path }) => pathVertices(path)),
  ...areas.flatMap(({ ring }) => pathVertices(ring)),
];
