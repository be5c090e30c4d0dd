import type { Point3M, PointM } from '../board/board.ts';
import type { Orientation } from '../site/site.ts';
import { ETA0_OHM } from '../units/constants.ts';
import { mhzToHz, mmToM } from '../units/convert.ts';

/** A cable of a case, from the plane's edge on; board axes, the plane's lower left corner at the origin, plane at z = 0. */
export interface StructureCable {
  readonly name: string;
  readonly pointsM: readonly Point3M[];
  readonly farEnd: 'open' | 'ground';
}

/**
 * A rectangular plane with one straight round wire over it as the trace, a source with its resistance at one end, a load at
 * the other, with or without a slot and cables. Solved as a wire grid for reference, and estimated as a board.
 */
export interface StructureCase {
  readonly id: string;
  readonly widthM: number;
  readonly heightM: number;
  /** Strips of the wire grid; ends of the trace, slots and joints lie on their centres and borders. */
  readonly pitchM: number;
  /** Into how many the stored values' model cuts each strip. */
  readonly divisions: number;
  /** The model that shows convergence. */
  readonly other: { readonly pitchM?: number; readonly divisions: number };
  readonly traceM: readonly [PointM, PointM];
  readonly traceHeightM: number;
  readonly traceRadiusM: number;
  readonly sourceOhm: number;
  readonly loadOhm: number;
  /** Lower left and upper right corner. */
  readonly slotM?: readonly [PointM, PointM];
  readonly cables: readonly StructureCable[];
  readonly orientation: Orientation;
  readonly frequenciesHz: readonly number[];
  /** Frequencies around a resonance: its place and height are compared, not each level. */
  readonly isResonance?: boolean;
}

export const STRUCTURE_SOURCE_V = 1;
/** From the turntable axis. */
export const STRUCTURE_DISTANCE_M = 3;
export const CABLE_RADIUS_M = 1e-3;

/**
 * Characteristic impedance of a round wire over a plane in air, Ω: (η0/2π)·acosh(h/a), the axis h over the plane.
 * Source: D. M. Pozar, Microwave Engineering, 4th ed., table 2.1 (half of the two-wire line).
 */
export const wireOverPlaneOhm = ({
  traceHeightM,
  traceRadiusM,
}: Pick<StructureCase, 'traceHeightM' | 'traceRadiusM'>): number =>
  (ETA0_OHM / (2 * Math.PI)) * Math.acosh(traceHeightM / traceRadiusM);

const point = (xMm: number, yMm: number): PointM => [mmToM(xMm), mmToM(yMm)];
const point3 = ([xMm, yMm, zMm]: readonly [number, number, number]): Point3M => [mmToM(xMm), mmToM(yMm), mmToM(zMm)];

const cable = (
  name: string,
  farEnd: 'open' | 'ground',
  ...pointsMm: (readonly [number, number, number])[]
): StructureCable => ({ name, pointsM: pointsMm.map(point3), farEnd });

/** To 1 GHz, and where a cable is joined. */
const PLANE_MHZ = [30, 100, 200, 400, 700, 1000];
const CABLE_MHZ = [30, 60, 100, 200, 300, 400];
const atMhz = (frequenciesMhz: readonly number[]): number[] => frequenciesMhz.map(mhzToHz);

/** 100 × 60 mm, a trace of 60 mm and 5 mm height over its middle line. */
const MIDDLE = {
  widthM: mmToM(100),
  heightM: mmToM(60),
  pitchM: mmToM(20) / 3,
  divisions: 2,
  other: { divisions: 3 },
  traceM: [point(50 / 3, 30), point(50 / 3 + 60, 30)],
  traceHeightM: mmToM(5),
  traceRadiusM: mmToM(0.4),
  sourceOhm: 50,
  loadOhm: 220,
  cables: [],
  orientation: 'flat',
  frequenciesHz: atMhz(PLANE_MHZ),
} as const satisfies Omit<StructureCase, 'id'>;

/** 80 × 50 mm, a trace of 55 mm and 3 mm height, 12.5 mm from an edge. */
const OFF_CENTRE = {
  ...MIDDLE,
  widthM: mmToM(80),
  heightM: mmToM(50),
  pitchM: mmToM(5),
  traceM: [point(12.5, 12.5), point(67.5, 12.5)],
  traceHeightM: mmToM(3),
  traceRadiusM: mmToM(0.25),
} as const satisfies Omit<StructureCase, 'id'>;

const WITH_CABLE = { ...MIDDLE, frequenciesHz: atMhz(CABLE_MHZ) } as const;
const OPEN = cable('OPEN', 'open', [100, 30, 0], [1100, 30, 0]);

export const STRUCTURE_CASES: readonly StructureCase[] = [
  { ...MIDDLE, id: 'plane-100x60' },
  { ...OFF_CENTRE, id: 'plane-80x50-50ohm', loadOhm: 50 },
  { ...OFF_CENTRE, id: 'plane-80x50-220ohm' },
  { ...OFF_CENTRE, id: 'plane-80x50-2kohm', loadOhm: 2000 },
  {
    ...MIDDLE,
    id: 'plane-60x40',
    widthM: mmToM(60),
    heightM: mmToM(40),
    pitchM: mmToM(5),
    traceM: [point(12.5, 22.5), point(47.5, 22.5)],
    traceHeightM: mmToM(4),
    traceRadiusM: mmToM(0.3),
    loadOhm: 50,
  },
  {
    ...MIDDLE,
    id: 'plane-160x100',
    widthM: mmToM(160),
    heightM: mmToM(100),
    other: { pitchM: mmToM(4), divisions: 1 },
    traceM: [point(30, 50), point(390 / 3, 50)],
  },
  {
    ...MIDDLE,
    id: 'slot-100x60',
    pitchM: mmToM(5),
    traceM: [point(17.5, 32.5), point(77.5, 32.5)],
    slotM: [point(45, 10), point(50, 50)],
  },
  { ...MIDDLE, id: 'upright-100x60', orientation: 'upright' },
  { ...WITH_CABLE, id: 'cable-open', cables: [OPEN] },
  {
    ...WITH_CABLE,
    id: 'cable-grounded',
    cables: [cable('GROUNDED', 'ground', [100, 30, 0], [300, 30, 0], [300, 30, -800])],
  },
  {
    ...WITH_CABLE,
    id: 'cable-two',
    cables: [OPEN, cable('SECOND', 'open', [0, 50 / 3, 0], [-700, 50 / 3, 0])],
  },
  {
    ...WITH_CABLE,
    id: 'cable-bend',
    cables: [cable('BENT', 'open', [100, 30, 0], [400, 30, 0], [400, 430, 0], [400, 430, -400])],
  },
  {
    ...WITH_CABLE,
    id: 'cable-upright-grounded',
    orientation: 'upright',
    cables: [cable('GROUNDED', 'ground', [100, 30, 0], [300, 30, 0], [300, -800, 0])],
  },
  {
    ...WITH_CABLE,
    id: 'cable-open-resonance',
    cables: [OPEN],
    isResonance: true,
    frequenciesHz: atMhz([110, 113, 116, 119, 122, 125, 128]),
  },
];

/** Maxima over height and angle, and along each cable (in the case's order), peak phasors. */
export interface StructureMaximum {
  readonly caseId: string;
  readonly frequencyHz: number;
  readonly horizontalVPerM: number;
  readonly verticalVPerM: number;
  readonly cableCurrentsA: readonly number[];
}
