import { existsSync, readFileSync } from 'node:fs';

/** Of the package this file belongs to, built or not. */
export function programVersion(): string {
  let file = new URL('../../package.json', import.meta.url);
  if (!existsSync(file)) file = new URL('../../../package.json', import.meta.url);
  return (JSON.parse(readFileSync(file, 'utf8')) as { version: string }).version;
}
