import { type ExecFileSyncOptionsWithStringEncoding, execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { parse } from 'yaml';
import { z } from 'zod';
import { desktopRuntime } from '../../../main/start/desktop-runtime.ts';
import { testFolder } from '../../support/run-cli.ts';

const CHECKOUT = new URL('../../../', import.meta.url);
const read = (name: string): string => readFileSync(new URL(name, CHECKOUT), 'utf8');
const configuration = parse(read('electron-builder.yml'));
const packageJson = JSON.parse(read('package.json'));

test('fuses are set so that the program cannot be turned into a plain Node', () => {
  expect(configuration.electronFuses).toMatchObject({
    runAsNode: false,
    enableNodeOptionsEnvironmentVariable: false,
    enableNodeCliInspectArguments: false,
    enableCookieEncryption: true,
    grantFileProtocolExtraPrivileges: false,
  });
});

test('packages for three systems, with the program’s files and its project files', () => {
  for (const system of ['linux', 'win', 'mac']) expect(configuration[system].target.length).toBeGreaterThan(0);
  expect(configuration.files).toEqual(expect.arrayContaining(['dist/**', 'samples/**', 'native/**']));
  expect(configuration.fileAssociations).toMatchObject([{ ext: 'quietboard' }]);
  expect(packageJson.main).toBe('dist/main/electron/main.js');
  expect(existsSync(new URL(packageJson.main, CHECKOUT))).toBe(true);
});

test('one version of the desktop runtime: what is installed is what is packaged', () => {
  const installed = JSON.parse(read('node_modules/electron/package.json')) as { version: string };
  expect(configuration.electronVersion).toBe(installed.version);
});

/** The packager's own schema, of the version that `npm run package` uses; undefined without a network. */
function builderSchema(): unknown {
  const version = /electron-builder@([\d.]+)/.exec(packageJson.scripts.package)![1]!;
  const { folder } = testFolder();
  try {
    const options: ExecFileSyncOptionsWithStringEncoding = {
      cwd: folder,
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
      timeout: 60_000,
    };
    const archive = execFileSync('npm', ['pack', '--silent', `app-builder-lib@${version}`], options).trim();
    execFileSync('tar', ['xzf', archive, 'package/scheme.json'], options);
  } catch {
    return undefined;
  }
  return JSON.parse(readFileSync(join(folder, 'package/scheme.json'), 'utf8'));
}

test('the configuration fits the packager’s schema', (context) => {
  const json = builderSchema();
  if (json === undefined) {
    console.warn('skipped: the schema of electron-builder.yml cannot be fetched from the package registry');
    context.skip();
  }
  const schema = z.fromJSONSchema(json as Parameters<typeof z.fromJSONSchema>[0]);
  expect(schema.safeParse(configuration).error?.issues).toBeUndefined();
  // It would notice.
  expect(schema.safeParse({ ...configuration, colour: 'blue' }).success).toBe(false);
  expect(schema.safeParse({ ...configuration, electronFuses: { runAsNode: 'no' } }).success).toBe(false);
});

test('what is missing of the desktop runtime is said in words', () => {
  const { folder } = testFolder();
  expect(desktopRuntime(join(folder, 'package.json'))).toEqual({
    missing: 'the desktop runtime (Electron) is not installed here',
  });
});
