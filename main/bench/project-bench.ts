import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Project } from '../db/project.ts';
import type { NewRun } from '../db/runs-repository.ts';
import type { BenchResult } from './bench-result.ts';
import { perturbedResult } from './perturbed-result.ts';
import { sampleRun } from './sample-run.ts';
import { seeded } from './seeded.ts';

const REVISIONS = 50;
const RUNS_EACH = 20;
const REPEATS = 5;

/** 50 revisions of 20 runs, no two results alike: opening the file and listing all runs and revisions; its size. */
export async function projectBench(): Promise<BenchResult> {
  const folder = mkdtempSync(join(tmpdir(), 'quietboard-bench-'));
  try {
    const file = join(folder, 'bench.quietboard');
    const buildS = await build(file);
    const seconds = Array.from({ length: REPEATS }, () => timed(() => openAndList(file)));
    const project = Project.open(file);
    const showS = timed(() => project.run(500));
    project.close();
    return {
      name: `project of ${REVISIONS} revisions × ${RUNS_EACH} runs: open and list`,
      seconds: Math.min(...seconds),
      peakMb: process.resourceUsage().maxRSS / 1024,
      detail: {
        'file, MB': statSync(file).size / 1e6,
        'open and list, slowest, s': Math.max(...seconds),
        'one whole run, s': showS,
        'keeping a run, mean, s': buildS / (REVISIONS * RUNS_EACH),
      },
    };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function build(file: string): Promise<number> {
  const models = [await sampleRun('a'), await sampleRun('b'), await sampleRun('c')];
  const random = seeded(20261202);
  const project = Project.open(file, { create: true });
  const seconds = timed(() => {
    for (let revision = 0; revision < REVISIONS; revision++) {
      const model = models[revision % models.length]!;
      for (let i = 0; i < RUNS_EACH; i++) project.addRun(likeRun(model, `R${revision}`, i, random));
    }
  });
  project.close();
  return seconds;
}

/** The same copper in a revision of its own, with a source that changes from run to run. */
function likeRun({ document, result, ...run }: NewRun, revision: string, i: number, random: () => number): NewRun {
  const drives = document.board.drives?.map((drive, d) => (d === 0 ? { ...drive, seriesOhm: 10 + i } : drive));
  return {
    ...run,
    document: { ...document, board: { ...document.board, revision, ...(drives && { drives }) } },
    result: { ...perturbedResult(result, random), board: { ...result.board, revision } },
  };
}

function openAndList(file: string): void {
  const project = Project.open(file);
  const [runs, revisions] = [project.runs(), project.revisions()];
  project.close();
  if (runs.length !== REVISIONS * RUNS_EACH || revisions.length !== REVISIONS)
    throw new Error('the project is not whole');
}

function timed(step: () => unknown): number {
  const startedMs = performance.now();
  step();
  return (performance.now() - startedMs) / 1000;
}
