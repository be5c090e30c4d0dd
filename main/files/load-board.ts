import { dirname, isAbsolute, join } from 'node:path';
import type { Board } from '../../app/board/board.ts';
import type { BoardFile } from '../../app/board/board-file.ts';
import type { SampleColumns } from '../../app/board/convert-waveforms.ts';
import type { ImportSummary } from '../../app/board/import-summary.ts';
import { mergeSources, parseBoardFile, parseSourcesFile, toBoard } from '../../app/board/parse-board.ts';
import { AppError, describe } from '../../app/errors.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import { readCsvWaveform } from './csv-waveform.ts';
import { type ImportOptions, importBoard } from './import-board.ts';
import { inFile } from './in-file.ts';
import { isJsonFile, readJson, sha256OfFile } from './read-text.ts';

export interface LoadedBoard {
  readonly document: RunDocument;
  readonly board: Board;
  /** What the program chose or read on the way. */
  readonly notes: readonly string[];
}

/**
 * A board ready for work: a board file or a layout in an open format (told by its content), with the sources file
 * merged in and waveform files read. Waveform files are looked for beside the board, then beside the sources file.
 * Throws `file` and `input`, each with the file's name.
 */
export async function loadBoard(boardPath: string, sourcesPath?: string): Promise<LoadedBoard> {
  const opened = await openBoard(boardPath);
  const notes = [...opened.notes];
  let file = opened.file;
  if (sourcesPath !== undefined) {
    const { json, sha256 } = await readJson(sourcesPath);
    file = inFile(sourcesPath, () => mergeSources(opened.file, parseSourcesFile(json)));
    notes.push(`Sources from ${describe(sourcesPath)} (SHA-256 ${sha256}).`);
  }
  const folders = [dirname(boardPath), ...(sourcesPath === undefined ? [] : [dirname(sourcesPath)])];
  const samples = await readSamples(file, folders);
  const places = sourcesPath === undefined ? boardPath : `${boardPath} with ${sourcesPath}`;
  const converted = inFile(places, () => toBoard(file, { samples }));
  const document: RunDocument = {
    board: file,
    samples: Object.fromEntries(samples),
    sourceSha256: opened.sha256,
    openingNotes: notes,
  };
  return { document, board: converted.board, notes: [...notes, ...converted.notes] };
}

export interface OpenedBoard {
  readonly file: BoardFile;
  readonly notes: readonly string[];
  /** Of the file's bytes. */
  readonly sha256: string;
  /** Absent for board files. */
  readonly summary?: ImportSummary;
}

/** A board file or a layout in an open format, told by its content. Throws `file` and `input` with the file's name. */
export async function openBoard(path: string, options: ImportOptions = {}): Promise<OpenedBoard> {
  if (await isJsonFile(path)) {
    const { json, sha256 } = await readJson(path);
    return { file: inFile(path, () => parseBoardFile(json)), notes: [], sha256 };
  }
  const { board, summary } = await importBoard(path, options);
  const notes = summary.findings.map(({ message }) => `Import: ${message}`);
  return { file: inFile(path, () => parseBoardFile(board)), notes, sha256: await sha256OfFile(path), summary };
}

async function readSamples(file: BoardFile, folders: readonly string[]): Promise<Map<string, SampleColumns>> {
  const samples = new Map<string, SampleColumns>();
  for (const [i, waveform] of (file.waveforms ?? []).entries()) {
    if (waveform.kind !== 'samples' || samples.has(waveform.file)) continue;
    if (isAbsolute(waveform.file)) {
      const text = `waveforms[${i}].file must be a path relative to the board file; received ${describe(waveform.file)}`;
      throw new AppError('input', text, `waveforms[${i}].file`);
    }
    samples.set(waveform.file, await readFirst(folders.map((folder) => join(folder, waveform.file))));
  }
  return samples;
}

/** The first of the files that is there; the last one's failure when none is. */
async function readFirst(files: readonly string[]): Promise<SampleColumns> {
  const [file, ...others] = files;
  try {
    return await readCsvWaveform(file!);
  } catch (error) {
    if (others.length === 0 || !isAbsent(error)) throw error;
    return readFirst(others);
  }
}

const isAbsent = (error: unknown): boolean =>
  error instanceof AppError && (error.cause as NodeJS.ErrnoException | undefined)?.code === 'ENOENT';
