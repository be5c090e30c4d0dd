import type { BoardFileInput } from '../../../../app/board/board-file.ts';
import type { NetLength } from '../../../../app/board/import-summary.ts';
import { countPieces, countRadiusMismatches, pathLengthMm, RADIUS_MISMATCH_MM } from '../path.ts';
import type { CopperStroke } from './copper.ts';
import type { Findings } from './findings.ts';
import type { Flattener } from './flattener.ts';
import { type BoardFrame, roundMm } from './frame.ts';

export type FileTrace = NonNullable<BoardFileInput['nets'][number]['traces']>[number];

/** Used when no line of the board states a width. */
const GUESSED_WIDTH_MM = 0.2;

export interface Traces {
  readonly byNet: Map<string, FileTrace[]>;
  readonly segments: number;
  readonly arcs: number;
  readonly lengthMm: number;
  readonly netLengths: NetLength[];
}

/** Traces by net, and their counts and lengths. A line drawn in one go stays one polyline; arcs become chords. */
export function buildTraces(
  strokes: readonly CopperStroke[],
  frame: BoardFrame,
  flattener: Flattener,
  findings: Findings,
): Traces {
  const byNet = new Map<string, FileTrace[]>();
  const lengths = new Map<string, number>();
  const counts = { segments: 0, arcs: 0, zeroWidth: 0, zeroLength: 0, mismatches: 0, withoutWidth: 0 };
  const usualWidthMm = mostCommonWidth(strokes);

  for (const { layer, net, path, widthMm } of strokes) {
    if (widthMm === 0) {
      counts.zeroWidth++;
      continue;
    }
    const pieces = countPieces(path);
    counts.segments += pieces.segments;
    counts.arcs += pieces.arcs;
    counts.mismatches += countRadiusMismatches(path);
    lengths.set(net, (lengths.get(net) ?? 0) + pathLengthMm(path));
    if (widthMm === undefined) counts.withoutWidth++;
    const points = frame.polyline(flattener.exact(path));
    if (points === undefined) {
      counts.zeroLength++;
      continue;
    }
    const traces = byNet.get(net) ?? [];
    byNet.set(net, traces);
    traces.push({ layer, widthMm: roundMm(widthMm ?? usualWidthMm), pointsMm: points });
  }

  findings.add('zero-width-lines', counts.zeroWidth, `${counts.zeroWidth} copper lines of width 0 are no traces`);
  findings.add(
    'zero-length-lines',
    counts.zeroLength,
    `${counts.zeroLength} copper lines have no length and are left out`,
  );
  findings.add(
    'line-width-guessed',
    counts.withoutWidth,
    `${counts.withoutWidth} copper lines state no width: the board's most common one, ${roundMm(usualWidthMm)} mm, is a guess`,
  );
  findings.add(
    'arc-radius-mismatch',
    counts.mismatches,
    `${counts.mismatches} trace arcs miss their centre by more than ${RADIUS_MISMATCH_MM} mm: the mean radius is used`,
  );
  const netLengths = [...lengths].map(([name, lengthMm]) => ({ name, lengthMm }));
  netLengths.sort((p, q) => q.lengthMm - p.lengthMm || (p.name < q.name ? -1 : 1));
  const lengthMm = netLengths.reduce((sum, net) => sum + net.lengthMm, 0);
  return { byNet, segments: counts.segments, arcs: counts.arcs, lengthMm, netLengths };
}

function mostCommonWidth(strokes: readonly CopperStroke[]): number {
  const counts = new Map<number, number>();
  for (const { widthMm } of strokes) if (widthMm) counts.set(widthMm, (counts.get(widthMm) ?? 0) + 1);
  let best = GUESSED_WIDTH_MM;
  let most = 0;
  for (const [widthMm, count] of counts) {
    if (count > most) [best, most] = [widthMm, count];
  }
  return best;
}
