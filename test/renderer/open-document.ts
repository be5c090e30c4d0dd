import { boardFileSchema } from '../../app/board/board-file.ts';
import type { BoardBase } from '../../app/contract/documents.ts';
import { splitParts } from '../../app/project/board-parts.ts';
import { runSettingsSchema } from '../../app/project/run-settings.ts';
import { EMPTY_PROJECT, getState, setState } from '../../renderer/state/app-store.ts';
import { showWork } from '../../renderer/state/document.ts';
import { forgetDraft, takeSaved } from '../../renderer/state/draft.ts';
import type { Work } from '../../renderer/state/work.ts';
import { orchardBoard } from '../board/example-board.ts';

export const BASE_ID = 'a'.repeat(64);

const parts = splitParts(boardFileSchema.parse(orchardBoard()));

export const BASE: BoardBase = { layout: parts.layout, samples: {}, sourceSha256: '', openingNotes: [] };
export const WORK: Work = { baseId: BASE_ID, sources: parts.sources, settings: runSettingsSchema.parse({}) };

/** The example board open in a project, saved as version 1. */
export function openDocument(): void {
  forgetDraft();
  const project = { projectId: 'p', name: 'Orchard', file: '/orchard', isReadOnly: false, runCount: 0 };
  setState({ ...EMPTY_PROJECT, jobs: [], project });
  takeSaved(WORK, 1);
  showWork('Open', WORK, BASE);
}

export const present = (): Work => getState().history!.present;
