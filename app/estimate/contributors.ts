import { peakFieldToDbuvPerM } from '../units/convert.ts';
import { finiteLevelDbuvPerM } from './finite-level.ts';
import type { Contributor } from './result.ts';

/** Field at the antenna of one contributor in one domain through one path, peak phasor, V/m. */
export interface PathField {
  readonly kind: Contributor['kind'];
  readonly name: string;
  readonly domain: string;
  readonly via: string;
  readonly re: number;
  readonly im: number;
}

/** Magnitude of each domain's sum: phasors add within a domain. V/m. */
function domainMagnitudes(fields: readonly PathField[]): number[] {
  const sums = new Map<string, [number, number]>();
  for (const { domain, re, im } of fields) {
    const sum = sums.get(domain) ?? [0, 0];
    sum[0] += re;
    sum[1] += im;
    sums.set(domain, sum);
  }
  return [...sums.values()].map(([re, im]) => Math.hypot(re, im));
}

/** Phasors add within a domain, powers between domains. V/m. */
const magnitude = (fields: readonly PathField[]): number => Math.hypot(...domainMagnitudes(fields));

export interface ContributorSums {
  /** With their paths, strongest first. */
  readonly contributors: Contributor[];
  /** Linear sum of their fields in every domain. */
  readonly linearSumVPerM: number;
  /** Magnitude of those of kind "cable". */
  readonly statedCablesVPerM: number;
}

export function contributorsOf(fields: readonly PathField[]): ContributorSums {
  const groups = new Map<string, PathField[]>();
  for (const field of fields) {
    const key = JSON.stringify([field.kind, field.name]);
    const group = groups.get(key);
    if (group) group.push(field);
    else groups.set(key, [field]);
  }
  const found = [...groups.values()].map((own) => {
    const { kind, name } = own[0]!;
    const domains = domainMagnitudes(own);
    const fieldVPerM = Math.hypot(...domains);
    const viaDbuvPerM = Object.fromEntries(
      [...new Set(own.map(({ via }) => via))].map((via) => [
        via,
        levelOf(magnitude(own.filter((field) => field.via === via))),
      ]),
    );
    return {
      contributor: { kind, name, levelDbuvPerM: levelOf(fieldVPerM), viaDbuvPerM },
      fieldVPerM,
      linearSumVPerM: domains.reduce((sum, field) => sum + field, 0),
    };
  });
  found.sort(
    (one, other) => other.fieldVPerM - one.fieldVPerM || (one.contributor.name < other.contributor.name ? -1 : 1),
  );
  return {
    contributors: found.map(({ contributor }) => contributor),
    linearSumVPerM: found.reduce((sum, { linearSumVPerM }) => sum + linearSumVPerM, 0),
    statedCablesVPerM: magnitude(fields.filter(({ kind }) => kind === 'cable')),
  };
}

const levelOf = (fieldVPerM: number): number => finiteLevelDbuvPerM(peakFieldToDbuvPerM(fieldVPerM));
