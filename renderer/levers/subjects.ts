import type { ResultPoint } from '../../app/estimate/result.ts';
import type { SourcesPart } from '../../app/project/board-parts.ts';
import type { Subject } from './quick-lever.ts';

export interface RankedSubject extends Subject {
  /** Its own level under the limit, dB: what the margin would be if it were alone. Infinity: it makes none of these lines. */
  readonly ownMarginDb: number;
  readonly frequencyHz: number | null;
}

/**
 * Nets and loops by how near the limit each would come by itself: at one line, or over all of them. Those that are driven
 * but make no line come last, by name.
 */
export function rankedSubjects(
  points: readonly ResultPoint[],
  lineHz: number | null,
  sources: SourcesPart,
): RankedSubject[] {
  const found = new Map<string, RankedSubject>();
  const keyOf = ({ kind, name }: Subject) => `${kind} ${name}`;
  const isThere = points.some(({ frequencyHz }) => frequencyHz === lineHz);
  for (const { frequencyHz, limitDbuvPerM, contributors } of points) {
    if (isThere && frequencyHz !== lineHz) continue;
    for (const { kind, name, levelDbuvPerM } of contributors) {
      if (kind === 'cable') continue;
      const ownMarginDb = limitDbuvPerM - levelDbuvPerM;
      const subject = { kind, name, ownMarginDb, frequencyHz };
      if (ownMarginDb < (found.get(keyOf(subject))?.ownMarginDb ?? Infinity)) found.set(keyOf(subject), subject);
    }
  }
  const driven: Subject[] = [
    ...(sources.drives ?? []).map(({ net }): Subject => ({ kind: 'net', name: net })),
    ...(sources.loops ?? []).map(({ name }): Subject => ({ kind: 'loop', name })),
  ];
  const all = new Map<string, RankedSubject>();
  for (const subject of driven) {
    const silent = { ...subject, ownMarginDb: Infinity, frequencyHz: null };
    all.set(keyOf(subject), found.get(keyOf(subject)) ?? silent);
  }
  return [...all.values()].sort((one, other) =>
    one.ownMarginDb === other.ownMarginDb ? (one.name < other.name ? -1 : 1) : one.ownMarginDb - other.ownMarginDb,
  );
}
