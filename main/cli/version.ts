import { readFileSync } from 'node:fs';

/** Of the package this file is built into. */
export function programVersion(): string {
  const file = new URL('../../../package.json', import.meta.url);
  return (JSON.parse(readFileSync(file, 'utf8')) as { version: string }).version;
}
