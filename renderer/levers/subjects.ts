import type { ResultPoint } from '../../app/estimate/result.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import type { Subject } from './quick-lever.ts';

export interface RankedSubject extends Subject {
  /** Its own level under the limit, dB: what the margin would be if it were alone. Infinity: it makes none of these lines. */
  readonly ownMarginDb: number;
  readonly frequencyHz: number | null;
}

/**
 * Driven nets and loops by how near the limit each would come by itself: first those with a share of the chosen line, there;
 * then the others, at the line where they come nearest. Those that make no line come last, by name.
 */
export function rankedSubjects(
  points: readonly ResultPoint[],
  lineHz: number | null,
  sources: SourcesPart,
): RankedSubject[] {
  const atLine = nearest(points.filter(({ frequencyHz }) => frequencyHz === lineHz));
  const anywhere = nearest(points);
  const driven = new Map(drivenSubjects(sources).map((subject) => [keyOf(subject), subject]));
  return [...driven]
    .map(([key, subject]) => {
      const silent = { ...subject, ownMarginDb: Infinity, frequencyHz: null };
      return { isAtLine: atLine.has(key), ranked: atLine.get(key) ?? anywhere.get(key) ?? silent };
    })
    .sort(
      (one, other) =>
        Number(other.isAtLine) - Number(one.isAtLine) ||
        order(one.ranked.ownMarginDb, other.ranked.ownMarginDb) ||
        order(one.ranked.name, other.ranked.name),
    )
    .map(({ ranked }) => ranked);
}

const keyOf = ({ kind, name }: Subject): string => `${kind} ${name}`;
const order = <T extends number | string>(one: T, other: T): number => (one < other ? -1 : one > other ? 1 : 0);

const drivenSubjects = ({ drives = [], loops = [] }: SourcesPart): Subject[] => [
  ...drives.map(({ net }): Subject => ({ kind: 'net', name: net })),
  ...loops.map(({ name }): Subject => ({ kind: 'loop', name })),
];

/** Each contributor where its own level is nearest to the limit. */
function nearest(points: readonly ResultPoint[]): Map<string, RankedSubject> {
  const found = new Map<string, RankedSubject>();
  for (const { frequencyHz, limitDbuvPerM, contributors } of points) {
    for (const { kind, name, levelDbuvPerM } of contributors) {
      if (kind === 'cable') continue;
      const subject = { kind, name, ownMarginDb: limitDbuvPerM - levelDbuvPerM, frequencyHz };
      if (subject.ownMarginDb < (found.get(keyOf(subject))?.ownMarginDb ?? Infinity))
        found.set(keyOf(subject), subject);
    }
  }
  return found;
}
