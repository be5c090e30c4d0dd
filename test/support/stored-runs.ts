import type { BoardFileInput } from '../../app/board/board-file.ts';
import { parseBoardFile } from '../../app/board/parse-board.ts';
import type { EstimateResult } from '../../app/estimate/result.ts';
import { type RunSettings, runSettingsSchema } from '../../app/project/run-settings.ts';
import type { StoredRun } from '../../app/project/stored-run.ts';
import { sampleResult } from './sample-result.ts';

export interface RunParts {
  readonly run?: number;
  readonly startedAt?: string;
  readonly note?: string;
  readonly settings?: Partial<RunSettings>;
  readonly samples?: StoredRun['document']['samples'];
}

/** A stored run of a board file and a result that need not belong together; summary and set-up follow the result. */
export function storedRun(
  board: BoardFileInput,
  result: EstimateResult = sampleResult(),
  { run = 1, startedAt = '2031-04-05T06:07:08Z', note = '', settings = {}, samples = {} }: RunParts = {},
): StoredRun {
  const document = parseBoardFile(board);
  return {
    run,
    startedAt,
    board: document.name,
    revision: document.revision,
    layoutSha256: 'a1'.repeat(32),
    sourcesSha256: 'b2'.repeat(32),
    standard: result.limit.standard,
    class: result.limit.class,
    distanceM: result.limit.distanceM,
    requiredMarginDb: result.limit.requiredMarginDb,
    structure: result.structure,
    worst: result.worst,
    verdict: result.verdict,
    programVersion: result.program.version,
    durationS: 12.5,
    note,
    document: { board: document, samples, sourceSha256: result.board.sha256, openingNotes: [] },
    settings: {
      ...runSettingsSchema.parse({
        standard: result.limit.standard,
        class: result.limit.class,
        distanceM: result.limit.distanceM,
        requiredMarginDb: result.limit.requiredMarginDb,
        structure: result.structure,
      }),
      ...settings,
    },
    result,
  };
}
