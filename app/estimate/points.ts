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

/**
 * Reads every line like the receiver and holds it against each limit line that covers its frequency. The board's lines in
 * the bandwidth combine (`combineInBandwidth`); a stated cable current is what a receiver saw of the cable in one
 * bandwidth, so it is added once, as a power.
 */
export function judge(levels: readonly LineLevel[], limits: LimitSet): JudgedPoints {
  const points: ResultPoint[] = [];
  const sharedHz: number[] = [];
  const fields = levels.map((level) => ({
    frequencyHz: level.frequencyHz,
    fieldRmsVPerM: ownFieldVPerM(level) / Math.SQRT2,
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
    const boardLines = fields.slice(first, end).filter(({ fieldRmsVPerM }) => fieldRmsVPerM > 0);
    const reading = combineInBandwidth(boardLines, frequencyHz);
    const cablesRmsVPerM = level.statedCablesVPerM / Math.SQRT2;
    const upperBoundVPerM = levels
      .slice(first, end)
      .reduce((sum, line) => sum + line.upperBoundVPerM - line.statedCablesVPerM, level.statedCablesVPerM);
    if (reading.count > 1) sharedHz.push(frequencyHz);
    for (const { detector, limitDbuvPerM } of judged) {
      const linesRmsVPerM = detector === 'average' ? reading.averageRms : reading.peakRms;
      const readRmsVPerM = cablesRmsVPerM === 0 ? linesRmsVPerM : Math.hypot(linesRmsVPerM, cablesRmsVPerM);
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

/** What is left below this part of the power is rounding: nothing but the cables. */
const ROUNDING = 1e-12;

/** Field of a line without the stated cables, which add as powers. Peak phasor, V/m. */
function ownFieldVPerM({ fieldVPerM, statedCablesVPerM }: LineLevel): number {
  if (statedCablesVPerM === 0) return fieldVPerM;
  const power = fieldVPerM ** 2 - statedCablesVPerM ** 2;
  return power > ROUNDING * fieldVPerM ** 2 ? Math.sqrt(power) : 0;
}
