import { spawnSync } from 'node:child_process';
import { copyFileSync, cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * `npm run native:electron`: the database's native module for the desktop runtime, beside the one for Node. In a copy of
 * its package, so that Node's stays as it is: a ready-made module where its makers offer one, else built from source (needs
 * a C++ compiler and Python).
 */

const checkout = fileURLToPath(new URL('../..', import.meta.url));
const inModules = (/** @type {string} */ path) => join(checkout, 'node_modules', path);
const runtimeVersion = JSON.parse(readFileSync(inModules('electron/package.json'), 'utf8')).version;
const modulesVersion = readFileSync(inModules('electron/abi_version'), 'utf8').trim();
const { platform, arch } = process;
const work = mkdtempSync(join(tmpdir(), 'quietboard-native-'));

/** @param {string} command @param {string[]} args @param {Record<string, string>} more */
const run = (command, args, more = {}) =>
  spawnSync(command, args, {
    cwd: work,
    stdio: 'inherit',
    env: { ...process.env, ...more },
    shell: platform === 'win32',
  }).status === 0;

try {
  cpSync(inModules('better-sqlite3'), work, { recursive: true });
  rmSync(join(work, 'build'), { recursive: true, force: true });
  const target = ['--runtime', 'electron', '--target', runtimeVersion, '--platform', platform, '--arch', arch];
  const isBuilt =
    run(process.execPath, [inModules('prebuild-install/bin.js'), ...target]) ||
    run('npm', ['run', 'build-release'], {
      npm_config_runtime: 'electron',
      npm_config_target: runtimeVersion,
      npm_config_disturl: 'https://electronjs.org/headers',
    });
  if (!isBuilt) {
    process.stderr.write('The database module for the desktop runtime could not be had: see the messages above.\n');
    process.exit(1);
  }
  const file = join(checkout, 'native', `better_sqlite3-${platform}-${arch}-${modulesVersion}.node`);
  mkdirSync(join(checkout, 'native'), { recursive: true });
  copyFileSync(join(work, 'build/Release/better_sqlite3.node'), file);
  process.stdout.write(`${file}\n`);
} finally {
  rmSync(work, { recursive: true, force: true });
}
