import { spawnSync } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/** `npm run demo`: estimates the three revisions of the sample as a user would, and says where the reports lie. */

const root = resolve(dirname(fileURLToPath(import.meta.url)), '../../..');
const samples = join(root, 'samples', 'valve-controller');
const out = join(root, 'out', 'demo');
const command = join(root, 'dist', 'main', 'cli', 'quietboard.js');

/** 0: every margin kept; 1: a margin falls short. Both are answers; anything else is a failure. */
function estimate(revision: string, top: number): void {
  const board = relative(root, join(samples, `rev-${revision}.board.json`));
  const sources = relative(root, join(samples, `rev-${revision}.sources.json`));
  const base = join(out, `rev-${revision}`);
  const args = ['estimate', board, '--sources', sources, '--top', String(top)];
  args.push('--html', `${base}.html`, '--csv', `${base}.csv`, '--json', `${base}.json`);
  const { status } = spawnSync(process.execPath, [command, ...args], { stdio: 'inherit', cwd: root });
  if (status !== 0 && status !== 1) process.exit(status ?? 3);
}

mkdirSync(out, { recursive: true });
for (const revision of ['a', 'b', 'c']) {
  console.log(`\n${'─'.repeat(80)}`);
  estimate(revision, 6);
}
console.log(`\n${'─'.repeat(80)}`);
console.log('Reports, tables (CSV) and raw numbers (JSON), one set for each revision:');
for (const revision of ['a', 'b', 'c']) console.log(`  ${relative(root, join(out, `rev-${revision}.html`))}`);
