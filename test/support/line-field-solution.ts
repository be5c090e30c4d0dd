import type { CoplanarStrips, CrossSection, Microstrip, Stripline } from '../../app/lines/cross-section.ts';
import type { CoupledSection } from '../../app/lines/edge-coupled-pair.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { type Conductor, chargesPerLength, type StaticProblem } from './static-field-solver.ts';

/** Cross-sections of lines as problems for the field solver; copper of finite thickness only. */

type Point = readonly [x: number, y: number];
type Shape = Omit<StaticProblem, 'panels'>;

export interface FieldSolution {
  readonly z0Ohm: number;
  readonly epsilonEff: number;
  readonly airOhm: number;
}

/** Lower corner at (x, y), counter-clockwise. */
const bar = (x: number, y: number, width: number, thickness: number, voltage: number): Conductor => ({
  corners: [
    [x, y],
    [x + width, y],
    [x + width, y + thickness],
    [x, y + thickness],
  ],
  voltage,
});

/** How a cover lies on the trace: following its shape at the same thickness, or filled up level above it. */
export type CoverShape = 'conformal' | 'level';

export function solveLine(section: CrossSection, panels: number, cover: CoverShape = 'conformal'): FieldSolution {
  switch (section.kind) {
    case 'microstrip':
      return solve(microstripShape(section, cover), panels);
    case 'stripline':
      return solve(striplineShape(section), panels);
    case 'coplanar-strips':
      return solve(coplanarShape(section), panels);
  }
}

/** One trace of a pair to the plane: both at 1 V (even) or at ±1 V (odd). */
export function solvePair(section: CoupledSection, mode: 'even' | 'odd', panels: number): FieldSolution {
  const other = mode === 'even' ? 1 : -1;
  return solve(
    section.kind === 'microstrip' ? pairOnSubstrate(section, other) : pairBetweenPlanes(section, other),
    panels,
  );
}

/** Z = 1/(c √(C C_air)) from the charge of the first conductor, 1 V above its return. */
function solve(shape: Shape, panels: number): FieldSolution {
  const air = chargesPerLength({ ...shape, interfaces: [], epsilonAt: () => 1, panels })[0]!;
  const filled =
    shape.interfaces.length === 0 ? air * shape.epsilonAt(0, 0) : chargesPerLength({ ...shape, panels })[0]!;
  return {
    z0Ohm: 1 / (SPEED_OF_LIGHT_M_PER_S * Math.sqrt(air * filled)),
    epsilonEff: filled / air,
    airOhm: 1 / (SPEED_OF_LIGHT_M_PER_S * air),
  };
}

function microstripShape(
  { widthM: w, thicknessM: t, heightM: h, epsilonR, cover }: Microstrip,
  shape: CoverShape,
): Shape {
  const far = w + 40 * h;
  const d = cover?.thicknessM ?? 0;
  const coverEpsilon = d > 0 && cover ? cover.epsilonR : 1;
  const foot = shape === 'conformal' ? h + d : h + t + d;
  const top = h + t + d;
  const isCover = (x: number, y: number) => y < foot || (y < top && Math.abs(x) < w / 2 + d);
  const interfaces: Point[][] = [];
  if (coverEpsilon !== epsilonR) interfaces.push(...sides(far, w / 2, h));
  if (coverEpsilon !== 1)
    interfaces.push(shape === 'conformal' ? step(far, w / 2 + d, foot, top) : across(far, w / 2, top));
  return {
    conductors: [bar(-w / 2, h, w, t, 1)],
    interfaces,
    epsilonAt: (x, y) => (y < h ? epsilonR : isCover(x, y) ? coverEpsilon : 1),
    hasGround: true,
  };
}

function striplineShape({ widthM: w, thicknessM: t, heightAboveM, heightBelowM, epsilonR }: Stripline): Shape {
  const trace = bar(-w / 2, heightBelowM, w, t, 1);
  return {
    conductors: [trace, upperPlane(heightAboveM + heightBelowM + t, [-w / 2, w / 2])],
    interfaces: [],
    epsilonAt: () => epsilonR,
    hasGround: true,
  };
}

function coplanarShape(section: CoplanarStrips): Shape {
  const { widthM: w, thicknessM: t, centreDistanceM: distance, substrateM: h, epsilonR } = section;
  const far = distance / 2 + w + 30 * Math.max(h, distance + w);
  const edges = [(distance - w) / 2, (distance + w) / 2] as const;
  const surface: Point[][] = [...sides(far, edges[1], 0), pointsAt([-edges[0], edges[0]], 0)];
  return {
    conductors: [bar(edges[0], 0, w, t, 0.5), bar(-edges[1], 0, w, t, -0.5)],
    interfaces: epsilonR === 1 || h === 0 ? [] : [...surface, pointsAt([-far, -distance, 0, distance, far], -h)],
    epsilonAt: (_, y) => (y < 0 && y > -h ? epsilonR : 1),
    hasGround: false,
  };
}

function pairOnSubstrate(
  { widthM: w, thicknessM: t, heightM: h, gapM, epsilonR }: CoupledSection,
  other: number,
): Shape {
  const a = gapM / 2;
  return {
    conductors: [bar(a, h, w, t, 1), bar(-a - w, h, w, t, other)],
    interfaces: epsilonR === 1 ? [] : [...sides(2 * w + gapM + 40 * h, a + w, h), pointsAt([-a, a], h)],
    epsilonAt: (_, y) => (y < h ? epsilonR : 1),
    hasGround: true,
  };
}

function pairBetweenPlanes(
  { widthM: w, thicknessM: t, heightM: h, gapM, epsilonR }: CoupledSection,
  other: number,
): Shape {
  const a = gapM / 2;
  return {
    conductors: [bar(a, h, w, t, 1), bar(-a - w, h, w, t, other), upperPlane(2 * h + t, [-a - w, -a, a, a + w])],
    interfaces: [],
    epsilonAt: () => epsilonR,
    hasGround: true,
  };
}

/** Plane at potential 0 over the traces' edges and six spacings beyond. */
function upperPlane(y: number, edges: readonly number[]): Conductor {
  const first = edges[0]!;
  const last = edges.at(-1)!;
  return {
    corners: pointsAt([last + 6 * y, last + y, ...[...edges].reverse(), first - y, first - 6 * y], y),
    voltage: 0,
    isSheet: true,
  };
}

const pointsAt = (xs: readonly number[], y: number): Point[] => xs.map((x) => [x, y]);
const across = (far: number, half: number, y: number): Point[] => pointsAt([-far, -half, half, far], y);
const sides = (far: number, half: number, y: number): Point[][] => [
  pointsAt([-far, -half], y),
  pointsAt([half, far], y),
];
const step = (far: number, half: number, foot: number, top: number): Point[] => [
  [-far, foot],
  [-half, foot],
  [-half, top],
  [half, top],
  [half, foot],
  [far, foot],
];
