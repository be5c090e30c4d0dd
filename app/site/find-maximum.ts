import type { PowerMap } from './power-map.ts';
import { chebyshevWeights, trigonometricWeights } from './sampling.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from './site.ts';

export interface ScanMaximum {
  /** Peak phasor squared, V²/m². */
  readonly power: number;
  readonly angleRad: number;
  readonly heightM: number;
}

/** Grid maxima within this factor of the best are refined (0.5 dB: far more than a grid step can hide). */
const REFINE_FACTOR = 10 ** -0.05;
const MAX_CANDIDATES = 12;
/** The refinement ends at this fraction of a grid step. */
const FINEST_STEP = 1 / 512;

/**
 * Maximum of a power map over all angles and the antenna's travel: a grid of at least eight samples an angular period
 * and 16 a wavelength in height (never coarser than 5° and 10 cm), then every grid maximum near the best is refined to
 * below 0.01° and 0.2 mm on the exact interpolant. Ties go to the lower height, then to the smaller angle.
 */
export function findMaximum(map: PowerMap): ScanMaximum {
  const { order, plan } = map;
  const nodeCount = 2 * order + 1;
  const angleCount = Math.max(72, 8 * order);
  const wavelengthM = (2 * Math.PI) / plan.kPerM;
  const stepM = Math.min(0.1, wavelengthM / 16, 1 / map.heightsM.length);
  const heightCount = Math.ceil((ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M) / stepM) + 1;
  const stepHeightM = (ANTENNA_HIGHEST_M - ANTENNA_LOWEST_M) / (heightCount - 1);
  const stepAngleRad = (2 * Math.PI) / angleCount;
  const angleWeights = angleTable(order, angleCount);

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
    if (refined.power > best.power * (1 + 1e-9)) best = refined;
  }
  return best;
}

/** Grid indices that are not below their neighbours and near the best, in order of height, then angle. */
function candidates(grid: Float64Array, heightCount: number, angleCount: number): number[] {
  let highest = 0;
  for (const power of grid) highest = Math.max(highest, power);
  const found: number[] = [];
  for (let h = 0; h < heightCount; h++) {
    for (let a = 0; a < angleCount; a++) {
      const here = grid[h * angleCount + a]!;
      if (here < highest * REFINE_FACTOR) continue;
      const left = grid[h * angleCount + ((a + angleCount - 1) % angleCount)]!;
      const right = grid[h * angleCount + ((a + 1) % angleCount)]!;
      const below = h > 0 ? grid[(h - 1) * angleCount + a]! : -Infinity;
      const above = h < heightCount - 1 ? grid[(h + 1) * angleCount + a]! : -Infinity;
      if (here >= left && here >= right && here >= below && here >= above) found.push(h * angleCount + a);
    }
  }
  if (found.length <= MAX_CANDIDATES) return found.length > 0 ? found : [0];
  return found
    .sort((one, other) => grid[other]! - grid[one]! || one - other)
    .slice(0, MAX_CANDIDATES)
    .sort((one, other) => one - other);
}

/** Climbs by a compass search whose steps halve (T. G. Kolda et al., SIAM Review 45(3), 2003). */
function refine(
  map: PowerMap,
  angleRad: number,
  heightM: number,
  stepAngleRad: number,
  stepHeightM: number,
): ScanMaximum {
  let angle = angleRad;
  let height = heightM;
  let power = map.powerAt(angle, height);
  for (let step = 0.5; step >= FINEST_STEP; ) {
    let isBetter = false;
    for (const [da, dh] of DIRECTIONS) {
      const nextAngle = angle + da * step * stepAngleRad;
      const nextHeight = Math.min(ANTENNA_HIGHEST_M, Math.max(ANTENNA_LOWEST_M, height + dh * step * stepHeightM));
      const next = map.powerAt(nextAngle, nextHeight);
      if (next > power * (1 + 1e-13)) {
        power = next;
        angle = nextAngle;
        height = nextHeight;
        isBetter = true;
        break;
      }
    }
    if (!isBetter) step /= 2;
  }
  const turn = 2 * Math.PI;
  return { power, angleRad: ((angle % turn) + turn) % turn, heightM: height };
}

const DIRECTIONS = [
  [1, 0],
  [-1, 0],
  [0, 1],
  [0, -1],
] as const;

const angleTables = new Map<string, Float64Array>();

/** Interpolation weights from 2·order + 1 angles to `angleCount` angles. */
function angleTable(order: number, angleCount: number): Float64Array {
  const key = `${order} ${angleCount}`;
  let table = angleTables.get(key);
  if (!table) {
    const nodeCount = 2 * order + 1;
    table = new Float64Array(angleCount * nodeCount);
    for (let a = 0; a < angleCount; a++) {
      trigonometricWeights(order, (2 * Math.PI * a) / angleCount, table, a * nodeCount);
    }
    angleTables.set(key, table);
  }
  return table;
}
