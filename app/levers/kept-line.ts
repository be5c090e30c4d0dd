import { contributorsOf, type PathField } from '../estimate/contributors.ts';
import { type LineLevel, scanRequestAt } from '../estimate/line-level.ts';
import { type RadiatingPart, radiatingParts } from '../estimate/radiating-parts.ts';
import type { Scene } from '../estimate/scene.ts';
import type { SourceLine } from '../estimate/spectrum-table.ts';
import type { StructureResponder } from '../estimate/structure-responder.ts';
import type { Radiator } from '../fields/element-set.ts';
import { solveNetwork } from '../network/solve-network.ts';
import type { Component } from '../site/power-map.ts';
import { type ScanRequest, unitFieldsAtAntenna } from '../site/scan.ts';
import { radToDeg } from '../units/convert.ts';
import { type Domain, isEqual, isSameShape } from './domain.ts';
import { KeptField } from './kept-field.ts';
import { type AntennaPlace, keptMaximum } from './kept-maximum.ts';
import type { NetPorts, PortTerminals } from './net-ports.ts';
import { type PortMatrix, portExcitations, portMatrix } from './port-excitation.ts';

/** A net (one unit excitation for each port), a loop or a stated cable (one). */
interface Source {
  readonly kind: RadiatingPart['kind'];
  readonly name: string;
  /** Path of its own currents. */
  readonly via: string;
  readonly firstUnit: number;
  readonly radiators: readonly Radiator[];
  /** Currents of planes and cables per unit, A; empty where they are not solved. */
  readonly structureCurrentsA: readonly Float64Array[];
  /** Nets only. */
  readonly matrix: PortMatrix | null;
}

/** Fields of the unit excitations at one place of the antenna. */
interface PlaceFields extends AntennaPlace {
  readonly component: Component;
  /** Per source: its own path, then every part of the structure; each re, im per unit of the source, V/m. */
  readonly bySource: readonly (readonly Float64Array[])[];
}

/** The sources of one frequency, each with the name of its domain and what it radiates when excited by 1 V or 1 A. */
export interface UnitLines {
  readonly frequencyHz: number;
  readonly nets: readonly NetPorts[];
  readonly loops: readonly string[];
}

/**
 * The kept responses of one frequency: field of every port of every net and every loop, alone, with what it drives through
 * planes and cables.
 */
