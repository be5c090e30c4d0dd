import { hzToMhz } from '../units/convert.ts';
import { type LimitLine, rangeOf } from './limit-line.ts';

/** A limit line moved to another distance, and the words for it. */
export interface ConvertedLine {
  readonly line: LimitLine;
  readonly changeDb: number;
  readonly rule: string;
}

const isDistance = (distanceM: number, wantedM: number): boolean => Math.abs(distanceM - wantedM) <= 1e-6 * wantedM;

/** Was the line written for this distance? */
export const isAtDistance = (line: LimitLine, distanceM: number): boolean => isDistance(line.distanceM, distanceM);

/**
 * Moves a limit line to another distance. CISPR lines below 1 GHz step by exactly 10 dB between 3 m and 10 m (their
 * tables); everything else falls by 20 dB per decade of distance, 10.458 dB from 3 m to 10 m (47 CFR 15.31(f)(1)).
 * A convention, not physics: over a ground plane the maximum of the field does not fall like that.
 */
export function convertLine(line: LimitLine, distanceM: number): ConvertedLine {
  const step = line.threeToTenMetresDb;
  const isThreeAndTen = (a: number, b: number) => isDistance(a, 3) && isDistance(b, 10);
  const hasOwnStep =
    step !== undefined && (isThreeAndTen(line.distanceM, distanceM) || isThreeAndTen(distanceM, line.distanceM));
  const changeDb = hasOwnStep
    ? Math.sign(line.distanceM - distanceM) * step
    : 20 * Math.log10(line.distanceM / distanceM);
  return {
    line: {
      ...line,
      distanceM,
      points: line.points.map(([frequencyHz, limitDbuvPerM]) => [frequencyHz, limitDbuvPerM + changeDb] as const),
    },
    changeDb,
    rule: hasOwnStep ? `${step} dB between 3 m and 10 m, the standard's own step` : '20 dB per decade of distance',
  };
}

/** "quasi-peak 30–1000 MHz". */
export function rangeText(line: LimitLine): string {
  const [fromHz, toHz] = rangeOf(line);
  const mhz = (frequencyHz: number) => Number(hzToMhz(frequencyHz).toPrecision(9));
  return `${line.detector} ${mhz(fromHz)}–${mhz(toHz)} MHz`;
}

/** What was converted, for the result; undefined when nothing was. */
export function conversionText(
  converted: readonly (ConvertedLine & { readonly fromM: number })[],
  toM: number,
): string | undefined {
  if (converted.length === 0) return undefined;
  const parts = new Map<string, string[]>();
  for (const { line, changeDb, rule, fromM } of converted) {
    const sign = changeDb < 0 ? '−' : '+';
    const key = `from ${fromM} m to ${toM} m by ${rule} (${sign}${Math.abs(changeDb).toFixed(2)} dB)`;
    parts.set(key, [...(parts.get(key) ?? []), rangeText(line)]);
  }
  return `limits converted ${[...parts].map(([how, what]) => `${how}: ${what.join(', ')}`).join('; ')}; a convention, not physics`;
}
