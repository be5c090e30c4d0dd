import { inputError } from '../errors.ts';
import type { Detector } from '../estimate/result.ts';
import { allLimitLines } from './catalogue.ts';
import { conversionText, convertLine, isAtDistance, rangeText } from './convert-distance.ts';
import { isStandard, type LimitLine, type LimitStatus, limitOfLine, NO_CLASS, rangeOf } from './limit-line.ts';

export interface LimitRequest {
  readonly standard: string;
  /** Ignored (and said) where the standard has no classes. */
  readonly class: string;
  readonly distanceM: number;
  /** Without it a distance the standard has no line for is an error. */
  readonly convertDistance: boolean;
  /** Test site below 1 GHz; standards without lines for a room without reflections use their ordinary ones. */
  readonly siteKind?: 'ground-plane' | 'free-space';
}

interface JudgedLimit {
  readonly detector: Detector;
  readonly limitDbuvPerM: number;
}

export interface LimitSet {
  readonly standard: string;
  readonly class: string;
  readonly distanceM: number;
  readonly edition: string;
  readonly source: string;
  /** 'seen' only when every line was. */
  readonly sourceStatus: LimitStatus | 'partly from memory';
  /** What was converted to this distance and how; absent when nothing was. */
  readonly conversion?: string;
  readonly lines: readonly LimitLine[];
  /** What the user should know about the choice. */
  readonly notes: readonly string[];
  /** Every judged (detector, limit) at a frequency: quasi-peak, average, peak; band edges take the tighter; empty when no line covers it. */
  readonly limitsAt: (frequencyHz: number) => JudgedLimit[];
}

/** Lines that begin here or above are for a site without reflections in every standard. */
const ONE_GHZ = 1e9;

/**
 * The limit lines of a standard, class and distance. Names compare without case, spaces and punctuation, aliases count.
 * With `convertDistance`, ranges without a line at the distance are filled from the nearest one (by ratio) that has; a line
 * that overlaps a chosen one of its detector is an alternative to it and stays out.
 * Throws `input` (paths standard, class, distance), listing what exists.
 */
export function chooseLimits(request: LimitRequest, catalogue: readonly LimitLine[] = allLimitLines): LimitSet {
  const { distanceM } = request;
  if (!(distanceM > 0 && distanceM < Infinity)) throw inputError('distance', 'above 0 m', distanceM);
  const ofStandard = catalogue.filter((line) => isStandard(line, request.standard));
  if (ofStandard.length === 0) {
    const known = distinct(catalogue.map(({ standard }) => standard)).join(', ');
    throw inputError('standard', `one of ${known} (or an alias of one)`, request.standard);
  }
  const standard = ofStandard[0]!.standard;
  const { ofClass, note: classNote } = chooseClass(ofStandard, request.class, standard);
  const { lines, converted, note: siteNote } = chooseSiteAndDistance(ofClass, request);
  if (lines.length === 0) {
    const distances = distinct(ofClass.map((line) => line.distanceM)).sort((a, b) => a - b);
    const exist = distances.map((atM) => `${atM} m`).join(' or ');
    const className = ofClass[0]!.class === NO_CLASS ? '' : ` class ${ofClass[0]!.class}`;
    const must = `${exist} for ${standard}${className} (or ask for the limits to be converted: --convert-distance)`;
    throw inputError('distance', must, `${distanceM} m`);
  }
  const conversion = conversionText(converted, distanceM);
  return {
    standard,
    class: distinct(lines.map((line) => line.class)).join(', '),
    distanceM,
    edition: distinct(lines.map((line) => line.edition)).join('; '),
    source: distinct(lines.map((line) => line.source)).join('; '),
    sourceStatus: weakest(lines),
    ...(conversion === undefined ? {} : { conversion }),
    lines,
    notes: [classNote, siteNote, uncoveredNote(ofClass, lines, distanceM)].filter((note) => note !== undefined),
    limitsAt: (frequencyHz) => judgedAt(lines, frequencyHz),
  };
}

const distinct = <T>(values: readonly T[]): T[] => [...new Set(values)];

/** Class names compare without case and spaces only: "A ≤ 20 kVA" and "A > 20 kVA" differ by punctuation. */
const plainClass = (name: string): string => name.toLowerCase().replace(/\s+/g, '');

