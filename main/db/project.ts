import { basename } from 'node:path';
import type { TrendRun } from '../../app/compare/types.ts';
import { AppError, fileError, inputError } from '../../app/errors.ts';
import type { Draft, StoredDraft } from '../../app/project/draft.ts';
import { type Measurement, type MeasurementInput, measurementInputSchema } from '../../app/project/measurement.ts';
import type { ProjectExport } from '../../app/project/project-export.ts';
import type { DoctorReport, ProjectInfo, RevisionSummary } from '../../app/project/project-info.ts';
import type { RunSummary, StoredRun } from '../../app/project/stored-run.ts';
import { parseWith } from '../../app/schema/parse-with.ts';
import { programVersion } from '../cli/version.ts';
import { inFile } from '../files/in-file.ts';
import { ProjectConnection } from './connection.ts';
import { createProjectFile } from './create-project-file.ts';
import type { WritableDb } from './database.ts';
import { examine } from './doctor.ts';
import { draftVersion, getDraft, putDraft } from './draft-repository.ts';
import { exportProject } from './export-project.ts';
import { importFile, importObject } from './import-project.ts';
import { getInfo, insertProject, nextNumber, updateName, updateWriter } from './info-repository.ts';
import { insertMeasurement, listMeasurements, removeMeasurement } from './measurements-repository.ts';
import type { MigrationReport } from './migrate.ts';
import { migrations } from './migrations/migrations.ts';
import { writeBarrier } from './open-database.ts';
import { targetOf } from './place-file.ts';
import { readProjectHeader } from './project-header.ts';
import { type IfThere, putProjectFile } from './replace-file.ts';
import { listRevisions } from './revisions-repository.ts';
import {
  getRun,
  insertRun,
  listRuns,
  listTrendRuns,
  type NewRun,
  type RunFilter,
  removeRun,
  runNumbers,
  updateNote,
} from './runs-repository.ts';
import { getStatistics } from './statistics-repository.ts';
import { getUiState, putUiState } from './ui-state-repository.ts';

export interface OpenOptions {
  /** Make the project when the file is absent. */
  readonly create?: boolean;
  /** Never write to the file; works where the file or its folder cannot be written, too. */
  readonly readOnly?: boolean;
  /** How long to wait for another program that is writing. */
  readonly busyTimeoutMs?: number;
}

const BUSY_TIMEOUT_MS = 5000;
const MOST_NAME = 200;
const MOST_NOTE = 10_000;

/**
 * A project file: every run with its documents and result, measured data, the state of the window. Several programs may
 * have it open at once. Every method is one transaction: done whole or not at all, on the disk when it returns.
 * All throw `file` (damaged, full, read-only …) and `busy`; those that write throw `file` when opened for reading only.
 */
export class Project {
  readonly #connection: ProjectConnection;

  private constructor(connection: ProjectConnection) {
    this.#connection = connection;
  }

  /** Throws `file` for what is no project or cannot be opened, `newer-project`, `busy`: the file is then as it was. */
  static open(
    file: string,
    { create = false, readOnly = false, busyTimeoutMs = BUSY_TIMEOUT_MS }: OpenOptions = {},
  ): Project {
    if (create && readProjectHeader(file) === undefined)
      createProjectFile(file, (db) => insertProject(db, newProject(file)));
    return new Project(new ProjectConnection(file, { readOnly, busyTimeoutMs, migrations }));
  }

  /**
   * Finds out whether a run can be kept in a file, before the work: throws as `open` would. What is not there is not made yet.
   */
  static requireWritable(file: string): void {
    if (readProjectHeader(file) === undefined) targetOf(file);
    else Project.open(file).close();
  }

  /** Throws `input` for a note that no run may have. */
  static requireNote(note: string): void {
    refuseLength('note', note, 0, MOST_NOTE);
  }

  /** Whether an existing file and its folder let a project be written. */
  static canWrite(file: string): boolean {
    return writeBarrier(file) === undefined;
  }

