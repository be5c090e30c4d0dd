import type { Point3M } from '../board/board.ts';
import type { PackedRules } from '../emitters/element-currents.ts';
import { AppError } from '../errors.ts';
import { solveNetwork } from '../network/solve-network.ts';
import { unitFieldsAtAntenna } from '../site/scan.ts';
import { siteFrame, toBoardPoint } from '../site/site.ts';
import { emptyIncident } from '../structure/incident.ts';
import { currentAt } from '../structure/line-wave.ts';
import { interleaved } from '../structure/structure-model.ts';
import { addScaled } from '../sweep/aaa.ts';
import type { EstimateHooks } from './estimate-request.ts';
import { cutNets, partOnPiece, type TracePiece } from './line-detail-cuts.ts';
import { sharesOfPlaces } from './line-detail-shares.ts';
import type { AntennaPlace } from './line-level.ts';
import type { RadiatingPart } from './radiating-parts.ts';
import type { Scene } from './scene.ts';
import type { FrequencyLines, SourceLine } from './spectrum-table.ts';
import type { StructureAnswer } from './structure-responder.ts';

/** A piece of a net with its field at the antenna in every domain (peak phasors, V/m). */
export interface PieceField {
  readonly net: string;
  /** Empty: a pin, a via, or the return's way beside one. */
  readonly layer: string;
  readonly fromM: Point3M;
  readonly toM: Point3M;
  readonly currentRmsA: number;
  readonly fields: readonly { readonly domain: string; readonly re: number; readonly im: number }[];
}

/** A net's waves in one domain, as its response to all that domain's drives. */
interface Waves {
  readonly gamma: Float64Array;
  readonly forward: Float64Array;
  readonly backward: Float64Array;
}

/**
 * Fields of all pieces of the nets that have lines at one frequency: by their own pair, and by what they drive through planes and
 * cables (with the pins at their ends; by reciprocity, as contributors). `answer` is that of these lines solved directly, null where
 * planes and cables are not solved. The pieces' fields add up to the nets'.
 */
export function pieceFields(
  scene: Scene,
  { frequencyHz, lines }: FrequencyLines,
  parts: readonly RadiatingPart[],
  place: AntennaPlace,
  answer: StructureAnswer | null,
  hooks: EstimateHooks = {},
): PieceField[] {
  const names = [...new Set(lines.filter(({ kind }) => kind === 'net').map(({ name }) => name))];
  const nets = scene.board.nets.filter(({ name }) => names.includes(name));
  const weights = answer && weightsOf(scene, answer, place);
  const cut = cutNets(scene.board, nets);
  const total = [...cut.values()].reduce((sum, { length }) => sum + length, 0);
  let done = 0;
  const onPiece = () => {
    if (hooks.stop?.()) throw new AppError('cancelled', 'stopped by the user');
    hooks.onProgress?.(++done, total);
  };
  return [...cut].flatMap(([name, pieces]) => {
    const own = lines.filter((line) => line.kind === 'net' && line.name === name);
    const waves = wavesByDomain(scene, name, own, frequencyHz);
    const radiated = parts.filter((part) => part.kind === 'net' && part.name === name);
    const pair = ownFields(scene, radiated, pieces, place);
    const driven = pieces.map((piece, index) => {
      onPiece();
      const isLast = pieces[index + 1]?.section !== piece.section;
      return [...waves].map(([domain, of]) => ({
        domain,
        ...(weights ? drivenField(scene, name, frequencyHz, of, piece, isLast, weights) : { re: 0, im: 0 }),
      }));
    });
    const onTrace = pieces.map(
      (piece, index): PieceField => ({
        net: name,
        layer: piece.layer,
        fromM: piece.start,
        toM: piece.end,
        currentRmsA: rmsOf([...waves.values()].map((of) => meanCurrentA(of, piece))),
        fields: driven[index]!.map(({ domain, re, im }) => {
          const field = pair.byPiece.get(domain)!;
          return { domain, re: re + field[2 * index]!, im: im + field[2 * index + 1]! };
        }),
      }),
    );
    return [...onTrace, ...pair.upright];
  });
}

/** The antenna's view of what drives the edges of all parts. */
function weightsOf(
  scene: Scene,
  answer: StructureAnswer,
  { component, angleRad, heightM, request }: AntennaPlace,
): Float64Array {
  const observer = new Float64Array(2 * scene.structure!.mesh.edgeCount);
  for (const { edges, elements } of scene.structure!.parts) {
    const perAmpere = unitFieldsAtAntenna(elements, component, angleRad, heightM, request);
    for (const [i, edge] of edges.entries()) {
      observer[2 * edge] = perAmpere[2 * i]!;
      observer[2 * edge + 1] = perAmpere[2 * i + 1]!;
    }
  }
  return answer.weigh(observer);
}

function wavesByDomain(
  scene: Scene,
  name: string,
  lines: readonly SourceLine[],
  frequencyHz: number,
): Map<string, Waves> {
  const responses = solveNetwork(scene.nets.get(name)!.network, frequencyHz);
  const waves = new Map<string, Waves>();
  for (const { domain, driveIndex, re, im } of lines) {
    const { gamma, forward, backward } = responses[driveIndex]!;
    const known = waves.get(domain) ?? {
      gamma,
      forward: new Float64Array(forward.length),
      backward: new Float64Array(backward.length),
    };
    addScaled(known.forward, forward, re, im);
    addScaled(known.backward, backward, re, im);
    waves.set(domain, known);
  }
  return waves;
}

