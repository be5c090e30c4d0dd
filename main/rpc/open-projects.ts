import { randomUUID } from 'node:crypto';
import { existsSync, realpathSync, rmSync } from 'node:fs';
import { resolve } from 'node:path';
import type { Output } from '../../app/contract/procedures.ts';
import { AppError } from '../../app/errors.ts';
import { Project } from '../db/project.ts';
import type { EventBus } from './event-bus.ts';

const WATCH_INTERVAL_MS = 500;

type ProjectAnswer = Output<'project.info'>['project'];

interface OpenProject {
  readonly id: string;
  readonly project: Project;
  /** Windows that have it open: the last one closes it. */
  users: number;
  /** Begun here, without a name: when it is closed empty, its file goes. */
  readonly isBegun: boolean;
  /** Of SQLite: another number after another connection has written. */
  dataVersion: number;
}

/** The projects that windows have open. A file that several of them open is one project. */
export class OpenProjects {
  readonly #events: EventBus;
  readonly #byFile = new Map<string, OpenProject>();
  readonly #byId = new Map<string, OpenProject>();
  readonly #watch: NodeJS.Timeout;

  constructor(events: EventBus) {
    this.#events = events;
    this.#watch = setInterval(() => this.#lookForChanges(), WATCH_INTERVAL_MS);
    this.#watch.unref();
  }

  /** Opens a project, for reading only where it cannot be written. Throws as `Project.open`. */
  open(file: string, create: boolean, isBegun = false): ProjectAnswer {
    const known = this.#byFile.get(realOf(file));
    if (known !== undefined) {
      known.users += 1;
      return answerOf(known);
    }
    const project = openOrRead(file, create);
    const opened: OpenProject = {
      id: randomUUID(),
      project,
      users: 1,
      isBegun,
      dataVersion: project.dataVersion(),
    };
    this.#byFile.set(realOf(file), opened);
    this.#byId.set(opened.id, opened);
    return answerOf(opened);
  }

  /** Throws `input` for an id that is not open. */
  get(projectId: string): Project {
    return this.#entry(projectId).project;
  }

  answer(projectId: string): ProjectAnswer {
    return answerOf(this.#entry(projectId));
  }

  close(projectId: string): void {
    const entry = this.#entry(projectId);
    entry.users -= 1;
    if (entry.users === 0) this.#end(entry);
  }

  closeAll(): void {
    clearInterval(this.#watch);
    for (const entry of [...this.#byId.values()]) this.#end(entry);
  }

  #entry(projectId: string): OpenProject {
    const entry = this.#byId.get(projectId);
    if (entry === undefined) throw new AppError('input', 'this project is not open: open it again', 'projectId');
    return entry;
  }

  #end(entry: OpenProject): void {
    this.#byId.delete(entry.id);
    for (const [file, other] of this.#byFile) if (other === entry) this.#byFile.delete(file);
    const { project } = entry;
    const isEmpty = entry.isBegun && project.draft() === undefined && project.runs().length === 0;
    project.close();
    if (isEmpty) rmSync(project.file, { force: true });
  }

  /** What another program changed is not known: windows look at all of it. */
  #lookForChanges(): void {
    for (const entry of this.#byId.values()) {
      const dataVersion = entry.project.dataVersion();
      if (dataVersion === entry.dataVersion) continue;
      entry.dataVersion = dataVersion;
      for (const what of ['info', 'runs', 'draft', 'measurements'] as const) {
        this.#events.publish('project.changed', { projectId: entry.id, what, clientId: null });
      }
    }
  }
}

function openOrRead(file: string, create: boolean): Project {
  return Project.open(file, { create, readOnly: existsSync(file) && !Project.canWrite(file) });
}

/** Two names of one file are one project. */
function realOf(file: string): string {
  try {
    return realpathSync(file);
  } catch {
    return resolve(file);
  }
}

function answerOf({ id, project }: OpenProject): ProjectAnswer {
  const { name, runs } = project.info();
  return { projectId: id, name, file: project.file, isReadOnly: project.isReadOnly, runCount: runs };
}
