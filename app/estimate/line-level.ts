import type { Component } from '../site/power-map.ts';
import { fieldsAtAntenna, type ScanRequest, scanMaxima } from '../site/scan.ts';
import type { SiteKind } from '../site/site.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { peakFieldToDbuvPerM, radToDeg } from '../units/convert.ts';
import { type RadiatingPart, radiatingParts } from './radiating-parts.ts';
import type { Contributor } from './result.ts';
import type { Scene } from './scene.ts';
import type { FrequencyLines } from './spectrum-table.ts';
import type { StructureResponder } from './structure-responder.ts';

/** What the antenna would read at one frequency, and where. Fields are peak phasor magnitudes, V/m. */
export interface LineLevel {
  readonly frequencyHz: number;
  readonly polarization: Component;
  readonly antennaHeightM: number;
  readonly turntableDeg: number;
  readonly fieldVPerM: number;
  readonly horizontalVPerM: number;
  readonly verticalVPerM: number;
  /** Linear sum of all contributors at the maximum. */
  readonly upperBoundVPerM: number;
  readonly contributors: readonly Contributor[];
  /** The structure's currents are interpolated with more error than allowed. */
  readonly isRough: boolean;
}

/** The ground-plane site ends here; above, the test is done in free space (absorber on the floor). */
const GROUND_SITE_MAX_HZ = 1e9;

export const siteAt = (scene: Scene, frequencyHz: number): SiteKind =>
  frequencyHz > GROUND_SITE_MAX_HZ ? 'free-space' : scene.site.kind;

/** Level of one frequency: maximum over height, angle and polarisation; null when nothing radiates there. */
export function lineLevel(scene: Scene, lines: FrequencyLines, responder: StructureResponder | null): LineLevel | null {
  const parts = radiatingParts(scene, lines, responder);
  if (parts.length === 0) return null;
  const request: ScanRequest = {
    kPerM: (2 * Math.PI * lines.frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
    scanRadiusM: scene.scanRadiusM,
    site: siteAt(scene, lines.frequencyHz),
    box: scene.box,
  };
  const domains = new Map<string, RadiatingPart[]>();
  for (const part of parts) domains.set(part.domain, [...(domains.get(part.domain) ?? []), part]);
  const maxima = scanMaxima(
    [...domains.values()].map((own) => own.map(({ radiator }) => radiator)),
    request,
  );
  const partRadiators = parts.map(({ radiator }) => [radiator]);
  const fieldsAt = (component: Component) => {
    const { angleRad, heightM } = maxima[component];
    return fieldsAtAntenna(partRadiators, component, angleRad, heightM, request);
  };
  const fields = { horizontal: fieldsAt('horizontal'), vertical: fieldsAt('vertical') };
  const horizontalVPerM = magnitude(parts, fields.horizontal);
  const verticalVPerM = magnitude(parts, fields.vertical);
  const polarization = verticalVPerM > horizontalVPerM ? 'vertical' : 'horizontal';
  const contributors = contributorsOf(parts, fields[polarization]);
  return {
    frequencyHz: lines.frequencyHz,
    polarization,
    antennaHeightM: maxima[polarization].heightM,
    turntableDeg: radToDeg(maxima[polarization].angleRad),
    fieldVPerM: Math.max(horizontalVPerM, verticalVPerM),
    horizontalVPerM,
    verticalVPerM,
    upperBoundVPerM: contributors.reduce((sum, { fieldVPerM }) => sum + fieldVPerM, 0),
    contributors: contributors.map(({ contributor }) => contributor),
    isRough: responder !== null && !responder.isConverged,
  };
}

type Complex = readonly [re: number, im: number];

/** Phasors add within a domain, powers between domains. */
function magnitude(parts: readonly RadiatingPart[], fields: readonly Complex[]): number {
  const sums = new Map<string, [number, number]>();
  for (const [i, { domain }] of parts.entries()) {
    const sum = sums.get(domain) ?? [0, 0];
    sum[0] += fields[i]![0];
    sum[1] += fields[i]![1];
    sums.set(domain, sum);
  }
  let power = 0;
  for (const [re, im] of sums.values()) power += re * re + im * im;
  return Math.sqrt(power);
}

function contributorsOf(
  parts: readonly RadiatingPart[],
  fields: readonly Complex[],
): { contributor: Contributor; fieldVPerM: number }[] {
  const groups = new Map<string, number[]>();
  for (const [i, { kind, name }] of parts.entries()) {
    const key = JSON.stringify([kind, name]);
    groups.set(key, [...(groups.get(key) ?? []), i]);
  }
  return [...groups.values()]
    .map((indices) => {
      const own = indices.map((i) => parts[i]!);
      const fieldVPerM = magnitude(
        own,
        indices.map((i) => fields[i]!),
      );
      const vias = [...new Set(own.map(({ via }) => via))];
      const viaDbuvPerM = Object.fromEntries(
        vias.map((via) => {
          const through = indices.filter((i) => parts[i]!.via === via);
          const field = magnitude(
            through.map((i) => parts[i]!),
            through.map((i) => fields[i]!),
          );
          return [via, peakFieldToDbuvPerM(field)];
        }),
      );
      const { kind, name } = own[0]!;
      return { contributor: { kind, name, levelDbuvPerM: peakFieldToDbuvPerM(fieldVPerM), viaDbuvPerM }, fieldVPerM };
    })
    .sort(
      (one, other) => other.fieldVPerM - one.fieldVPerM || (one.contributor.name < other.contributor.name ? -1 : 1),
    );
}
