import { toBoard } from '../../app/board/parse-board.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { parseLimitFile } from '../../app/limits/limit-file.ts';
import type { LimitLine } from '../../app/limits/limit-line.ts';
import { limitRequestOf, type RunSettings, siteRequestOf } from '../../app/project/run-settings.ts';
import type { RunDocument } from '../../app/project/stored-run.ts';
import type { EstimateJob } from './job.ts';

/**
 * The job that estimates a document under settings: the same document and settings give the same result, whoever asks.
 * Throws `input` for limits that do not exist and documents that cannot be modelled.
 */
export function estimateJob(document: RunDocument, settings: RunSettings, programVersion: string): EstimateJob {
  const catalogue: readonly LimitLine[] | undefined =
    settings.limitFile === undefined ? undefined : parseLimitFile(settings.limitFile);
  const limits = limitRequestOf(settings);
  const chosen = chooseLimits(limits, catalogue);
  const converted = toBoard(document.board, { samples: new Map(Object.entries(document.samples)) });
  return {
    board: converted.board,
    limits,
    ...(catalogue && { catalogue }),
    request: {
      site: siteRequestOf(settings),
      structure: settings.structure,
      ...(settings.maxHz !== undefined && { maxHz: settings.maxHz }),
      requiredMarginDb: settings.requiredMarginDb,
      boardSha256: document.sourceSha256,
      programVersion,
      notes: [...document.openingNotes, ...converted.notes, ...chosen.notes],
    },
  };
}
