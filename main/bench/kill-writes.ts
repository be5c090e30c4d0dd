import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { readdirSync, writeFileSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { Project } from '../db/project.ts';
import type { NewRun } from '../db/runs-repository.ts';
import { seeded } from './seeded.ts';

export interface KillReport {
  readonly kills: number;
  /** Kills that found a log of changes beside the file: the process was at work on it. */
  readonly caughtOpen: number;
  /** Runs whose numbers the killed processes had said, and runs in the file. */
  readonly promisedRuns: number;
  readonly keptRuns: number;
  /** Empty when nothing was lost or damaged. */
  readonly faults: readonly string[];
}

/** A writer lives until it has kept up to so many runs, and then up to so long, ms: about the time of a write. */
const MOST_RUNS = 4;
const MOST_LIFE_MS = 30;

/**
 * Kills a process that writes to a project, again and again, each at a moment of its own (SIGKILL: nothing can be tidied up),
 * and looks after each: every run that was promised is there, every run that is listed loads whole. `writer` is the built
 * `kill-writer.js`.
 */
export async function killWrites(folder: string, writer: string, run: NewRun, kills: number): Promise<KillReport> {
  const file = join(folder, 'killed.quietboard');
  const runFile = join(folder, 'run.json');
  writeFileSync(runFile, JSON.stringify(run));
  const random = seeded(20261203);
  const faults: string[] = [];
  const promised = new Set<number>();
  const looked = new Set<number>();
  let caughtOpen = 0;
  for (let kill = 1; kill <= kills; kill++) {
    for (const number of await killOne(writer, [file, runFile], random)) promised.add(number);
    if (readdirSync(dirname(file)).includes(`${basename(file)}-wal`)) caughtOpen++;
    faults.push(...look(file, promised, looked).map((fault) => `kill ${kill}: ${fault}`));
  }
  const project = Project.open(file);
  const report = project.doctor();
  for (const { isFine, code, message } of report.findings) if (!isFine) faults.push(`${code}: ${message}`);
  project.close();
  return { kills, caughtOpen, promisedRuns: promised.size, keptRuns: looked.size, faults };
}

/** The numbers that the process had said when it was killed. */
async function killOne(writer: string, args: readonly string[], random: () => number): Promise<number[]> {
  const child = spawn(process.execPath, [writer, ...args], { stdio: ['ignore', 'pipe', 'inherit'] });
  // One line is "ready".
  const linesBefore = 1 + Math.floor((MOST_RUNS + 1) * random());
  const lifeMs = MOST_LIFE_MS * random();
  let said = '';
  child.stdout.setEncoding('utf8');
  child.stdout.on('data', (text: string) => {
    const isWaiting = linesOf(said).length < linesBefore;
    said += text;
    if (isWaiting && linesOf(said).length >= linesBefore) setTimeout(() => child.kill('SIGKILL'), lifeMs);
  });
  const [code] = (await once(child, 'close')) as [number | null];
  if (code !== null) throw new Error(`the writer ended by itself (code ${code})`);
  return linesOf(said).slice(1).map(Number);
}

/** A line cut short was not said. */
const linesOf = (text: string): string[] => text.split('\n').slice(0, -1);

function look(file: string, promised: ReadonlySet<number>, looked: Set<number>): string[] {
  const faults: string[] = [];
  const project = Project.open(file);
  try {
    const listed = project.runs();
    const numbers = new Set(listed.map(({ run }) => run));
    for (const run of promised) if (!numbers.has(run)) faults.push(`run ${run} was promised and is not there`);
    for (const { run, note } of listed) {
      if (looked.has(run)) continue;
      looked.add(run);
      const stored = project.run(run);
      if (stored.result.notes.at(-1) !== note) faults.push(`run ${run} is not whole`);
    }
    project.draft();
  } catch (error) {
    faults.push((error as Error).message);
  } finally {
    project.close();
  }
  return faults;
}
