import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { onTestFinished } from 'vitest';
import { boardFileSchema } from '../../app/board/board-file.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import type { NewRun } from '../../main/db/runs-repository.ts';
import { sampleResult } from './sample-result.ts';

/** A folder of its own, removed after the test. */
export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'quietboard-db-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

export const SETTINGS = runSettingsSchema.parse({ requiredMarginDb: 6 });

/** The sample board of a revision, with its sources and an invented waveform file. */
export function sampleDocument(letter: 'a' | 'b' | 'c' = 'a'): RunDocument {
  const read = (kind: string) =>
    JSON.parse(readFileSync(`samples/valve-controller/rev-${letter}.${kind}.json`, 'utf8')) as Record<string, unknown>;
  const { format, version, notes, ...sources } = read('sources');
  return {
    board: boardFileSchema.parse({ ...read('board'), ...sources }),
    samples: { 'scope.csv': { timesS: [0, 1.1e-9, 2.2e-9], values: [-0, 0.1 + 0.2, -3.3] } },
    sourceSha256: '3f1c'.repeat(16),
    openingNotes: ['Import: a note.'],
  };
}

/** An invented result whose board has the document's name and revision. */
export function resultOf({ board }: RunDocument, changes: Partial<EstimateResult> = {}): EstimateResult {
  const result = sampleResult();
  return { ...result, board: { ...result.board, name: board.name, revision: board.revision }, ...changes };
}

export function sampleRun(letter: 'a' | 'b' | 'c' = 'a', changes: Partial<NewRun> = {}): NewRun {
  const document = sampleDocument(letter);
  return {
    startedAt: '2025-03-04T05:06:07.890Z',
    document,
    settings: SETTINGS,
    result: resultOf(document),
    durationS: 2.5,
    ...changes,
  };
}
