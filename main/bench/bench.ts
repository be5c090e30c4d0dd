import { writeFileSync } from 'node:fs';
import { cpus, totalmem } from 'node:os';
import type { BenchResult } from './bench-result.ts';
import { factorBench } from './factor-bench.ts';
import { killBench } from './kill-bench.ts';
import { leversBench } from './levers-bench.ts';
import { projectBench } from './project-bench.ts';
import { scanBench } from './scan-bench.ts';
import { largeStructureBench, manyLinesBench, smallStructureBench } from './structure-bench.ts';

const BENCHES: readonly (() => BenchResult | Promise<BenchResult>)[] = [
  factorBench,
  scanBench,
  smallStructureBench,
  manyLinesBench,
  largeStructureBench,
  leversBench,
  projectBench,
  killBench,
];

async function main(): Promise<void> {
  const at = process.argv.indexOf('--json');
  const file = at >= 0 ? process.argv[at + 1] : undefined;
  if (at >= 0 && !file) {
    console.error('bench: --json needs a file name, or - for standard output');
    process.exit(2);
  }
  const results: BenchResult[] = [];
  for (const bench of BENCHES) {
    const result = await bench();
    if (file !== '-') print(result);
    results.push(result);
  }
  const report = {
    machine: {
      node: process.version,
      cores: cpus().length,
      cpu: cpus()[0]?.model ?? '',
      memoryGb: totalmem() / 2 ** 30,
    },
    results,
  };
  if (file === '-') console.log(JSON.stringify(report, null, 2));
  else if (file) writeFileSync(file, `${JSON.stringify(report, null, 2)}\n`);
}

function print({ name, seconds, ratio, peakMb, detail }: BenchResult): void {
  console.log(
    `${name}: ${seconds.toFixed(2)} s${ratio ? `, ${ratio.toFixed(0)} times the plain way` : ''}, ${peakMb.toFixed(0)} MB`,
  );
  for (const [key, value] of Object.entries(detail)) console.log(`  ${key}: ${value}`);
}

await main();
