import { readdirSync } from 'node:fs';
import { extname, join } from 'node:path';

/** A built file of the window. */
export interface StaticFile {
  readonly path: string;
  readonly mediaType: string;
  readonly cacheControl: string;
}

const MEDIA_TYPES = new Map([
  ['.html', 'text/html; charset=utf-8'],
  ['.js', 'text/javascript; charset=utf-8'],
  ['.mjs', 'text/javascript; charset=utf-8'],
  ['.css', 'text/css; charset=utf-8'],
  ['.json', 'application/json'],
  ['.svg', 'image/svg+xml'],
  ['.png', 'image/png'],
  ['.woff2', 'font/woff2'],
  ['.ttf', 'font/ttf'],
  ['.wasm', 'application/wasm'],
  ['.txt', 'text/plain; charset=utf-8'],
]);

/**
 * The files of the window's build, by their paths in an address. Only what was found by listing the folder is there to be
 * asked for, so no path leads out of it; files of other kinds are left out.
 */
export class StaticFiles {
  readonly #folder: string;
  #files: ReadonlyMap<string, StaticFile>;

  constructor(folder: string) {
    this.#folder = folder;
    this.#files = listFiles(folder);
  }

  /** `address`: path part of the request, still percent-encoded. A page built anew since the start is found too. */
  find(address: string): StaticFile | undefined {
    const path = decoded(address === '/' ? '/index.html' : address);
    if (path === undefined) return undefined;
    if (!this.#files.has(path) || path === '/index.html') this.#files = listFiles(this.#folder);
    return this.#files.get(path);
  }
}

function decoded(address: string): string | undefined {
  try {
    return decodeURIComponent(address);
  } catch {
    return undefined;
  }
}

function listFiles(folder: string): Map<string, StaticFile> {
  const files = new Map<string, StaticFile>();
  const walk = (under: string) => {
    for (const entry of readdirSync(join(folder, under), { withFileTypes: true })) {
      const path = `${under}/${entry.name}`;
      // Links are neither: they could point anywhere.
      if (entry.isDirectory()) walk(path);
      const mediaType = MEDIA_TYPES.get(extname(entry.name));
      if (!entry.isFile() || mediaType === undefined) continue;
      // Names in assets/ carry a hash of their content.
      const cacheControl = path.startsWith('/assets/') ? 'private, max-age=31536000, immutable' : 'no-store';
      files.set(path, { path: join(folder, path), mediaType, cacheControl });
    }
  };
  try {
    walk('');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
  return files;
}
