import type { LimitSet } from '../limits/choose.ts';
import { bandwidthHz, combineInBandwidth } from '../receiver/combine.ts';
import { peakFieldToDbuvPerM, rmsFieldToDbuvPerM } from '../units/convert.ts';
import { finiteLevelDbuvPerM } from './finite-level.ts';
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
    // The bandwidth widens at 1 GHz: the window's start may move back.
    while (first > 0 && fields[first - 1]!.frequencyHz >= frequencyHz - halfHz) first--;
    while (fields[first]!.frequencyHz < frequencyHz - halfHz) first++;
    let end = first;
    while (end < fields.length && fields[end]!.frequencyHz <= frequencyHz + halfHz) end++;
    const reading = combineInBandwidth(fields.slice(first, end), frequencyHz);
    const upperBoundVPerM = levels.slice(first, end).reduce((sum, line) => sum + line.upperBoundVPerM, 0);
    if (reading.count > 1) sharedHz.push(frequencyHz);
    for (const { detector, limitDbuvPerM } of judged) {
      const readRmsVPerM = detector === 'average' ? reading.averageRms : reading.peakRms;
      const levelDbuvPerM = finiteLevelDbuvPerM(rmsFieldToDbuvPerM(readRmsVPerM));
      points.push({
        frequencyHz,
        detector,
        levelDbuvPerM,
        limitDbuvPerM,
        marginDb: limitDbuvPerM - levelDbuvPerM,
        polarization: level.polarization,
        antennaHeightM: level.antennaHeightM,
        turntableDeg: level.turntableDeg,
        horizontalDbuvPerM: finiteLevelDbuvPerM(peakFieldToDbuvPerM(level.horizontalVPerM)),
        verticalDbuvPerM: finiteLevelDbuvPerM(peakFieldToDbuvPerM(level.verticalVPerM)),
        upperBoundDbuvPerM: finiteLevelDbuvPerM(peakFieldToDbuvPerM(upperBoundVPerM)),
        contributors: level.contributors,
      });
    }
  }
  points.sort((one, other) => one.marginDb - other.marginDb || one.frequencyHz - other.frequencyHz);
  return { points, sharedHz };
}