export class KeptLine {
  readonly frequencyHz: number;
  readonly #scene: Scene;
  readonly #request: ScanRequest;
  readonly #sources: readonly Source[];
  readonly #bySource: ReadonlyMap<string, Source>;
  readonly #unitCount: number;
  readonly #field: KeptField;
  readonly #vias: readonly string[];
  readonly #isRough: boolean;
  #last: {
    readonly domains: readonly Domain[];
    readonly places: readonly PlaceFields[];
    readonly level: LineLevel;
  } | null = null;

  constructor(scene: Scene, unitLines: UnitLines, responder: StructureResponder | null) {
    const { frequencyHz } = unitLines;
    this.frequencyHz = frequencyHz;
    this.#scene = scene;
    this.#request = scanRequestAt(scene, frequencyHz);
    const lines = excitationsOf(unitLines);
    const parts = radiatingParts(scene, { frequencyHz, lines });
    const answer = responder?.answer({ frequencyHz, lines }) ?? null;
    this.#vias = answer ? scene.structure!.parts.map(({ via }) => via) : [];
    this.#isRough = answer !== null && !responder!.isConverged;
    const sources: Source[] = [];
    const units: Radiator[][] = [];
    for (const group of groupBySource(parts)) {
      const { kind, name, via } = group[0]!;
      const structureCurrentsA = group.flatMap(({ domain }) => answer?.currentsByDomain.get(domain) ?? []);
      const matrix = kind === 'net' ? this.#matrixOf(name) : null;
      const radiators = group.map(({ radiator }) => radiator);
      sources.push({ kind, name, via, firstUnit: units.length, radiators, structureCurrentsA, matrix });
      for (const [i, radiator] of radiators.entries()) {
        const currentsA = structureCurrentsA[i];
        units.push([radiator, ...(currentsA ? scene.structure!.radiators(currentsA) : [])]);
      }
    }
    this.#sources = sources;
    this.#bySource = new Map(sources.map((source) => [keyOf(source), source]));
    this.#unitCount = units.length;
    this.#field = new KeptField(units, this.#request);
  }

  #matrixOf(net: string): PortMatrix {
    const { network } = this.#scene.nets.get(net)!;
    return portMatrix(
      solveNetwork(network, this.frequencyHz),
      network.drives.map(({ node }) => node),
    );
  }

  has(kind: SourceLine['kind'], name: string): boolean {
    return this.#bySource.has(keyOf({ kind, name }));
  }

  /** What the lines of changed sources at changed terminals read at the antenna; null when nothing radiates. */
  level(lines: readonly SourceLine[], terminals: ReadonlyMap<string, PortTerminals>): LineLevel | null {
    const domains = this.#domains(lines, terminals);
    if (domains.length === 0) return null;
    const last = this.#last;
    if (last !== null && isEqual(last.domains, domains)) return last.level;
    const places = last !== null && isSameShape(last.domains, domains) ? last.places : this.#search(domains);
    const level = this.#levelAt(domains, places);
    this.#last = { domains, places, level };
    return level;
  }

  /** How the lines excite the units, by domain; stated cables as they are. */
  #domains(lines: readonly SourceLine[], terminals: ReadonlyMap<string, PortTerminals>): Domain[] {
    const domains = new Map<string, { amplitudes: Float64Array; sources: Set<number> }>();
    const domainOf = (name: string) => {
      const known = domains.get(name) ?? { amplitudes: new Float64Array(2 * this.#unitCount), sources: new Set() };
      domains.set(name, known);
      return known;
    };
    for (const [s, source] of this.#sources.entries()) {
      if (source.kind === 'cable') {
        const domain = domainOf(`cable ${source.name}`);
        domain.sources.add(s);
        domain.amplitudes[2 * source.firstUnit] = 1;
        continue;
      }
      const own = lines.filter(({ kind, name }) => kind === source.kind && name === source.name);
      if (own.length === 0) continue;
      const names = [...new Set(own.map(({ domain }) => domain))];
      const excited = names.map((name) => own.filter(({ domain }) => domain === name));
      const amplitudes = source.matrix
        ? this.#portAmplitudes(source.matrix, terminals.get(source.name)!, excited)
        : excited.map((all) => Float64Array.of(sum(all.map(({ re }) => re)), sum(all.map(({ im }) => im))));
      for (const [i, name] of names.entries()) {
        const domain = domainOf(name);
        domain.sources.add(s);
        domain.amplitudes.set(amplitudes[i]!, 2 * source.firstUnit);
      }
    }
    return [...domains].map(([name, { amplitudes, sources }]) => ({ name, amplitudes, sources: [...sources] }));
  }

  #portAmplitudes(
    matrix: PortMatrix,
    terminals: PortTerminals,
    excited: readonly (readonly SourceLine[])[],
  ): Float64Array[] {
    const voltages = excited.map((own) => {
      const sources = new Float64Array(2 * terminals.drives.length);
      for (const { driveIndex, re, im } of own) {
        sources[2 * driveIndex]! += re;
        sources[2 * driveIndex + 1]! += im;
      }
      return sources;
    });
    return portExcitations(matrix, terminals, this.frequencyHz, voltages);
  }

  #search(domains: readonly Domain[]): PlaceFields[] {
    const amplitudes = domains.map((domain) => domain.amplitudes);
    return (['horizontal', 'vertical'] as const).map((component) =>
      this.#fieldsAt(component, keptMaximum(this.#field, component, amplitudes)),
    );
  }

  /** By the plain sum over all elements, as the estimate does it. */
  #fieldsAt(component: Component, { angleRad, heightM }: AntennaPlace): PlaceFields {
    const perAmpere = (elements: Radiator['elements']) =>
      unitFieldsAtAntenna(elements, component, angleRad, heightM, this.#request);
    const parts = this.#vias.length > 0 ? this.#scene.structure!.parts : [];
    const observers = parts.map(({ elements }) => perAmpere(elements));
    const bySource = this.#sources.map(({ radiators, structureCurrentsA }) => {
      const own = perAmpere(radiators[0]!.elements);
      return [
        Float64Array.from(radiators.flatMap(({ currentsA }) => dot(own, currentsA))),
        ...parts.map(({ edges }, p) =>
          Float64Array.from(structureCurrentsA.flatMap((all) => dotAt(observers[p]!, all, edges))),
        ),
      ];
    });
    return { component, angleRad, heightM, bySource };
  }

  #levelAt(domains: readonly Domain[], places: readonly PlaceFields[]): LineLevel {
    const fields = places.map((place) => this.#pathFields(domains, place));
    const [horizontalVPerM, verticalVPerM] = fields.map((own) => totalOf(own)) as [number, number];
    const chosen = verticalVPerM > horizontalVPerM ? 1 : 0;
    const { component, heightM, angleRad } = places[chosen]!;
    const { contributors, linearSumVPerM, statedCablesVPerM } = contributorsOf(fields[chosen]!);
    return {
      frequencyHz: this.frequencyHz,
      polarization: component,
      antennaHeightM: heightM,
      turntableDeg: radToDeg(angleRad),
      fieldVPerM: Math.max(horizontalVPerM, verticalVPerM),
      horizontalVPerM,
      verticalVPerM,
      upperBoundVPerM: linearSumVPerM,
      statedCablesVPerM,
      contributors,
      isRough: this.#isRough,
    };
  }

  #pathFields(domains: readonly Domain[], { bySource }: PlaceFields): PathField[] {
    return domains.flatMap(({ name: domain, amplitudes, sources }) =>
      sources.flatMap((s) => {
        const { kind, name, via: ownVia, firstUnit } = this.#sources[s]!;
        const own = amplitudes.subarray(2 * firstUnit);
        const vias = kind === 'cable' ? [ownVia] : [ownVia, ...this.#vias];
        return vias.map((via, path): PathField => {
          const [re, im] = dot(bySource[s]![path]!, own);
          return { kind, name, domain, via, re, im };
        });
      }),
    );
  }
}

