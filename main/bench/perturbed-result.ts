import type { EstimateResult, ResultPoint } from '../../app/estimate/result.ts';

/**
 * A result as another estimate of a like board would have it: every level, angle, height and current is another number; what
 * follows from other numbers (margin, level of the stronger polarisation, order) still does.
 */
export function perturbedResult(result: EstimateResult, random: () => number): EstimateResult {
  const points = result.points
    .map((point) => perturbedPoint(point, random))
    .sort((one, other) => one.marginDb - other.marginDb || one.frequencyHz - other.frequencyHz);
  const [first] = points;
  return {
    ...result,
    points,
    worst: first ? { frequencyHz: first.frequencyHz, marginDb: first.marginDb } : null,
    ...(result.currentMaps && {
      currentMaps: result.currentMaps.map((map) => ({
        ...map,
        cells: map.cells.map(({ atM, densityRmsAPerM }) => ({
          atM,
          densityRmsAPerM: densityRmsAPerM * (1 + random()),
        })),
        cables: map.cables.map((cable) => ({
          ...cable,
          currentRmsA: cable.currentRmsA.map((currentA) => currentA * (1 + random())),
        })),
      })),
    }),
  };
}

function perturbedPoint(point: ResultPoint, random: () => number): ResultPoint {
  // More than 32 random bits: all of a number's bits change.
  const shiftDb = 6 * (random() + random() / 2 ** 30) - 3;
  const [horizontalDbuvPerM, verticalDbuvPerM] = [point.horizontalDbuvPerM, point.verticalDbuvPerM].map(
    (levelDb) => levelDb + shiftDb,
  ) as [number, number];
  const levelDbuvPerM = Math.max(horizontalDbuvPerM, verticalDbuvPerM);
  return {
    ...point,
    levelDbuvPerM,
    marginDb: point.limitDbuvPerM - levelDbuvPerM,
    horizontalDbuvPerM,
    verticalDbuvPerM,
    upperBoundDbuvPerM: point.upperBoundDbuvPerM + shiftDb,
    antennaHeightM: point.antennaHeightM > 1 ? 1 + (point.antennaHeightM - 1) * (1 - random() / 2) : 1,
    turntableDeg: (point.turntableDeg + 10 * random()) % 360,
    contributors: point.contributors.map((contributor) => ({
      ...contributor,
      levelDbuvPerM: contributor.levelDbuvPerM + shiftDb,
      viaDbuvPerM: Object.fromEntries(
        Object.entries(contributor.viaDbuvPerM).map(([via, levelDb]) => [via, levelDb + shiftDb + random() / 2 ** 10]),
      ),
    })),
  };
}
