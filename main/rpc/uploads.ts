import { randomUUID } from 'node:crypto';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { refuseUpload } from '../../app/contract/upload-size.ts';
import { inputError } from '../../app/errors.ts';
import { fileFailure } from '../files/file-failure.ts';

const MAX_ALL_BYTES = 600e6;
const MAX_FILES = 100;

/** A file that came through the window: where it lies, and what its owner calls it. */
export interface Upload {
  readonly path: string;
  readonly name: string;
  readonly sizeBytes: number;
}

/** Uploaded files in a temporary folder, until they are taken. Files nobody takes give way to new ones, oldest first. */
export class Uploads {
  readonly #files = new Map<string, Upload>();
  #folder: Promise<string> | null = null;

  /** Throws `file` when it is too large or cannot be kept. */
  async add(name: string, bytes: Uint8Array): Promise<string> {
    refuseUpload(name, bytes.length);
    await this.#makeRoom(bytes.length);
    this.#folder ??= mkdtemp(join(tmpdir(), 'quietboard-'));
    const id = randomUUID();
    const upload = { path: join(await this.#folder, id), name: plainName(name), sizeBytes: bytes.length };
    try {
      await writeFile(upload.path, bytes, { flag: 'wx', mode: 0o600 });
    } catch (error) {
      throw fileFailure(upload.name, 'written', error);
    }
    this.#files.set(id, upload);
    return id;
  }

  /** Gives the uploads to `use` and removes them afterwards, used or not. Throws `input` for an unknown one. */
  async take<T>(ids: readonly string[], use: (uploads: Upload[]) => Promise<T>): Promise<T> {
    const uploads = ids.map((id, i) => {
      const upload = this.#files.get(id);
      if (upload === undefined) throw inputError(`uploadIds[${i}]`, 'a file uploaded before and not used yet', id);
      return upload;
    });
    // Nobody else may take or remove them from here on.
    for (const id of ids) this.#files.delete(id);
    try {
      return await use(uploads);
    } finally {
      await Promise.all(uploads.map(({ path }) => rm(path, { force: true })));
    }
  }

  async removeAll(): Promise<void> {
    this.#files.clear();
    if (this.#folder !== null) await rm(await this.#folder, { recursive: true, force: true });
    this.#folder = null;
  }

  async #makeRoom(neededBytes: number): Promise<void> {
    const heldBytes = () => [...this.#files.values()].reduce((sum, { sizeBytes }) => sum + sizeBytes, 0);
    for (const [id, { path }] of this.#files) {
      if (this.#files.size < MAX_FILES && heldBytes() + neededBytes <= MAX_ALL_BYTES) return;
      this.#files.delete(id);
      await rm(path, { force: true });
    }
  }
}

/** The last part of a path, as it is shown in messages; control characters are no part of a name. */
function plainName(name: string): string {
  const last = name.split(/[/\\]/).at(-1) ?? '';
  return last.replace(/\p{Cc}/gu, '').trim() || 'unnamed file';
}
