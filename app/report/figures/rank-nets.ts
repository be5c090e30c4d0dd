import type { Board, Net } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';

/** Driven nets of the board, the one that comes nearest to (or farthest over) a limit by itself first; ties by name. */
export function rankDrivenNets(board: Board, result: EstimateResult): Net[] {
  const excessDb = new Map<string, number>();
  for (const { contributors, limitDbuvPerM } of result.points) {
    for (const { kind, name, levelDbuvPerM } of contributors) {
      if (kind === 'net') excessDb.set(name, Math.max(excessDb.get(name) ?? -Infinity, levelDbuvPerM - limitDbuvPerM));
    }
  }
  const driven = new Set(board.drives.map(({ net }) => net));
  const excessOf = ({ name }: Net) => excessDb.get(name) ?? -Infinity;
  return board.nets
    .filter(({ name }) => driven.has(name))
    .sort((one, other) => {
      const [first, second] = [excessOf(one), excessOf(other)];
      return first === second ? (one.name < other.name ? -1 : 1) : second - first;
    });
}
