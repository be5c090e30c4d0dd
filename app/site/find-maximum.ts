import type { PowerMap } from './power-map.ts';
import { angleTable } from './resample.ts';
import { chebyshevWeights } from './sampling.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from './site.ts';

export interface ScanMaximum {
  /** Peak phasor squared, V²/m². */
  readonly power: number;
  readonly angleRad: number;
  readonly heightM: number;
}

/** Grid maxima within this factor of the best are refined: 1 dB is what half a grid step can hide at five samples a period. */
const REFINE_FACTOR = 10 ** -0.1;
const MAX_CANDIDATES = 16;
/** Powers closer than this, relative, are equal: rounding does not choose between places that see the same. */
const SAME_POWER = 1e-9;

/**
 * Maximum of a power map over all angles and the antenna's travel: a grid of about five samples a period of what the
 * power really holds (its order has a margin) and eight a wavelength in height, then every grid maximum near the best is refined on the
 * exact interpolant. Ties go to the lower height, then to the smaller angle.
 */
export function findMaximum(map: PowerMap): ScanMaximum {
  const { order, plan } = map;
  const nodeCount = 2 * order + 1;
  const angleCount = Math.max(36, 3 * order);
  const wavelengthM = (2 * Math.PI) / plan.kPerM;
  const stepM = Math.min(0.15, wavelengthM / 8);
  const heightCount = Math.ceil((ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M) / stepM) + 1;
  const stepHeightM = (ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M) / (heightCount - 1);
  const stepAngleRad = (2 * Math.PI) / angleCount;
  const angleWeights = angleTable(nodeCount, angleCount);

  const grid = new Float64Array(heightCount * angleCount);
  const heightWeights = new Float64Array(map.heightsM.length);
  const row = new Float64Array(nodeCount);
  for (let h = 0; h < heightCount; h++) {
    const heightM = ANTENNA_LOWEST_M + h * stepHeightM;
    chebyshevWeights(map.heightsM, heightM, heightWeights);
    map.rowAt(heightM, heightWeights, 0, row);
    for (let a = 0; a < angleCount; a++) {
      let power = 0;
      for (let i = 0; i < nodeCount; i++) power += angleWeights[a * nodeCount + i]! * row[i]!;
      grid[h * angleCount + a] = power;
    }
  }

  let best: ScanMaximum = { power: -Infinity, angleRad: 0, heightM: ANTENNA_LOWEST_M };
  for (const at of candidates(grid, heightCount, angleCount)) {
    const refined = refine(
      map,
      (at % angleCount) * stepAngleRad,
      ANTENNA_LOWEST_M + Math.floor(at / angleCount) * stepHeightM,
      stepAngleRad,
      stepHeightM,
    );
    if (refined.power > best.power * (1 + SAME_POWER)) best = refined;
  }
  return best;
}

/** Grid indices that are not below their neighbours and near the best, in order of height, then angle. */
function candidates(powers: Float64Array, heightCount: number, angleCount: number): number[] {
  let highest = 0;
  for (const power of powers) highest = Math.max(highest, power);
  if (highest === 0) return [0];
  const grid = powers.map((power) => Math.round(power / (highest * SAME_POWER)));
  const found: number[] = [];
  for (let h = 0; h < heightCount; h++) {
    for (let a = 0; a < angleCount; a++) {
      const here = grid[h * angleCount + a]!;
      if (here < REFINE_FACTOR / SAME_POWER) continue;
      const left = grid[h * angleCount + ((a + angleCount - 1) % angleCount)]!;
      const right = grid[h * angleCount + ((a + 1) % angleCount)]!;
      const below = h > 0 ? grid[(h - 1) * angleCount + a]! : -Infinity;
      const above = h < heightCount - 1 ? grid[(h + 1) * angleCount + a]! : -Infinity;
      if (here >= left && here >= right && here >= below && here >= above) found.push(h * angleCount + a);
    }
  }
  if (found.length <= MAX_CANDIDATES) return found;
  return found
    .sort((one, other) => grid[other]! - grid[one]! || one - other)
    .slice(0, MAX_CANDIDATES)
    .sort((one, other) => one - other);
}

/** Golden-section steps a search takes: the interval shrinks to 0.618²⁴ = 1e-5 of two grid steps. */
const GOLDEN_STEPS = 24;
/** Rounds of angle and height in turn; ends earlier when a round gains nothing. */
const MOST_ROUNDS = 12;
const GAIN = 1e-7;

/** Climbs along the angle and the height in turn, each by golden section around the present place. */
function refine(map: PowerMap, startRad: number, startM: number, stepRad: number, stepM: number): ScanMaximum {
  let angle = startRad;
  let height = startM;
  let power = map.powerAt(angle, height);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const before = power;
    const byAngle = highest(map.alongAngle(height), angle - stepRad, angle + stepRad);
    if (byAngle.value > power * (1 + SAME_POWER)) [angle, power] = [byAngle.at, byAngle.value];
    const low = Math.max(ANTENNA_LOWEST_M, height - stepM);
    const high = Math.min(ANTENNA_HIGHEST_M, height + stepM);
    const byHeight = highest(map.alongHeight(angle), low, high);
    if (byHeight.value > power * (1 + SAME_POWER)) [height, power] = [byHeight.at, byHeight.value];
    if (power <= before * (1 + GAIN)) break;
  }
  const turn = 2 * Math.PI;
  return { power, angleRad: ((angle % turn) + turn) % turn, heightM: height };
}

/** Largest value on an interval with one maximum: golden section, both ends included. */
function highest(value: (at: number) => number, low: number, high: number): { at: number; value: number } {
  const ratio = (Math.sqrt(5) - 1) / 2;
  let from = low;
  let to = high;
  let left = to - ratio * (to - from);
  let right = from + ratio * (to - from);
  let atLeft = value(left);
  let atRight = value(right);
  for (let step = 0; step < GOLDEN_STEPS; step++) {
    if (atLeft >= atRight) {
      to = right;
      right = left;
      atRight = atLeft;
      left = to - ratio * (to - from);
      atLeft = value(left);
    } else {
      from = left;
      left = right;
      atLeft = atRight;
      right = from + ratio * (to - from);
      atRight = value(right);
    }
  }
  let best = { at: left, value: atLeft };
  for (const at of [right, low, high]) {
    const here = value(at);
    if (here > best.value) best = { at, value: here };
  }
  return best;
}
