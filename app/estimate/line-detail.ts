import type { LineDetail } from '../contract/line-detail.ts';
import { AppError, inputError } from '../errors.ts';
import type { Radiator } from '../fields/element-set.ts';
import type { Component } from '../site/power-map.ts';
import { fieldsAtAntenna } from '../site/scan.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M } from '../site/site.ts';
import { degToRad, peakFieldToDbuvPerM } from '../units/convert.ts';
import { currentMaps } from './current-maps.ts';
import type { EstimateHooks } from './estimate-request.ts';
import { finiteLevelDbuvPerM } from './finite-level.ts';
import { pieceFields } from './line-detail-pieces.ts';
import { type AntennaPlace, lineLevel, radiatorsByDomain, scanRequestAt } from './line-level.ts';
import type { EstimatePlan } from './plan.ts';
import { radiatingParts } from './radiating-parts.ts';
import type { FrequencyLines } from './spectrum-table.ts';
import { StructureResponder } from './structure-responder.ts';

/** Step of the turntable pattern, degrees, and of the height pattern, m. */
const STEP_DEG = 2;
const STEP_M = 0.05;
/** The weaker pieces beyond so many are not listed. */
const MOST_LISTED = 5000;
/** A line is asked for by its frequency, which may have been written and read. */
const SAME_FREQUENCY = 1e-9;

/**
 * One spectral line looked at closely: patterns through its maximum, what every piece of every net radiates, and the currents
 * of planes and cables. Planes and cables are solved at this very frequency; an estimate that interpolates them over many
 * lines may differ by its interpolation error (0.1 dB). The patterns hold the maximum's own angle and height beside their steps.
 *
 * Throws `input` when the estimate has no radiating line there, `cancelled` on stop.
 */
export function lineDetail(plan: EstimatePlan, frequencyHz: number, hooks: EstimateHooks = {}): LineDetail {
  const { scene } = plan;
  const lines = plan.table.find((row) => Math.abs(row.frequencyHz / frequencyHz - 1) <= SAME_FREQUENCY);
  if (!lines) throw inputError('frequencyHz', 'one of the estimate’s lines', frequencyHz);
  const throwIfStopped = () => {
    if (hooks.stop?.()) throw new AppError('cancelled', 'stopped by the user');
  };
  const responder = scene.structure
    ? new StructureResponder(scene, scene.structure, [lines.frequencyHz], throwIfStopped)
    : null;
  const level = lineLevel(scene, lines, responder);
  if (!level) throw inputError('frequencyHz', 'a line at which something radiates', frequencyHz);
  const parts = radiatingParts(scene, lines);
  const answer = responder?.answer(lines) ?? null;
  const place: AntennaPlace = {
    component: level.polarization,
    angleRad: degToRad(level.turntableDeg),
    heightM: level.antennaHeightM,
    request: scanRequestAt(scene, lines.frequencyHz),
  };
  throwIfStopped();
  const domains = [...radiatorsByDomain(scene, parts, answer).values()];
  const pieces = pieceFields(scene, lines, parts, place, answer, hooks).map(({ fields, ...piece }) => ({
    ...piece,
    fieldVPerM: Math.hypot(...fields.flatMap(({ re, im }) => [re, im])),
  }));
  pieces.sort((one, other) => other.fieldVPerM - one.fieldVPerM);
  return {
    frequencyHz: lines.frequencyHz,
    polarization: level.polarization,
    antennaHeightM: level.antennaHeightM,
    turntableDeg: level.turntableDeg,
    levelDbuvPerM: levelOf(level.fieldVPerM),
    ...patterns(domains, place, level.turntableDeg),
    pieces: pieces.slice(0, MOST_LISTED).map(({ net, layer, fromM, toM, fieldVPerM, currentRmsA }) => ({
      net,
      layer,
      fromM: [...fromM],
      toM: [...toM],
      levelDbuvPerM: levelOf(fieldVPerM),
      currentRmsA,
    })),
    currentMap: mapAt(plan, lines),
  };
}

const levelOf = (fieldVPerM: number): number => finiteLevelDbuvPerM(peakFieldToDbuvPerM(fieldVPerM));

/** Both polarisations over the turn at the maximum's height, and over the height at its angle; by the plain sum. */
function patterns(
  domains: readonly (readonly Radiator[])[],
  { angleRad, heightM, request }: AntennaPlace,
  atDeg: number,
): Pick<LineDetail, 'azimuth' | 'height'> {
  const levelAt = (component: Component, angle: number, height: number) =>
    levelOf(Math.hypot(...fieldsAtAntenna(domains, component, angle, height, request).flat()));
  const turntableDeg = withPlace(steps(0, 360, STEP_DEG), atDeg);
  const antennaHeightM = withPlace(steps(ANTENNA_LOWEST_M, ANTENNA_HIGHEST_M, STEP_M), heightM);
  const overTurn = (component: Component) =>
    turntableDeg.map((deg) => levelAt(component, deg === atDeg ? angleRad : degToRad(deg), heightM));
  const overHeight = (component: Component) => antennaHeightM.map((height) => levelAt(component, angleRad, height));
  return {
    azimuth: { turntableDeg, horizontalDbuvPerM: overTurn('horizontal'), verticalDbuvPerM: overTurn('vertical') },
    height: { antennaHeightM, horizontalDbuvPerM: overHeight('horizontal'), verticalDbuvPerM: overHeight('vertical') },
  };
}

function steps(from: number, to: number, step: number): number[] {
  const count = Math.round((to - from) / step);
  return Array.from({ length: count + 1 }, (_, i) => from + ((to - from) * i) / count);
}

const withPlace = (values: readonly number[], place: number): number[] =>
  values.includes(place) ? [...values] : [...values, place].sort((a, b) => a - b);

function mapAt(plan: EstimatePlan, lines: FrequencyLines): LineDetail['currentMap'] {
  const map = currentMaps(plan, [lines])[0];
  if (!map) return null;
  return {
    ...map,
    cells: map.cells.map(({ atM, densityRmsAPerM }) => ({ atM: [...atM], densityRmsAPerM })),
    cables: map.cables.map(({ name, pointsM, currentRmsA }) => ({
      name,
      pointsM: pointsM.map(([x, y, z]) => [x, y, z]),
      currentRmsA: [...currentRmsA],
    })),
  };
}
