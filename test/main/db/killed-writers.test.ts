import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { expect, it } from 'vitest';
import { killWrites } from '../../../main/bench/kill-writes.ts';
import { sampleRun, temporaryFolder } from '../../support/project-fixture.ts';

/** Built, as Node 20 runs no TypeScript. */
const WRITER = fileURLToPath(new URL('../../../dist/main/bench/kill-writer.js', import.meta.url));
const KILLS = 20;

it(`writers killed ${KILLS} times: the file is sound, every promised run is there, every listed run is whole`, async () => {
  expect(existsSync(WRITER), 'run "npm run build" first').toBe(true);
  const report = await killWrites(temporaryFolder(), WRITER, sampleRun(), KILLS);
  expect(report.faults).toEqual([]);
  expect(report.kills).toBe(KILLS);
  // They were killed at work, and their work is there.
  expect(report.caughtOpen).toBeGreaterThan(KILLS / 2);
  expect(report.promisedRuns).toBeGreaterThan(KILLS);
  expect(report.keptRuns).toBeGreaterThanOrEqual(report.promisedRuns);
});
