import { exactJson } from '../../app/project/exact-json.ts';
import type { ExportHead, ExportItem } from '../../app/project/project-export.ts';
import type { ReadableDb } from './database.ts';
import { DOCUMENT_TABLES, documentSha256s, getDocument } from './documents-repository.ts';
import { draftRow } from './draft-repository.ts';
import { getProject } from './info-repository.ts';
import { listMeasurements } from './measurements-repository.ts';
import { listRunEntries } from './runs-repository.ts';
import { listUiState } from './ui-state-repository.ts';

/**
 * The whole project as JSON text, piece by piece (a large project is longer than the engine's longest text): the same
 * content gives the same text. Numbers are exact. Throws `DamagedDocument`.
 */
export function exportProject(db: ReadableDb, write: (text: string) => void): void {
  const { lastRun, lastMeasurement, ...project } = getProject(db);
  const head: ExportHead = {
    format: 'quietboard-project',
    version: 1,
    name: project.name,
    createdAt: project.createdAt,
    createdBy: project.createdBy,
    lastRun,
    lastMeasurement,
    draft: draftRow(db) ?? null,
  };
  write(`${exactJson(head).slice(0, -1)},\n"documents":{`);
  for (const [i, table] of DOCUMENT_TABLES.entries()) {
    const sha256s = documentSha256s(db, table);
    write(i === 0 ? '\n' : ',\n');
    writeList(
      write,
      table,
      items(sha256s, (sha256) => ({ sha256, document: getDocument(db, table, sha256) })),
    );
  }
  write('},\n');
  writeList(write, 'runs', listRunEntries(db) satisfies readonly ExportItem<'runs'>[]);
  write(',\n');
  writeList(write, 'measurements', listMeasurements(db));
  write(',\n');
  writeList(write, 'uiState', listUiState(db));
  write('}\n');
}

/** One entry at a time in memory. */
function* items(sha256s: readonly string[], load: (sha256: string) => unknown): Generator<unknown> {
  for (const sha256 of sha256s) yield load(sha256);
}

/** One entry a line. */
function writeList(write: (text: string) => void, name: string, list: Iterable<unknown>): void {
  write(`"${name}":[`);
  let separator = '\n';
  for (const item of list) {
    write(`${separator}${exactJson(item)}`);
    separator = ',\n';
  }
  write(']');
}