  get file(): string {
    return this.#connection.file;
  }

  get isReadOnly(): boolean {
    return this.#connection.isReadOnly;
  }

  /** What opening changed in a file of an earlier version, and where the copy is. */
  get migration(): MigrationReport | undefined {
    return this.#connection.migration;
  }

  /** Leaves the project as one file, unless another program still has it open. */
  close(): void {
    this.#connection.close();
  }

  /** Another number than before once another program has written: what was read may be out of date. */
  dataVersion(): number {
    return this.#connection.dataVersion();
  }

  info(): ProjectInfo {
    return this.#connection.read(getInfo);
  }

  setName(name: string): void {
    refuseLength('name', name, 1, MOST_NAME);
    this.#write((db) => updateName(db, name));
  }

  /** Keeps a run; returns its number. Throws `input` for a document that JSON cannot hold. */
  addRun(run: NewRun): number {
    Project.requireNote(run.note ?? '');
    return this.#write((db) => {
      const number = nextNumber(db, 'run');
      insertRun(db, number, run);
      return number;
    });
  }

  /** Newest first. */
  runs(filter: RunFilter = {}): RunSummary[] {
    return this.#connection.read((db) => listRuns(db, filter));
  }

  /** What `trendOf` needs of every run; no result is unpacked. */
  trendRuns(): TrendRun[] {
    return this.#connection.read(listTrendRuns);
  }

  /** Throws `input` that names the runs there are. */
  run(run: number): StoredRun {
    return this.#connection.read((db) => getRun(db, run) ?? refuseRun(run, runNumbers(db)));
  }

  setNote(run: number, note: string): void {
    Project.requireNote(note);
    this.#write((db) => updateNote(db, run, note) || refuseRun(run, runNumbers(db)));
  }

  /** With the documents that no other run names. Its number is not given again. */
  deleteRun(run: number): void {
    this.#write((db) => removeRun(db, run) || refuseRun(run, runNumbers(db)));
  }

  /** One for each board, revision and layout, by first run. */
  revisions(): RevisionSummary[] {
    return this.#connection.read(listRevisions);
  }

  /** Throws `input` for wrong data. */
  addMeasurement(input: MeasurementInput): Measurement {
    const data = parseWith(measurementInputSchema, input);
    return this.#write((db) => {
      const measurement: Measurement = { id: nextNumber(db, 'measurement'), ...data };
      insertMeasurement(db, measurement);
      return measurement;
    });
  }

  /** In the order they were added. */
  measurements(): Measurement[] {
    return this.#connection.read(listMeasurements);
  }

  deleteMeasurement(id: number): void {
    this.#write((db) => {
      if (removeMeasurement(db, id)) return;
      throw inputError(
        'measurement',
        `one of ${
          listMeasurements(db)
            .map((one) => one.id)
            .join(', ') || 'none'
        }`,
        id,
      );
    });
  }

  /** State of the window that goes with the project; undefined for a key that was never put. */
  uiState(key: string): unknown {
    return this.#connection.read((db) => getUiState(db, key));
  }

  /** `undefined` removes the key. Throws `input` for what JSON cannot hold. */
  putUiState(key: string, value: unknown): void {
    this.#write((db) => putUiState(db, key, value));
  }

  /** What was being edited; undefined before the first save. */
  draft(): StoredDraft | undefined {
    return this.#connection.read(getDraft);
  }

  /**
   * Keeps what is being edited, in place of the draft before; returns its version. `basedOn` is the version it is a change
   * of, 0 for the first: throws `busy` when another program has saved since.
   */
  saveDraft(draft: Draft, basedOn: number): number {
    return this.#write((db) => {
      const newest = draftVersion(db);
      if (newest !== basedOn) {
        const text = `${this.file}: another program has saved this draft since (version ${newest}; this change is of version ${basedOn}). Load it again before changing it`;
        throw new AppError('busy', text, this.file);
      }
      putDraft(db, { version: newest + 1, savedAt: new Date().toISOString(), ...draft });
      return newest + 1;
    });
  }

  /**
   * Copies the project as it is now, while programs go on writing to it. Of a file that is there already: `refuse` (the
   * default), `replace`, or `keep-copy`: the name of the copy is returned. Restoring is the backup's `backupTo` the project,
   * with `keep-copy`. Throws `busy` when another program has that file open.
   */
  backupTo(file: string, ifThere: IfThere = 'refuse'): Promise<string | undefined> {
    return putProjectFile(file, this.file, ifThere, (temporary) => this.#connection.copyTo(temporary));
  }

  /** The project as one JSON text (`projectExportSchema`), piece by piece: the same content gives the same text. */
  exportText(write: (text: string) => void): void {
    this.#connection.read((db) => exportProject(db, write));
  }

  /** The same as data; for projects whose text is shorter than 500 MB. */
  exportJson(): ProjectExport {
    const pieces: string[] = [];
    this.exportText((text) => pieces.push(text));
    return JSON.parse(pieces.join('')) as ProjectExport;
  }

  /** Makes a project from an export. Throws `input` with the place in it, `file` when the file is there already. */
  static importJson(file: string, json: unknown): Project {
    return Project.#make(file, (db) => importObject(db, json, programVersion()));
  }

  /** The same from an export's file, of any size. */
  static importFile(file: string, exported: string): Project {
    return Project.#make(file, (db) => importFile(db, exported, programVersion()));
  }

  /** The same in place of a project that is there: that one is kept under the name returned. */
  static restoreFile(file: string, exported: string): Promise<string | undefined> {
    return putProjectFile(file, exported, 'keep-copy', async (temporary) =>
      inFile(exported, () => Project.importFile(temporary, exported)).close(),
    );
  }

  static #make(file: string, fill: (db: WritableDb) => void): Project {
    if (readProjectHeader(file) !== undefined || !createProjectFile(file, fill)) {
      throw fileError(file, 'is there already; nothing was changed');
    }
    return Project.open(file);
  }

  /** Looks at every byte of the project; changes nothing. */
  doctor(): DoctorReport {
    const findings = this.#connection.read(examine);
    return this.#connection.read((db) => ({
      file: this.file,
      isFine: findings.every(({ isFine }) => isFine),
      findings,
      ...getStatistics(db),
    }));
  }

  #write<T>(run: (db: WritableDb) => T): T {
    return this.#connection.write((db) => {
      updateWriter(db, programVersion());
      return run(db);
    });
  }
}

/** What a new project is called until somebody names it. */
export const projectNameOf = (file: string): string =>
  basename(file)
    .replace(/\.quietboard$/i, '')
    .slice(0, MOST_NAME) || 'Project';

const newProject = (file: string) => ({
  name: projectNameOf(file),
  createdAt: new Date().toISOString(),
  createdBy: programVersion(),
  writtenBy: programVersion(),
  lastRun: 0,
  lastMeasurement: 0,
});

function refuseLength(path: string, text: string, least: number, most: number): void {
  if (text.length < least || text.length > most) {
    throw inputError(path, `a text of ${least} to ${most} characters`, `${text.length} characters`);
  }
}

function refuseRun(run: number, there: readonly number[]): never {
  throw inputError('run', there.length === 0 ? 'a stored run (there is none yet)' : `one of ${ranges(there)}`, run);
}

/** `1 to 4, 7`: numbers rise. */
function ranges(numbers: readonly number[]): string {
  const spans: [number, number][] = [];
  for (const number of numbers) {
    const span = spans.at(-1);
    if (span && span[1] === number - 1) span[1] = number;
    else spans.push([number, number]);
  }
  return spans.map(([from, to]) => (from === to ? `${from}` : `${from} to ${to}`)).join(', ');
}
