import { peakFieldToDbuvPerM } from '../units/convert.ts';
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

/** Phasors add within a domain, powers between domains. V/m. */
export function magnitude(fields: readonly Pick<PathField, 'domain' | 're' | 'im'>[]): number {
  const sums = new Map<string, [number, number]>();
  for (const { domain, re, im } of fields) {
    const sum = sums.get(domain) ?? [0, 0];
    sum[0] += re;
    sum[1] += im;
    sums.set(domain, sum);
  }
  let power = 0;
  for (const [re, im] of sums.values()) power += re * re + im * im;
  return Math.sqrt(power);
}

/** Contributors with their paths, strongest first, and the linear sum of their fields (V/m). */
export function contributorsOf(fields: readonly PathField[]): { contributors: Contributor[]; linearSumVPerM: number } {
  const groups = new Map<string, PathField[]>();
  for (const field of fields) {
    const key = JSON.stringify([field.kind, field.name]);
    const group = groups.get(key);
    if (group) group.push(field);
    else groups.set(key, [field]);
  }
  const found = [...groups.values()].map((own) => {
    const { kind, name } = own[0]!;
    const fieldVPerM = magnitude(own);
    const viaDbuvPerM = Object.fromEntries(
      [...new Set(own.map(({ via }) => via))].map((via) => [
        via,
        peakFieldToDbuvPerM(magnitude(own.filter((field) => field.via === via))),
      ]),
    );
    return { contributor: { kind, name, levelDbuvPerM: peakFieldToDbuvPerM(fieldVPerM), viaDbuvPerM }, fieldVPerM };
  });
  found.sort(
    (one, other) => other.fieldVPerM - one.fieldVPerM || (one.contributor.name < other.contributor.name ? -1 : 1),
  );
  return {
    contributors: found.map(({ contributor }) => contributor),
    linearSumVPerM: found.reduce((sum, { fieldVPerM }) => sum + fieldVPerM, 0),
  };
}
