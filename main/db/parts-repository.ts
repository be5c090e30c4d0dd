import { joinParts, type LayoutPart, type SourcesPart, splitParts } from '../../app/project/board-parts.ts';
import type { Draft } from '../../app/project/draft.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import type { ReadableDb, WritableDb } from './database.ts';
import { getDocument, putDocument } from './documents-repository.ts';
import { toColumn } from './text-column.ts';

/** Hashes of what a run or draft is made of. */
export interface PartHashes {
  readonly layout: string;
  readonly sources: string;
  readonly opening: string;
  readonly settings: string;
}

/** The sources with the waveform files they name, by hash: other samples under the same name are other sources. */
interface SourcesDocument {
  readonly sources: SourcesPart;
  readonly samples: readonly { readonly file: string; readonly sha256: string }[];
}

type OpeningDocument = Pick<RunDocument, 'sourceSha256' | 'openingNotes'>;

/** Keeps the parts of a document and its settings, each once. Throws `input` for what JSON cannot hold. */
export function putParts(db: WritableDb, { document, settings }: Draft): PartHashes {
  const { layout, sources } = splitParts(document.board);
  const samples = Object.entries(document.samples)
    .map(([file, columns]) => ({ file, sha256: putDocument(db, 'samples', columns) }))
    .sort((one, other) => (one.file < other.file ? -1 : 1));
  const sourcesDocument: SourcesDocument = { sources, samples };
  const sourcesSha256 = putDocument(db, 'sources', sourcesDocument);
  const link = db.prepare('INSERT OR IGNORE INTO sources_samples (sources, file, samples) VALUES (?, ?, ?)');
  for (const { file, sha256 } of samples) link.run(sourcesSha256, toColumn(file), sha256);
  const { sourceSha256, openingNotes } = document;
  return {
    layout: putDocument(db, 'layout', layout),
    sources: sourcesSha256,
    opening: putDocument(db, 'opening', { sourceSha256, openingNotes } satisfies OpeningDocument),
    settings: putDocument(db, 'settings', settings),
  };
}

/** Throws `DamagedDocument`. */
export function getParts(db: ReadableDb, hashes: PartHashes): Draft {
  const layout = getDocument(db, 'layout', hashes.layout) as LayoutPart;
  const { sources, samples } = getDocument(db, 'sources', hashes.sources) as SourcesDocument;
  const opening = getDocument(db, 'opening', hashes.opening) as OpeningDocument;
  const columns = samples.map(({ file, sha256 }) => [file, getDocument(db, 'samples', sha256)] as const);
  return {
    document: {
      board: joinParts(layout, sources),
      samples: Object.fromEntries(columns) as RunDocument['samples'],
      ...opening,
    },
    settings: getDocument(db, 'settings', hashes.settings) as RunSettings,
  };
}
