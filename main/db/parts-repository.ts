import { joinParts, type LayoutPart, splitParts } from '../../app/project/board-parts.ts';
import type { Draft } from '../../app/project/draft.ts';
import type { SourcesDocument } from '../../app/project/project-export.ts';
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

type OpeningDocument = Pick<RunDocument, 'sourceSha256' | 'openingNotes'>;

/** Keeps the parts of a document and its settings, each once. Throws `input` for what JSON cannot hold. */
export function putParts(db: WritableDb, { document, settings }: Draft): PartHashes {
  const { layout, sources } = splitParts(document.board);
  const samples = Object.entries(document.samples)
    .map(([file, columns]) => ({ file, sha256: putDocument(db, 'samples', columns) }))
    .sort((one, other) => (one.file < other.file ? -1 : 1));
  const { sourceSha256, openingNotes } = document;
  return {
    layout: putDocument(db, 'layout', layout),
    // The samples' hashes belong to it: other samples under the same name are other sources.
    sources: putSources(db, { sources, samples }),
    opening: putDocument(db, 'opening', { sourceSha256, openingNotes } satisfies OpeningDocument),
    settings: putDocument(db, 'settings', settings),
  };
}

/** Keeps sources with the links to their waveform files; returns their hash. */
export function putSources(db: WritableDb, document: SourcesDocument): string {
  const sources = putDocument(db, 'sources', document);
  const link = db.prepare('INSERT OR IGNORE INTO sources_samples (sources, file, samples) VALUES (?, ?, ?)');
  for (const { file, sha256 } of document.samples) link.run(sources, toColumn(file), sha256);
  return sources;
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
