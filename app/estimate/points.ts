import type { LimitSet } from '../limits/choose.ts';
import { bandwidthHz, combineInBandwidth } from '../receiver/combine.ts';
import { peakFieldToDbuvPerM, rmsFieldToDbuvPerM } from '../units/convert.ts';
import type { LineLevel } from './line-level.ts';
import type { ResultPoint } from './result.ts';

export interface JudgedPoints {
  /** Worst margin first, ties by frequency. */
  readonly points: readonly ResultPoint[];
  /** Frequencies that share the receiver's bandwidth with others. */
  readonly sharedHz: readonly number[];
}

/** Reads every line like the receiver and holds it against each limit line that covers its frequency. */
export function judge(levels: readonly LineLevel[], limits: LimitSet): JudgedPoints {
  const points: ResultPoint[] = [];
  const sharedHz: number[] = [];
  const fields = levels.map(({ frequencyHz, fieldVPerM }) => ({
    frequencyHz,
    fieldRmsVPerM: fieldVPerM / Math.SQRT2,
  }));
  let first = 0;
  for (const level of levels) {
    const { frequencyHz } = level;
    const judged = limits.limitsAt(frequencyHz);
    if (judged.length === 0) continue;
    const halfHz = bandwidthHz(frequencyHz) / 2;
    while (fields[first]!.frequencyHz < frequencyHz - halfHz) first++;
    let end = first;
    while (end < fields.length && fields[end]!.frequencyHz <= frequencyHz + halfHz) end++;
    const reading = combineInBandwidth(fields.slice(first, end), frequencyHz);
    if (reading.count > 1) sharedHz.push(frequencyHz);
    for (const { detector, limitDbuvPerM } of judged) {
      const levelDbuvPerM = rmsFieldToDbuvPerM(detector === 'average' ? reading.averageRms : reading.peakRms);
      points.push({
        frequencyHz,
        detector,
        levelDbuvPerM,
        limitDbuvPerM,
        marginDb: limitDbuvPerM - levelDbuvPerM,
        polarization: level.polarization,
        antennaHeightM: level.antennaHeightM,
        turntableDeg: level.turntableDeg,
        horizontalDbuvPerM: peakFieldToDbuvPerM(level.horizontalVPerM),
        verticalDbuvPerM: peakFieldToDbuvPerM(level.verticalVPerM),
        upperBoundDbuvPerM: peakFieldToDbuvPerM(level.upperBoundVPerM),
        contributors: level.contributors,
      });
    }
  }
  points.sort((one, other) => one.marginDb - other.marginDb || one.frequencyHz - other.frequencyHz);
  return { points, sharedHz };
}
