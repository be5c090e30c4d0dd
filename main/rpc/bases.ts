import { createHash } from 'node:crypto';
import type { BoardBase, DocumentRef } from '../../app/contract/documents.ts';
import type { DeepReadonly } from '../../app/contract/procedures.ts';
import { AppError } from '../../app/errors.ts';
import { joinParts, splitParts } from '../../app/project/board-parts.ts';
import { canonicalJson } from '../../app/project/exact-json.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import type { Project } from '../db/project.ts';

type Base = DeepReadonly<BoardBase>;

/** A large board is some 30 MB; windows go back and forth between few. */
const MOST_KEPT = 16;

/** Boards without their sources, by the hash of their content: what windows refer to instead of sending them each time. */
export class Bases {
  /** Least recently used first. */
  readonly #bases = new Map<string, Base>();

  /** The base's id. */
  put(base: Base): string {
    const id = createHash('sha256').update(canonicalJson(base)).digest('hex');
    this.#keep(id, base);
    return id;
  }

  /**
   * The base of an id: one that was put, or one that the project's draft or runs hold, so that an id outlives the program.
   * Throws `input` for an unknown one.
   */
  get(project: Project, id: string): Base {
    const known = this.#bases.get(id);
    if (known !== undefined) {
      this.#keep(id, known);
      return known;
    }
    for (const document of storedDocuments(project))
      if (this.refer(document).baseId === id) return this.#bases.get(id)!;
    throw new AppError('input', `this project holds no board of the id ${id.slice(0, 12)}…: open it again`, 'baseId');
  }

  /** The document that a reference stands for. */
  document(project: Project, { baseId, sources }: DocumentRef): RunDocument {
    const { layout, samples, sourceSha256, openingNotes } = this.get(project, baseId);
    return { board: joinParts(layout as BoardBase['layout'], sources), samples, sourceSha256, openingNotes };
  }

  /** A reference to a document, whose base is kept. */
  refer(document: RunDocument): DocumentRef {
    const { base, sources } = partsOf(document);
    return { baseId: this.put(base), sources };
  }

  #keep(id: string, base: Base): void {
    this.#bases.delete(id);
    this.#bases.set(id, base);
    const [oldest] = this.#bases.keys();
    if (this.#bases.size > MOST_KEPT) this.#bases.delete(oldest!);
  }
}

/** Base and sources of a document. */
export function partsOf(document: RunDocument): { base: Base; sources: DocumentRef['sources'] } {
  const { layout, sources } = splitParts(document.board);
  const { samples, sourceSha256, openingNotes } = document;
  return { base: { layout, samples, sourceSha256, openingNotes }, sources };
}

/** The draft first, then the runs from the newest, one for each layout. */
function* storedDocuments(project: Project): Generator<RunDocument> {
  const draft = project.draft();
  if (draft !== undefined) yield draft.document;
  const seen = new Set<string>();
  for (const { run, layoutSha256 } of project.runs()) {
    if (seen.has(layoutSha256)) continue;
    seen.add(layoutSha256);
    yield project.run(run).document;
  }
}
