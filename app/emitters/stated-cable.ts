import type { Cable, Point3M } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { type SiteFrame, type SiteKind, TABLE_HEIGHT_M, toSitePoint } from '../site/site.ts';
import { ETA0_OHM, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { elementsAlong, type StraightElements } from './straight-elements.ts';

/** The last point of a grounded cable must be this close to the site's ground, m. */
const GROUND_TOLERANCE_M = 1e-3;
/** Legs that rise less than this per length count as level. */
const LEVEL_SLOPE = 1e-6;
/** A wire that lies on the ground is no wire over it: 60 Ω. */
const LEAST_LOGARITHM = 1;

/** A cable whose common-mode current is stated (measured by a clamp, or assumed). */
export interface StatedCable {
  readonly name: string;
  readonly along: StraightElements;
  readonly table: NonNullable<Cable['commonModeRms']>;
  /** Reflection of the wave's voltage at the far end: 1 open, −1 grounded. */
  readonly farReflection: number;
}

/** Throws `input` for points below the ground plane, and for an end joined to a ground that is not there. */
export function buildStatedCable(cable: Cable, frame: SiteFrame, site: SiteKind, maxHz: number): StatedCable {
  const sitePoints = cable.pointsM.map((point) => toSitePoint(frame, point));
  const endZM = sitePoints.at(-1)![2];
  if (site === 'ground-plane') {
    const lowest = Math.min(...sitePoints.map(([, , z]) => z));
    if (lowest < -GROUND_TOLERANCE_M) {
      throw inputError(
        `cable ${cable.name}`,
        'above the ground plane',
        `a point ${(-lowest * 1e3).toFixed(1)} mm below it`,
      );
    }
  }
  if (cable.farEnd !== 'open') {
    if (site !== 'ground-plane') {
      const received = cable.farEnd === 'ground' ? 'ground' : `a resistance of ${cable.farEnd.resistanceOhm} Ω to it`;
      throw inputError(`cable ${cable.name}: farEnd`, 'open in free space, where there is no ground to join', received);
    }
    if (Math.abs(endZM) > GROUND_TOLERANCE_M) {
      throw inputError(
        `cable ${cable.name}: last point`,
        `within 1 mm of the ground plane (z = −${TABLE_HEIGHT_M * 1e3} mm on a board lying flat)`,
        `${(endZM * 1e3).toFixed(1)} mm above it`,
      );
    }
  }
  const along = elementsAlong(frame, cable.pointsM, maxHz);
  return {
    name: cable.name,
    along,
    table: cable.commonModeRms ?? [],
    farReflection: farReflection(cable, sitePoints),
  };
}

/** Reflection of the wave's voltage at the far end, Γ = (R − Z)/(R + Z), Z the mean impedance of the wire over ground. */
function farReflection({ farEnd, radiusM }: Cable, sitePoints: readonly Point3M[]): number {
  if (farEnd === 'open') return 1;
  if (farEnd === 'ground') return -1;
  const waveOhm = meanWaveOhm(sitePoints, radiusM);
  return (farEnd.resistanceOhm - waveOhm) / (farEnd.resistanceOhm + waveOhm);
}

/**
 * Mean over the cable of Z = (η0/2π) ln(2z/a), z the height over ground, a the radius; per straight leg in closed form,
 * since ∫ ln(2z/a) dz = z (ln(2z/a) − 1). A vertical wire on the ground has 60 Ω·(ln(2h/a) − 1) so.
 * Source: the mean characteristic impedance of antennas, S. A. Schelkunoff, Electromagnetic Waves, chapter 11.
 */
function meanWaveOhm(sitePoints: readonly Point3M[], radiusM: number): number {
  const integral = (zM: number) => (zM > 0 ? zM * (Math.log((2 * zM) / radiusM) - 1) : 0);
  let sum = 0;
  let lengthM = 0;
  for (let leg = 1; leg < sitePoints.length; leg++) {
    const [x1, y1, z1] = sitePoints[leg - 1]!;
    const [x2, y2, z2] = sitePoints[leg]!;
    const legM = Math.hypot(x2 - x1, y2 - y1, z2 - z1);
    const riseM = z2 - z1;
    const isLevel = Math.abs(riseM) < LEVEL_SLOPE * legM;
    const mean = isLevel ? Math.log(Math.max(radiusM, z1 + z2) / radiusM) : (integral(z2) - integral(z1)) / riseM;
    sum += legM * mean;
    lengthM += legM;
  }
  return (ETA0_OHM / (2 * Math.PI)) * Math.max(LEAST_LOGARITHM, sum / lengthM);
}

/** Stated current (rms, A) at a frequency, linear over log frequency between the points; 0 outside them. */
export function statedCurrentRmsA(table: StatedCable['table'], frequencyHz: number): number {
  const first = table[0];
  const last = table.at(-1);
  if (!first || !last) return 0;
  const slack = 1 + 1e-9;
  if (frequencyHz < first.frequencyHz / slack || frequencyHz > last.frequencyHz * slack) return 0;
  for (let i = 1; i < table.length; i++) {
    const low = table[i - 1]!;
    const high = table[i]!;
    if (frequencyHz > high.frequencyHz) continue;
    const part = Math.log(frequencyHz / low.frequencyHz) / Math.log(high.frequencyHz / low.frequencyHz);
    return low.currentRmsA + Math.max(0, part) * (high.currentRmsA - low.currentRmsA);
  }
  return last.currentRmsA;
}

/**
 * Standing wave I(s) ∝ e^(jk(L−s)) − Γ e^(−jk(L−s)) along the cable (open: sin k(L−s), grounded: cos k(L−s)), scaled so
 * that its largest magnitude along the cable is the stated current. Peak phasors, A, one per element.
 */
export function statedCableCurrents(cable: StatedCable, frequencyHz: number): Float64Array {
  const { alongM, lengthM } = cable.along;
  const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
  const peakA = Math.SQRT2 * statedCurrentRmsA(cable.table, frequencyHz);
  const shape = (distanceFromEndM: number): [number, number] => {
    const x = kPerM * distanceFromEndM;
    return [(1 - cable.farReflection) * Math.cos(x), (1 + cable.farReflection) * Math.sin(x)];
  };
  const scale = peakA / largestMagnitude(shape, kPerM, lengthM, cable.farReflection);
  const currents = new Float64Array(2 * alongM.length);
  for (let i = 0; i < alongM.length; i++) {
    const [re, im] = shape(lengthM - alongM[i]!);
    currents[2 * i] = scale * re;
    currents[2 * i + 1] = scale * im;
  }
  return currents;
}

/** Largest |shape| on 0…L: at an extremum (every quarter wave from the end) when one lies on the cable, or at an end. */
function largestMagnitude(
  shape: (distanceM: number) => [number, number],
  kPerM: number,
  lengthM: number,
  reflection: number,
): number {
  const extremumM = reflection > 0 ? Math.PI / 2 / kPerM : 0;
  const places = extremumM <= lengthM ? [extremumM, 0, lengthM] : [0, lengthM];
  return Math.max(...places.map((place) => Math.hypot(...shape(place))));
}
