import { spawnSync } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * `npm run demo`: estimates the three revisions of the sample as a user would, keeps them in a project, compares them, and
 * says where the reports lie.
 */

const root = resolve(dirname(fileURLToPath(import.meta.url)), '../../..');
const samples = join(root, 'samples', 'valve-controller');
const out = join(root, 'out', 'demo');
const command = join(root, 'dist', 'main', 'cli', 'quietboard.js');
const REVISIONS = ['a', 'b', 'c'];

const shown = (file: string): string => relative(root, join(out, file));
const PROJECT = shown('valve-controller.quietboard');

/** 0: every margin kept; 1: a margin falls short. Both are answers; anything else is a failure. */
function quietboard(...args: readonly string[]): void {
  console.log(`\n${'─'.repeat(80)}`);
  console.log(`$ quietboard ${args.map((arg) => (arg.includes(' ') ? `"${arg}"` : arg)).join(' ')}\n`);
  const { status } = spawnSync(process.execPath, [command, ...args], { stdio: 'inherit', cwd: root });
  if (status !== 0 && status !== 1) process.exit(status ?? 3);
}

function estimate(revision: string): void {
  const file = (kind: string) => relative(root, join(samples, `rev-${revision}.${kind}.json`));
  const outputs = ['html', 'csv', 'json', 'pdf'].flatMap((format) => [
    `--${format}`,
    shown(`rev-${revision}.${format}`),
  ]);
  quietboard('estimate', file('board'), '--sources', file('sources'), '--top', '6', '--project', PROJECT, ...outputs);
}

rmSync(out, { recursive: true, force: true });
mkdirSync(out, { recursive: true });
for (const revision of REVISIONS) estimate(revision);
quietboard('compare', '--project', PROJECT, '1', '2', '--top', '6', '--pdf', shown('a-to-b.pdf'));
quietboard('compare', '--project', PROJECT, '2', '3', '--top', '6', '--pdf', shown('b-to-c.pdf'));
quietboard('trend', '--project', PROJECT, '--pdf', shown('trend.pdf'));

console.log(`\n${'─'.repeat(80)}`);
console.log('For the design review:');
for (const revision of REVISIONS) console.log(`  ${shown(`rev-${revision}.pdf`)}`);
for (const file of ['a-to-b.pdf', 'b-to-c.pdf', 'trend.pdf']) console.log(`  ${shown(file)}`);
console.log('The same on screen (HTML), as table (CSV) and raw numbers (JSON):');
console.log(`  ${shown('rev-*.html')}, ${shown('rev-*.csv')}, ${shown('rev-*.json')}`);
console.log(`The project with the three runs: ${PROJECT}; look around in it with`);
console.log(`  npx --no-install quietboard serve --project ${PROJECT}`);
