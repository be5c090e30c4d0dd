import { parseWith } from '../schema/parse-with.ts';
import { type BoardFile, boardFileSchema, type SourcesFile, sourcesFileSchema } from './board-file.ts';

export { mergeSources } from './merge-sources.ts';
export { toBoard } from './to-board.ts';

/** A board file's JSON, checked. Throws `input`: path in the file, what must be, what came. */
export const parseBoardFile = (json: unknown): BoardFile => parseWith(boardFileSchema, json);

/** A sources file's JSON, checked. Throws `input`: path in the file, what must be, what came. */
export const parseSourcesFile = (json: unknown): SourcesFile => parseWith(sourcesFileSchema, json);
