import type { BoardFile } from '../../app/board/board-file.ts';
import type { SampleColumns } from '../../app/board/convert-waveforms.ts';
import type { ImportSummary } from '../../app/board/import-summary.ts';
import { mergeSources, parseSourcesFile, toBoard } from '../../app/board/parse-board.ts';
import { AppError, describe, fileError } from '../../app/errors.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import { readCsvWaveform } from './csv-waveform.ts';
import type { ImportOptions } from './import-board.ts';
import { inFile } from './in-file.ts';
import { type OpenedBoard, openBoard } from './load-board.ts';
import { isJsonFile, readBeginning, readJson } from './read-text.ts';
import { encodingOf, isArchive, rootElementName } from './sniff.ts';

/** A file and what its owner calls it: messages use the name. */
export interface NamedFile {
  readonly path: string;
  readonly name: string;
}

export interface OpenedFiles {
  readonly document: RunDocument;
  /** Absent for board files. */
  readonly summary?: ImportSummary;
}

type Content =
  | ({ readonly kind: 'board' } & OpenedBoard)
  | { readonly kind: 'sources'; readonly json: unknown; readonly sha256: string }
  | { readonly kind: 'table'; readonly samples: SampleColumns };

/**
 * Files given together, each told by its content: at most one board (board file or layout), sources files and waveform
 * tables. Without a board among them they are added to the document `onto`. Throws `file` and `input` with the file's name.
 */
export async function openFiles(
  files: readonly NamedFile[],
  onto?: RunDocument,
  options: ImportOptions = {},
): Promise<OpenedFiles> {
  const contents: (Content & { readonly name: string })[] = [];
  for (const file of files)
    contents.push({ ...(await named(file, () => readContent(file, options))), name: file.name });
  const boards = contents.filter((content) => content.kind === 'board');
  if (boards.length > 1) {
    const names = boards.map(({ name }) => name).join(', ');
    throw new AppError('input', `one board is opened at a time; received ${boards.length}: ${names}`);
  }
  const [given] = boards;
  const start = given ?? openedBefore(onto);
  let board = start.file;
  const notes = [...start.notes];
  for (const content of contents) {
    if (content.kind !== 'sources') continue;
    board = inFile(content.name, () => mergeSources(board, parseSourcesFile(content.json)));
    notes.push(`Sources from ${describe(content.name)} (SHA-256 ${content.sha256}).`);
  }
  const samples = new Map(given ? [] : Object.entries(onto!.samples));
  for (const content of contents) {
    if (content.kind === 'table') samples.set(waveformFileOf(board, content.name), content.samples);
  }
  requireSamples(board, samples);
  const document: RunDocument = {
    board,
    samples: Object.fromEntries(samples),
    sourceSha256: start.sha256,
    openingNotes: notes,
  };
  // What cannot be modelled is refused here, where the file is known.
  inFile(files.map(({ name }) => name).join(', '), () => toBoard(board, { samples }));
  return { document, ...(start.summary && { summary: start.summary }) };
}

function openedBefore(onto: RunDocument | undefined): OpenedBoard {
  if (onto === undefined) {
    throw new AppError('input', 'open a board first: a board file, or a layout in an open format (IPC-2581)');
  }
  return { file: onto.board, sha256: onto.sourceSha256, notes: onto.openingNotes };
}

async function readContent(file: NamedFile, options: ImportOptions): Promise<Content> {
  if (await isJsonFile(file.path)) {
    const { json, sha256 } = await readJson(file.path);
    if ((json as { format?: unknown } | null)?.format === 'quietboard-sources')
      return { kind: 'sources', json, sha256 };
  } else if (await looksLikeTable(file)) {
    return { kind: 'table', samples: await readCsvWaveform(file.path) };
  }
  return { kind: 'board', ...(await openBoard(file.path, options)) };
}

const TABLE_NAME = /\.(?:csv|tsv|txt|dat)$/i;

/** A text of another kind than XML, named like a table. */
async function looksLikeTable({ path, name }: NamedFile): Promise<boolean> {
  if (!TABLE_NAME.test(name)) return false;
  const head = await readBeginning(path);
  const encoding = encodingOf(head);
  return (
    !isArchive(head) && encoding !== undefined && rootElementName(new TextDecoder(encoding).decode(head)) === undefined
  );
}

/** The text by which the board's waveforms name a table: the same, or one that ends in it; else the table's own name. */
function waveformFileOf(board: BoardFile, name: string): string {
  const files = (board.waveforms ?? []).flatMap((waveform) => (waveform.kind === 'samples' ? [waveform.file] : []));
  return files.find((file) => file === name) ?? files.find((file) => file.split(/[/\\]/).at(-1) === name) ?? name;
}

function requireSamples(board: BoardFile, samples: ReadonlyMap<string, unknown>): void {
  for (const waveform of board.waveforms ?? []) {
    if (waveform.kind !== 'samples' || samples.has(waveform.file)) continue;
    throw fileError(
      waveform.file,
      `is needed by the waveform ${describe(waveform.name)}: open it together with the board and its sources`,
    );
  }
}

/** Runs a step on a file; its failure then has the file's name in place of the path it lies at. */
async function named<T>(file: NamedFile, step: () => Promise<T>): Promise<T> {
  try {
    return await step();
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    const rename = (text: string) => text.replaceAll(file.path, file.name);
    throw new AppError(error.code, rename(error.message), error.path && rename(error.path), { cause: error });
  }
}