function chooseClass(ofStandard: readonly LimitLine[], wanted: string, standard: string) {
  if (ofStandard.every((line) => line.class === NO_CLASS)) {
    const isAsked = !['', NO_CLASS].includes(plainClass(wanted));
    return {
      ofClass: ofStandard,
      note: isAsked ? `${standard} has no classes: class ${wanted} was not used` : undefined,
    };
  }
  const plain = plainClass(wanted);
  const isNamed = (line: LimitLine) => plainClass(line.class) === plain;
  const ofClass = ofStandard.filter(
    (line) => isNamed(line) || line.classAliases?.some((alias) => plainClass(alias) === plain),
  );
  const classes = distinct(ofStandard.map((line) => line.class));
  if (ofClass.length === 0) throw inputError('class', `one of ${classes.join(', ')} for ${standard}`, wanted);
  const used = ofClass[0]!.class;
  return {
    ofClass,
    note: ofClass.some(isNamed) ? undefined : `${standard} class ${wanted}: the lines "${used}" are used`,
  };
}

function chooseSiteAndDistance(ofClass: readonly LimitLine[], request: LimitRequest) {
  const wantedKind = request.siteKind ?? 'ground-plane';
  const low = ofClass.filter((line) => rangeOf(line)[0] < ONE_GHZ);
  const high = ofClass.filter((line) => rangeOf(line)[0] >= ONE_GHZ);
  const ofKind = low.filter((line) => line.siteKind === wantedKind);
  const otherKind = low.filter((line) => line.siteKind !== wantedKind);
  const wanted = atDistance([...ofKind, ...high], request);
  if (atDistance(ofKind, request).lines.length > 0 || atDistance(otherKind, request).lines.length === 0) return wanted;
  const place = wantedKind === 'free-space' ? 'a site without reflections' : 'a site with a ground plane';
  return {
    ...atDistance([...otherKind, ...high], request),
    note: `no limits below 1 GHz for ${place} at ${request.distanceM} m: those of the other kind of site are used`,
  };
}

interface Choice {
  readonly lines: readonly LimitLine[];
  readonly converted: readonly (ReturnType<typeof convertLine> & { readonly fromM: number })[];
  readonly note?: string;
}

/** The lines of the distance; with conversion, what they leave open is filled from the nearest distance outwards. */
function atDistance(candidates: readonly LimitLine[], { distanceM, convertDistance }: LimitRequest): Choice {
  const lines = candidates.filter((line) => isAtDistance(line, distanceM));
  const converted: Choice['converted'][number][] = [];
  if (!convertDistance) return { lines, converted };
  const others = candidates.filter((line) => !isAtDistance(line, distanceM));
  const ratio = (fromM: number) => Math.abs(Math.log(fromM / distanceM));
  for (const fromM of distinct(others.map((line) => line.distanceM)).sort((a, b) => ratio(a) - ratio(b))) {
    const moves = others
      .filter((line) => line.distanceM === fromM && !lines.some((chosen) => overlaps(chosen, line)))
      .map((line) => ({ ...convertLine(line, distanceM), fromM }));
    converted.push(...moves);
    lines.push(...moves.map((move) => move.line));
  }
  return { lines, converted };
}

/** Two lines of one detector share more than an edge. */
function overlaps(a: LimitLine, b: LimitLine): boolean {
  const [[aFromHz, aToHz], [bFromHz, bToHz]] = [rangeOf(a), rangeOf(b)];
  return a.detector === b.detector && Math.max(aFromHz, bFromHz) < Math.min(aToHz, bToHz);
}

/** Lines of another distance that reach where none of this distance does. */
function uncoveredNote(
  ofClass: readonly LimitLine[],
  chosen: readonly LimitLine[],
  distanceM: number,
): string | undefined {
  const missing = ofClass.filter((line) => !chosen.some((other) => overlaps(other, line)));
  if (missing.length === 0) return undefined;
  const what = missing.map((line) => `${rangeText(line)} (${line.distanceM} m)`).join(', ');
  return `not judged, no line at ${distanceM} m: ${what}; --convert-distance moves them`;
}

function weakest(lines: readonly LimitLine[]): LimitSet['sourceStatus'] {
  const statuses = distinct(lines.map((line) => line.sourceStatus));
  return statuses.length === 1 ? statuses[0]! : 'partly from memory';
}

const DETECTORS: readonly Detector[] = ['quasi-peak', 'average', 'peak'];

function judgedAt(lines: readonly LimitLine[], frequencyHz: number): JudgedLimit[] {
  return DETECTORS.flatMap((detector): JudgedLimit[] => {
    const limits = lines
      .filter((line) => line.detector === detector)
      .map((line) => limitOfLine(line, frequencyHz))
      .filter((limit) => limit !== undefined);
    return limits.length === 0 ? [] : [{ detector, limitDbuvPerM: Math.min(...limits) }];
  });
}
