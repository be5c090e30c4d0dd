import { type TrendPart, trendPartOf } from '../../app/compare/trend-run.ts';
import { AppError, inputError } from '../../app/errors.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import {
  type ExportHead,
  type ExportItem,
  type ExportList,
  exportItemSchemas,
  exportOutlineSchema,
  type SourcesDocument,
} from '../../app/project/project-export.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import { parseWith } from '../../app/schema/parse-with.ts';
import { readJsonLists } from '../files/json-lists.ts';
import type { WritableDb } from './database.ts';
import { DOCUMENT_TABLES, type DocumentTable, getDocument, putDocument } from './documents-repository.ts';
import { putDraftRow } from './draft-repository.ts';
import { insertProject } from './info-repository.ts';
import { insertMeasurement } from './measurements-repository.ts';
import { type PartHashes, putSources } from './parts-repository.ts';
import { insertRunEntry, type SummaryColumns, summaryColumns } from './runs-repository.ts';
import { putUiState } from './ui-state-repository.ts';

const PARTS = ['layout', 'sources', 'opening', 'settings'] as const;

/**
 * Fills a new project's tables from a project's export, entry by entry in any order. Everything is checked: shapes, hashes,
 * numbers, that what is named is there. Throws `input` with the place in the file.
 */
class ProjectImporter {
  readonly #db: WritableDb;
  readonly #counts = new Map<ExportList, number>();
  /** Documents that came, as `table sha256`. */
  readonly #documents = new Set<string>();
  readonly #summaries = new Map<string, SummaryColumns>();
  readonly #runs = new Map<number, ExportItem<'runs'>>();
  readonly #measurements = new Set<number>();

  constructor(db: WritableDb) {
    this.#db = db;
  }

  /** One entry of a list. */
  add(list: ExportList, item: unknown): void {
    const index = this.#counts.get(list) ?? 0;
    this.#counts.set(list, index + 1);
    const place = `${list}[${index}]`;
    inPlace(place, () => parseWith(exportItemSchemas[list], item));
    switch (list) {
      case 'runs': {
        const run = item as ExportItem<'runs'>;
        if (this.#runs.has(run.run)) throw inputError(`${place}.run`, 'a number that no other run has', run.run);
        this.#runs.set(run.run, run);
        return;
      }
      case 'measurements': {
        const measurement = item as ExportItem<'measurements'>;
        const { id } = measurement;
        if (this.#measurements.has(id)) throw inputError(`${place}.id`, 'a number that no other measurement has', id);
        this.#measurements.add(id);
        insertMeasurement(this.#db, measurement);
        return;
      }
      case 'uiState': {
        const { key, value } = item as ExportItem<'uiState'>;
        putUiState(this.#db, key, value);
        return;
      }
      default:
        this.#addDocument(list, item as { sha256: string; document: unknown }, place);
    }
  }

  #addDocument(
    list: `documents.${DocumentTable}`,
    { sha256, document }: { sha256: string; document: unknown },
    place: string,
  ): void {
    const table = list.slice('documents.'.length) as DocumentTable;
    const found =
      table === 'sources' ? putSources(this.#db, document as SourcesDocument) : putDocument(this.#db, table, document);
    if (found !== sha256) throw inputError(`${place}.sha256`, `${found}, as the document is (it was changed)`, sha256);
    this.#documents.add(`${table} ${sha256}`);
    if (table === 'result') this.#summaries.set(sha256, summaryColumns(document as EstimateResult));
  }

  /** After the last entry: the whole file, whose lists are not looked at again. */
  finish(json: unknown, writtenBy: string): void {
    const { draft, ...head } = parseWith(exportOutlineSchema, json);
    const { name, createdAt, createdBy, lastRun, lastMeasurement } = head;
    insertProject(this.#db, { name, createdAt, createdBy, writtenBy, lastRun, lastMeasurement });
    for (const [i, run] of [...this.#runs.values()].entries()) {
      this.#refuseMissing(run, `runs[${i}]`);
      const summary = this.#summaries.get(run.result);
      if (summary === undefined) throw missing(`runs[${i}].result`, run.result);
      insertRunEntry(this.#db, run, summary, this.#trendPart(run));
    }
    refuseBelow('lastRun', lastRun, this.#runs.keys());
    refuseBelow('lastMeasurement', lastMeasurement, this.#measurements);
    this.#finishDraft(draft);
    this.#refuseUnlinked();
  }

  /** Not in the export, as it follows from settings and result; these are both here by now. */
  #trendPart({ settings, result }: ExportItem<'runs'>): TrendPart {
    return trendPartOf({
      settings: getDocument(this.#db, 'settings', settings) as RunSettings,
      result: getDocument(this.#db, 'result', result) as EstimateResult,
    });
  }

  #finishDraft(draft: ExportHead['draft']): void {
    if (draft === null) return;
    this.#refuseMissing(draft, 'draft');
    putDraftRow(this.#db, draft);
  }

  #refuseMissing(hashes: PartHashes, place: string): void {
    for (const part of PARTS) {
      if (!this.#documents.has(`${part} ${hashes[part]}`)) throw missing(`${place}.${part}`, hashes[part]);
    }
  }

  /** Waveform files that sources name. */
  #refuseUnlinked(): void {
    const unlinked = this.#db
      .prepare<[], string>('SELECT samples FROM sources_samples WHERE samples NOT IN (SELECT sha256 FROM samples)')
      .pluck()
      .get();
    if (unlinked !== undefined) throw missing('documents.sources', unlinked);
  }
}

const missing = (place: string, sha256: string): AppError =>
  inputError(place, 'the hash of a document of this file', sha256);

function refuseBelow(place: string, last: number, numbers: Iterable<number>): void {
  let most = 0;
  for (const number of numbers) most = Math.max(most, number);
  if (last < most) throw inputError(place, `at least ${most}, the highest number in use`, last);
}

/** Fills a new project's tables from an export that is in memory. Throws `input`. */
export function importObject(db: WritableDb, json: unknown, writtenBy: string): void {
  const { documents, runs, measurements, uiState } = parseWith(exportOutlineSchema, json);
  const importer = new ProjectImporter(db);
  for (const table of DOCUMENT_TABLES) for (const item of documents[table]) importer.add(`documents.${table}`, item);
  for (const item of runs) importer.add('runs', item);
  for (const item of measurements) importer.add('measurements', item);
  for (const item of uiState) importer.add('uiState', item);
  importer.finish(json, writtenBy);
}

/** The same from a file of any size. Throws `file` and `input`. */
export function importFile(db: WritableDb, file: string, writtenBy: string): void {
  const importer = new ProjectImporter(db);
  const rest = readJsonLists(file, LISTS, (place, item) => importer.add(place as ExportList, item));
  importer.finish(rest, writtenBy);
}

const LISTS: ReadonlySet<string> = new Set(Object.keys(exportItemSchemas));

/** An error's place inside an entry becomes its place in the file. */
function inPlace(place: string, step: () => void): void {
  try {
    step();
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    throw new AppError(error.code, `${place}: ${error.message}`, `${place}.${error.path ?? ''}`, { cause: error });
  }
}