/** What the pair's elements radiate themselves: by piece and domain those along traces, one by one the vertical ones and detours. */
function ownFields(
  scene: Scene,
  radiated: readonly RadiatingPart[],
  pieces: readonly TracePiece[],
  { component, angleRad, heightM, request }: AntennaPlace,
): { byPiece: Map<string, Float64Array>; upright: PieceField[] } {
  const { elements } = radiated[0]!.radiator;
  const net = radiated[0]!.name;
  const model = scene.nets.get(net)!;
  const { rules } = model.pair.elements === elements ? model.pair : model.pairAlone;
  const perAmpere = unitFieldsAtAntenna(elements, component, angleRad, heightM, request);
  const fieldOf = (part: RadiatingPart, e: number) => {
    const { currentsA } = part.radiator;
    return {
      domain: part.domain,
      re: perAmpere[2 * e]! * currentsA[2 * e]! - perAmpere[2 * e + 1]! * currentsA[2 * e + 1]!,
      im: perAmpere[2 * e]! * currentsA[2 * e + 1]! + perAmpere[2 * e + 1]! * currentsA[2 * e]!,
    };
  };
  const frame = siteFrame(scene.board, scene.site.orientation);
  const sharesAt = shareFinder(pieces, rules, elements.count);
  const byPiece = new Map(radiated.map(({ domain }) => [domain, new Float64Array(2 * pieces.length)]));
  const upright: PieceField[] = [];
  for (let e = 0; e < elements.count; e++) {
    const fields = radiated.map((part) => fieldOf(part, e));
    const section = rules.sections[e]!;
    if (section >= 0) {
      const { first, shares } = sharesAt(section, rules.placesM[e]!);
      for (const { domain, re, im } of fields) {
        const sums = byPiece.get(domain)!;
        for (const [i, share] of shares.entries()) {
          sums[2 * (first + i)]! += share * re;
          sums[2 * (first + i) + 1]! += share * im;
        }
      }
      continue;
    }
    const end = (sign: 1 | -1): Point3M => {
      const at = (axis: number) => elements.positionsM[3 * e + axis]! + (sign * elements.vectorsM[3 * e + axis]!) / 2;
      return toBoardPoint(frame, [at(0), at(1), at(2)]);
    };
    const currents = radiated.map(({ radiator: { currentsA } }) =>
      Math.hypot(currentsA[2 * e]!, currentsA[2 * e + 1]!),
    );
    upright.push({ net, layer: '', fromM: end(-1), toM: end(1), currentRmsA: rmsOf(currents), fields });
  }
  return { byPiece, upright };
}

/** First piece of a section and the parts of its pieces in an element there. */
function shareFinder(pieces: readonly TracePiece[], { sections, placesM }: PackedRules, count: number) {
  const placesOf = new Map<number, number[]>();
  for (let e = 0; e < count; e++) {
    const section = sections[e]!;
    if (section < 0) continue;
    const known = placesOf.get(section);
    if (known) known.push(placesM[e]!);
    else placesOf.set(section, [placesM[e]!]);
  }
  const firstOf = new Map<number, number>();
  for (const [index, { section }] of pieces.entries()) if (!firstOf.has(section)) firstOf.set(section, index);
  const known = new Map<number, ReturnType<typeof sharesOfPlaces>>();
  return (section: number, atM: number): { readonly first: number; readonly shares: Float64Array } => {
    const first = firstOf.get(section)!;
    let shares = known.get(section);
    if (!shares) {
      const own = pieces.filter((piece) => piece.section === section);
      shares = sharesOfPlaces(placesOf.get(section)!, own.at(-1)!.toM, own);
      known.set(section, shares);
    }
    return { first, shares: shares.get(atM)! };
  };
}

/** What a piece radiates through planes and cables: the antenna's weights times what the piece alone does to the structure. */
function drivenField(
  scene: Scene,
  net: string,
  frequencyHz: number,
  waves: Waves,
  piece: TracePiece,
  isLast: boolean,
  weights: Float64Array,
): { re: number; im: number } {
  const { coupling } = scene.nets.get(net)!;
  if (!coupling) return { re: 0, im: 0 };
  const structure = scene.structure!;
  const incident = emptyIncident(structure.mesh);
  coupling.addTo(incident, frequencyHz, waves, 1, 0, (section, fromM, toM) =>
    partOnPiece(piece, isLast, section, fromM, toM),
  );
  const vector = interleaved(structure.solverAt(frequencyHz).rightHandSide(incident));
  let re = 0;
  let im = 0;
  for (let i = 0; i < vector.length; i += 2) {
    re += weights[i]! * vector[i]! - weights[i + 1]! * vector[i + 1]!;
    im += weights[i]! * vector[i + 1]! + weights[i + 1]! * vector[i]!;
  }
  return { re, im };
}

/** Mean of the magnitudes at a piece's ends, peak, A. */
function meanCurrentA({ gamma, forward, backward }: Waves, { section, fromM, toM }: TracePiece): number {
  const at = 2 * section;
  const wave = {
    gammaRePerM: gamma[at]!,
    gammaImPerM: gamma[at + 1]!,
    forwardReA: forward[at]!,
    forwardImA: forward[at + 1]!,
    backwardReA: backward[at]!,
    backwardImA: backward[at + 1]!,
  };
  const current = new Float64Array(2);
  const magnitude = (atM: number) => {
    currentAt(wave, atM, current);
    return Math.hypot(current[0]!, current[1]!);
  };
  return (magnitude(fromM) + magnitude(toM)) / 2;
}

/** Rms of peak currents of several domains. */
const rmsOf = (peaksA: readonly number[]): number => Math.hypot(...peaksA) / Math.SQRT2;
