import type { CurrentLoop, Point3M, PointM } from '../board/board.ts';
import type { NetworkResponse } from '../network/network.ts';
import type { ReferencePlane } from '../returns/reference.ts';
import type { Filament } from './filament-kernel.ts';
import type { Incident } from './incident.ts';
import type { LineWave } from './line-wave.ts';
import { PairCoupling } from './pair-coupling.ts';
import { filamentSource, type PairFilament, pairFilaments } from './pair-filaments.ts';
import type { PairPiece } from './pair-piece.ts';
import { RegularField } from './regular-field.ts';
import type { ReturnGap } from './return-gaps.ts';
import type { StructureModel } from './structure-model.ts';

/** A section of a net as the structure needs it. */
export interface CoupledSection {
  readonly fromM: PointM;
  readonly toM: PointM;
  readonly planes: readonly ReferencePlane[];
  /** Permittivity between trace and plane. */
  readonly epsilonR: number;
  /** Charge of the ends at node A and B, in lengths of line (`traceEndM`), m. */
  readonly endsM: readonly [number, number];
}

/** Filaments that act on wires are cut to this many cells. */
const FILAMENT_CELLS = 2;

const wireEdges = ({ mesh }: StructureModel): number[] =>
  Array.from({ length: mesh.edgeCount - mesh.firstWireEdge }, (_, i) => mesh.firstWireEdge + i);
const wireNodes = ({ mesh }: StructureModel): number[] =>
  Array.from({ length: mesh.nodeCount - mesh.sheet.cellCount }, (_, i) => mesh.sheet.cellCount + i);

/**
 * How one net drives the structure: its pairs act on the cells under them (local form) and, as filaments in space, on the
 * cables. Sections between two planes excite nothing (physics 11).
 */
export class NetCoupling {
  /** Where the return filament of a section is missing and the sheet carries it, by section index, m from its node A. */
  readonly gapsBySection: ReadonlyMap<number, readonly ReturnGap[]>;
  readonly #sectionOfPiece: readonly number[];
  readonly #pieces: readonly PairPiece[];
  readonly #pair: PairCoupling;
  readonly #filaments: readonly PairFilament[];
  readonly #model: StructureModel;
  #onWires: RegularField | null = null;

  constructor(model: StructureModel, sections: readonly CoupledSection[], path: string) {
    const { mesh, lookup } = model;
    const own = sections.flatMap((section, index) => (section.planes.length === 1 ? [{ section, index }] : []));
    this.#sectionOfPiece = own.map(({ index }) => index);
    this.#pieces = own.map(({ section: { fromM, toM, planes, epsilonR, endsM } }) => ({
      fromM,
      toM,
      heightM: planes[0]!.heightM,
      side: planes[0]!.traceZM > planes[0]!.planeZM ? 1 : -1,
      epsilonR,
      endsM,
    }));
    this.#pair = new PairCoupling(lookup, this.#pieces, path);
    const gaps = new Map<number, ReturnGap[]>();
    for (const gap of this.#pair.gaps) {
      const section = this.#sectionOfPiece[gap.piece]!;
      gaps.set(section, [...(gaps.get(section) ?? []), gap]);
    }
    this.gapsBySection = gaps;
    const longestM = FILAMENT_CELLS * mesh.sheet.grid.cellM;
    this.#filaments =
      mesh.wires.length > 0 ? pairFilaments(this.#pieces, this.#pair.gaps, mesh.sheet.zM, longestM) : [];
    this.#model = model;
  }

  /** The pair's field on the cables, worked out when first needed. */
  #wireField(): RegularField | null {
    if (this.#filaments.length === 0) return null;
    this.#onWires ??= new RegularField(
      this.#model.mesh,
      this.#filaments.map(({ filament }) => filament),
      wireEdges(this.#model),
      wireNodes(this.#model),
    );
    return this.#onWires;
  }

  /**
   * Adds what a solved net does to the structure at one frequency; the response times a phasor. `shareOf` takes a part of
   * every stretch only (m from the section's node A; a place where both are the same); absent: all.
   */
  addTo(
    incident: Incident,
    frequencyHz: number,
    response: Pick<NetworkResponse, 'gamma' | 'forward' | 'backward'>,
    re: number,
    im: number,
    shareOf?: (section: number, fromM: number, toM: number) => number,
  ): void {
    const waves = this.#sectionOfPiece.map((section): LineWave => waveOf(response, section, re, im));
    const ofPiece =
      shareOf && ((piece: number, fromM: number, toM: number) => shareOf(this.#sectionOfPiece[piece]!, fromM, toM));
    this.#pair.addTo(incident, frequencyHz, waves, ofPiece);
    const omega = 2 * Math.PI * frequencyHz;
    this.#wireField()?.addTo(incident, frequencyHz, (index, out) => {
      const filament = this.#filaments[index]!;
      filamentSource(filament, this.#pieces[filament.piece]!, waves[filament.piece]!, omega, out);
      if (ofPiece) scale(out, ofPiece(filament.piece, filament.fromM, filament.toM));
    });
  }
}

function scale(vector: Float64Array, factor: number): void {
  for (let i = 0; i < vector.length; i++) vector[i]! *= factor;
}

function waveOf(
  { gamma, forward, backward }: Pick<NetworkResponse, 'gamma' | 'forward' | 'backward'>,
  section: number,
  re: number,
  im: number,
): LineWave {
  const at = 2 * section;
  return {
    gammaRePerM: gamma[at]!,
    gammaImPerM: gamma[at + 1]!,
    forwardReA: forward[at]! * re - forward[at + 1]! * im,
    forwardImA: forward[at]! * im + forward[at + 1]! * re,
    backwardReA: backward[at]! * re - backward[at + 1]! * im,
    backwardImA: backward[at]! * im + backward[at + 1]! * re,
  };
}

/** How a stated loop of current drives the structure: by its own field on every edge. */
export class LoopCoupling {
  readonly #model: StructureModel;
  readonly #loop: CurrentLoop;
  #known: RegularField | null = null;

  constructor(model: StructureModel, loop: CurrentLoop) {
    this.#model = model;
    this.#loop = loop;
  }

  #field(): RegularField {
    const { mesh } = this.#model;
    const edges = () => Array.from({ length: mesh.edgeCount }, (_, i) => i);
    this.#known ??= new RegularField(mesh, loopFilaments(this.#loop.pointsM, mesh.sheet.grid.cellM), edges(), []);
    return this.#known;
  }

  /** Adds what a current (A, the same all around) does. */
  addTo(incident: Incident, frequencyHz: number, re: number, im: number): void {
    this.#field().addTo(incident, frequencyHz, (_, out) => {
      out[0] = re;
      out[1] = im;
      out[2] = 0;
      out[3] = 0;
    });
  }
}

function loopFilaments(pointsM: readonly Point3M[], longestM: number): Filament[] {
  return pointsM.flatMap((from, i) => {
    const to = pointsM[(i + 1) % pointsM.length]!;
    const lengthM = Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);
    const count = Math.max(1, Math.ceil(lengthM / longestM));
    const at = (s: number): Point3M => [
      from[0] + s * (to[0] - from[0]),
      from[1] + s * (to[1] - from[1]),
      from[2] + s * (to[2] - from[2]),
    ];
    return Array.from({ length: count }, (_, k) => ({ from: at(k / count), to: at((k + 1) / count) }));
  });
}
