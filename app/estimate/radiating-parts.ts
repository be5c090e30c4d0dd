import { addElementCurrents } from '../emitters/element-currents.ts';
import { statedCableCurrents } from '../emitters/stated-cable.ts';
import type { Radiator } from '../fields/element-set.ts';
import { solveNetwork } from '../network/solve-network.ts';
import { type Scene, SOLVED_TO_HZ } from './scene.ts';
import type { FrequencyLines, SourceLine } from './spectrum-table.ts';

/** Currents of one contributor, in one domain, on one path they radiate through. */
export interface RadiatingPart {
  readonly kind: 'net' | 'loop' | 'cable';
  readonly name: string;
  readonly domain: string;
  /** "pair", "loop", or a cable's name. */
  readonly via: string;
  readonly radiator: Radiator;
}

/** All stated currents at one frequency: trace pairs, loops, cables with a stated current (not planes and cables solved). */
export function radiatingParts(scene: Scene, { frequencyHz, lines }: FrequencyLines): RadiatingPart[] {
  const parts: RadiatingPart[] = [];
  for (const [name, own] of byName(lines, 'net')) parts.push(...netParts(scene, name, own, frequencyHz));
  for (const [name, own] of byName(lines, 'loop')) parts.push(...loopParts(scene, name, own));
  for (const cable of scene.cables) {
    const currentsA = statedCableCurrents(cable, frequencyHz);
    if (currentsA.every((value) => value === 0)) continue;
    const radiator = { elements: cable.along.elements, currentsA };
    parts.push({ kind: 'cable', name: cable.name, domain: `cable ${cable.name}`, via: cable.name, radiator });
  }
  return parts;
}

function netParts(scene: Scene, name: string, lines: readonly SourceLine[], frequencyHz: number): RadiatingPart[] {
  const model = scene.nets.get(name)!;
  const pair = frequencyHz > SOLVED_TO_HZ ? model.pairAlone : model.pair;
  const responses = solveNetwork(model.network, frequencyHz);
  return [...byDomain(lines)].map(([domain, own]) => {
    const currentsA = new Float64Array(2 * pair.elements.count);
    for (const { driveIndex, re, im } of own) {
      addElementCurrents(pair.rules, responses[driveIndex]!, model.sections, frequencyHz, re, im, currentsA);
    }
    return { kind: 'net', name, domain, via: 'pair', radiator: { elements: pair.elements, currentsA } };
  });
}

function loopParts(scene: Scene, name: string, lines: readonly SourceLine[]): RadiatingPart[] {
  const { elements } = scene.loops.get(name)!;
  return [...byDomain(lines)].map(([domain, own]) => {
    const re = own.reduce((sum, line) => sum + line.re, 0);
    const im = own.reduce((sum, line) => sum + line.im, 0);
    const currentsA = new Float64Array(2 * elements.count);
    for (let i = 0; i < elements.count; i++) {
      currentsA[2 * i] = re;
      currentsA[2 * i + 1] = im;
    }
    return { kind: 'loop', name, domain, via: 'loop', radiator: { elements, currentsA } };
  });
}

function byName(lines: readonly SourceLine[], kind: SourceLine['kind']): Map<string, SourceLine[]> {
  const groups = new Map<string, SourceLine[]>();
  for (const line of lines) {
    if (line.kind !== kind) continue;
    const group = groups.get(line.name);
    if (group) group.push(line);
    else groups.set(line.name, [line]);
  }
  return groups;
}

function byDomain(lines: readonly SourceLine[]): Map<string, SourceLine[]> {
  const groups = new Map<string, SourceLine[]>();
  for (const line of lines) {
    const group = groups.get(line.domain);
    if (group) group.push(line);
    else groups.set(line.domain, [line]);
  }
  return groups;
}
