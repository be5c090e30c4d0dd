import { mkdirSync } from 'node:fs';
import { homedir } from 'node:os';
import { join } from 'node:path';

/**
 * The program's own folder: recent projects, its settings, projects that were given no place. `QUIETBOARD_HOME` puts it
 * elsewhere.
 */
export function homeFolder(environment: NodeJS.ProcessEnv = process.env, platform: string = process.platform): string {
  const own = environment.QUIETBOARD_HOME;
  if (own) return own;
  if (platform === 'win32') return join(environment.APPDATA ?? join(homedir(), 'AppData', 'Roaming'), 'Quietboard');
  if (platform === 'darwin') return join(homedir(), 'Library', 'Application Support', 'Quietboard');
  const data = environment.XDG_DATA_HOME;
  // The base directory rules: a relative path in the variable counts as unset.
  return join(data?.startsWith('/') ? data : join(homedir(), '.local', 'share'), 'quietboard');
}

/** The folder, made when it is not there; readable by its owner only. */
export function makeFolder(folder: string): string {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  return folder;
}
