import { fileURLToPath } from 'node:url';

/**
 * The database's native module for a version of the desktop runtime, which has another binary interface than Node: both lie
 * side by side, Node's where its package puts it, the runtime's where `npm run native:electron` puts it.
 */
export function electronBinding(modulesVersion: string): string {
  const name = `better_sqlite3-${process.platform}-${process.arch}-${modulesVersion}.node`;
  return fileURLToPath(new URL(`../../../native/${name}`, import.meta.url));
}