const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);
const keyOf = ({ kind, name }: Pick<Source, 'kind' | 'name'>): string => `${kind} ${name}`;

/** A line of 1 V at every port and 1 A in every loop, each a domain of its own. */
function excitationsOf({ nets, loops }: UnitLines): SourceLine[] {
  const unit = { re: 1, im: 0 };
  return [
    ...nets.flatMap(({ name, pins }) =>
      pins.map((_, port): SourceLine => {
        const domain = `port ${port} of ${name}`;
        return { kind: 'net', name, driveIndex: port, domain, ...unit };
      }),
    ),
    ...loops.map((name): SourceLine => ({ kind: 'loop', name, driveIndex: 0, domain: `loop ${name}`, ...unit })),
  ];
}

/** Parts of one source follow each other. */
function groupBySource(parts: readonly RadiatingPart[]): RadiatingPart[][] {
  const groups: RadiatingPart[][] = [];
  for (const part of parts) {
    const last = groups.at(-1);
    if (last && keyOf(last[0]!) === keyOf(part)) last.push(part);
    else groups.push([part]);
  }
  return groups;
}

/** Σ a·b over the complex pairs of a. */
function dot(a: Float64Array, b: Float64Array): [re: number, im: number] {
  let re = 0;
  let im = 0;
  for (let i = 0; i < a.length; i += 2) {
    re += a[i]! * b[i]! - a[i + 1]! * b[i + 1]!;
    im += a[i]! * b[i + 1]! + a[i + 1]! * b[i]!;
  }
  return [re, im];
}

/** Σ a·b with the entries of b at given places. */
function dotAt(a: Float64Array, b: Float64Array, places: readonly number[]): [re: number, im: number] {
  let re = 0;
  let im = 0;
  for (let i = 0; i < places.length; i++) {
    const at = 2 * places[i]!;
    re += a[2 * i]! * b[at]! - a[2 * i + 1]! * b[at + 1]!;
    im += a[2 * i]! * b[at + 1]! + a[2 * i + 1]! * b[at]!;
  }
  return [re, im];
}

/** Phasors add within a domain, powers between domains, V/m. */
function totalOf(fields: readonly PathField[]): number {
  const sums = new Map<string, [number, number]>();
  for (const { domain, re, im } of fields) {
    const known = sums.get(domain);
    if (known) {
      known[0] += re;
      known[1] += im;
    } else sums.set(domain, [re, im]);
  }
  return Math.hypot(...[...sums.values()].flat());
}
