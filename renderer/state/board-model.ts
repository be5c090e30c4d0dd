import type { Board } from '../../app/board/board.ts';
import { toBoard } from '../../app/board/to-board.ts';
import type { BoardBase } from '../../app/contract/documents.ts';
import { sourcesPartSchema } from '../../app/contract/documents.ts';
import { AppError } from '../../app/errors.ts';
import { joinParts, type SourcesPart } from '../../app/project/board-parts.ts';
import { findProblems, type Problem } from '../../app/schema/parse-with.ts';

/** The board in SI units as the views draw it, and what is wrong with the document it comes from. */
export interface BoardModel {
  /** The newest state that made sense: while a source is half typed, the one before. */
  readonly board: Board;
  /** What the program chose by itself (pins …). */
  readonly notes: readonly string[];
  /** Empty: the document can be estimated. Paths as in a sources file (`drives[2].waveform`). */
  readonly problems: readonly Problem[];
}

/**
 * Derives the model. Copper of the same base keeps its identity (`nets`, `planes`, `stackup`, `outlineM`), so that whatever
 * is indexed over it stays valid while sources change. Throws `input` when the base alone makes no board.
 */
export function boardModel(
  base: BoardBase,
  sources: SourcesPart,
  before: { readonly base: BoardBase; readonly model: BoardModel } | null,
): BoardModel {
  const known = before?.base === base ? before.model : null;
  const problems = findProblems(sourcesPartSchema, sources);
  const made = problems.length === 0 ? attempt(base, sources) : problems;
  if ('board' in made) {
    return { board: withCopperOf(known?.board, made.board), notes: made.notes, problems: [] };
  }
  if (known !== null) return { ...known, problems: made };
  return { ...toBoard(joinParts(base.layout, {})), problems: made };
}

function attempt(base: BoardBase, sources: SourcesPart): ReturnType<typeof toBoard> | Problem[] {
  try {
    return toBoard(joinParts(base.layout, sources), { samples: new Map(Object.entries(base.samples)) });
  } catch (error) {
    if (error instanceof AppError && error.code === 'input') return [{ path: error.path ?? '', text: error.message }];
    throw error;
  }
}

function withCopperOf(known: Board | undefined, board: Board): Board {
  if (known === undefined) return board;
  const { nets, planes, stackup, outlineM } = known;
  return { ...board, nets, planes, stackup, outlineM };
}
