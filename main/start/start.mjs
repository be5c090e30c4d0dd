import { spawnSync } from 'node:child_process';
import { readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** `npm start`: builds the program when it is not built or the sources are newer, then opens its window. Plain JavaScript, as nothing may be built yet. */

const checkout = fileURLToPath(new URL('../..', import.meta.url));
const SOURCES = ['app', 'main', 'renderer', 'package.json', 'tsconfig.json', 'tsconfig.build.json', 'vite.config.ts'];
/** Written by every build. */
const BUILT = ['dist/main/cli/quietboard.js', 'dist/renderer/index.html'];

/** @param {string} path @returns {number} time of the newest file in it */
function newestMs(path) {
  const stats = statSync(path, { throwIfNoEntry: false });
  if (stats === undefined) return 0;
  if (!stats.isDirectory()) return stats.mtimeMs;
  // A folder's own time tells of files that were removed.
  return Math.max(stats.mtimeMs, ...readdirSync(path).map((name) => newestMs(join(path, name))));
}

const builtMs = Math.min(
  ...BUILT.map((file) => statSync(join(checkout, file), { throwIfNoEntry: false })?.mtimeMs ?? 0),
);
if (builtMs < Math.max(...SOURCES.map((source) => newestMs(join(checkout, source))))) {
  process.stderr.write('Building …\n');
  const { status } = spawnSync('npm', ['run', '--silent', 'build'], {
    cwd: checkout,
    stdio: 'inherit',
    // npm is a script on Windows.
    shell: process.platform === 'win32',
  });
  if (status !== 0) process.exit(status ?? 1);
}
await import(new URL('../../dist/main/start/open.js', import.meta.url).href);
