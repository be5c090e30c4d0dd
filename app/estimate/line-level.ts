import type { Radiator } from '../fields/element-set.ts';
import type { Component } from '../site/power-map.ts';
import { fieldsAtAntenna, type ScanRequest, scanMaxima, unitFieldsAtAntenna } from '../site/scan.ts';
import type { SiteKind } from '../site/site.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { radToDeg } from '../units/convert.ts';
import { contributorsOf, type PathField } from './contributors.ts';
import { type RadiatingPart, radiatingParts } from './radiating-parts.ts';
import type { Contributor } from './result.ts';
import type { Scene } from './scene.ts';
import type { FrequencyLines } from './spectrum-table.ts';
import type { StructureAnswer, StructureResponder } from './structure-responder.ts';

/** What the antenna would read at one frequency, and where. Fields are peak phasor magnitudes, V/m. */
export interface LineLevel {
  readonly frequencyHz: number;
  readonly polarization: Component;
  readonly antennaHeightM: number;
  readonly turntableDeg: number;
  readonly fieldVPerM: number;
  readonly horizontalVPerM: number;
  readonly verticalVPerM: number;
  /** Linear sum of all contributors in all domains at the maximum. */
  readonly upperBoundVPerM: number;
  /** Part of `fieldVPerM` that is of stated cable currents, domains added as powers. */
  readonly statedCablesVPerM: number;
  readonly contributors: readonly Contributor[];
  /** The structure's currents are interpolated with more error than allowed. */
  readonly isRough: boolean;
}

/** The ground-plane site ends here (a harmonic m·f0 is rounded); above, the test is done in free space (absorber on the floor). */
const GROUND_SITE_MAX_HZ = 1e9 * (1 + 1e-9);

export const siteAt = (scene: Scene, frequencyHz: number): SiteKind =>
  frequencyHz > GROUND_SITE_MAX_HZ ? 'free-space' : scene.site.kind;

export const scanRequestAt = (scene: Scene, frequencyHz: number): ScanRequest => ({
  kPerM: (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
  scanRadiusM: scene.scanRadiusM,
  site: siteAt(scene, frequencyHz),
  box: scene.box,
});

/** Level of one frequency: maximum over height, angle and polarisation; null when nothing radiates there. */
export function lineLevel(scene: Scene, lines: FrequencyLines, responder: StructureResponder | null): LineLevel | null {
  const parts = radiatingParts(scene, lines);
  if (parts.length === 0) return null;
  const answer = responder?.answer(lines) ?? null;
  const request = scanRequestAt(scene, lines.frequencyHz);
  const domains = radiatorsByDomain(scene, parts, answer);
  const maxima = scanMaxima([...domains.values()], request);
  const totalAt = (component: Component) => {
    const { angleRad, heightM } = maxima[component];
    const fields = fieldsAtAntenna([...domains.values()], component, angleRad, heightM, request);
    return Math.hypot(...fields.flat());
  };
  const horizontalVPerM = totalAt('horizontal');
  const verticalVPerM = totalAt('vertical');
  const polarization = verticalVPerM > horizontalVPerM ? 'vertical' : 'horizontal';
  const place: AntennaPlace = { component: polarization, ...maxima[polarization], request };
  const { contributors, linearSumVPerM, statedCablesVPerM } = contributorsOf([
    ...pairFields(parts, place),
    ...(answer ? structureFields(scene, answer, place) : []),
  ]);
  return {
    frequencyHz: lines.frequencyHz,
    polarization,
    antennaHeightM: place.heightM,
    turntableDeg: radToDeg(place.angleRad),
    fieldVPerM: Math.max(horizontalVPerM, verticalVPerM),
    horizontalVPerM,
    verticalVPerM,
    upperBoundVPerM: linearSumVPerM,
    statedCablesVPerM,
    contributors,
    isRough: answer !== null && !responder!.isConverged,
  };
}

export interface AntennaPlace {
  readonly component: Component;
  readonly angleRad: number;
  readonly heightM: number;
  readonly request: ScanRequest;
}

/** All radiating currents of each domain: pairs, loops, stated cables, and the structure's as one. */
export function radiatorsByDomain(
  scene: Scene,
  parts: readonly RadiatingPart[],
  answer: StructureAnswer | null,
): Map<string, Radiator[]> {
  const domains = new Map<string, Radiator[]>();
  const add = (domain: string, radiators: readonly Radiator[]) => {
    const known = domains.get(domain);
    if (known) known.push(...radiators);
    else domains.set(domain, [...radiators]);
  };
  for (const { domain, radiator } of parts) add(domain, [radiator]);
  for (const [domain, currentsA] of answer?.currentsByDomain ?? []) add(domain, scene.structure!.radiators(currentsA));
  return domains;
}

function pairFields(parts: readonly RadiatingPart[], place: AntennaPlace): PathField[] {
  const { component, angleRad, heightM, request } = place;
  const fields = fieldsAtAntenna(
    parts.map(({ radiator }) => [radiator]),
    component,
    angleRad,
    heightM,
    request,
  );
  return parts.map(({ kind, name, domain, via }, i) => ({
    kind,
    name,
    domain,
    via,
    re: fields[i]![0],
    im: fields[i]![1],
  }));
}

/** What each net and loop radiates through plane and cables, by weighing its drive with the antenna's view of each part. */
function structureFields(scene: Scene, answer: StructureAnswer, place: AntennaPlace): PathField[] {
  const { component, angleRad, heightM, request } = place;
  return scene.structure!.parts.flatMap(({ via, edges, elements }) => {
    const perAmpere = unitFieldsAtAntenna(elements, component, angleRad, heightM, request);
    const observer = new Float64Array(2 * scene.structure!.mesh.edgeCount);
    for (const [i, edge] of edges.entries()) {
      observer[2 * edge] = perAmpere[2 * i]!;
      observer[2 * edge + 1] = perAmpere[2 * i + 1]!;
    }
    const weights = answer.weigh(observer);
    return answer.shares.map(({ kind, name, domain, vector }): PathField => {
      let re = 0;
      let im = 0;
      for (let i = 0; i < weights.length; i += 2) {
        re += weights[i]! * vector[i]! - weights[i + 1]! * vector[i + 1]!;
        im += weights[i]! * vector[i + 1]! + weights[i + 1]! * vector[i]!;
      }
      return { kind, name, domain, via, re, im };
    });
  });
}
