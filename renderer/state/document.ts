import { boardFileSchema } from '../../app/board/board-file.ts';
import type { BoardBase } from '../../app/contract/documents.ts';
import type { LayoutPart, SourcesPart } from '../../app/project/board-parts.ts';
import type { RunSettings } from '../../app/project/run-settings.ts';
import { parseWith } from '../../app/schema/parse-with.ts';
import { call } from '../api/api.ts';
import { getState, setState } from './app-store.ts';
import { boardModel } from './board-model.ts';
import { edited, type History, redone, startHistory, undone } from './history.ts';
import type { Work } from './work.ts';

/** Changes of the document and the test settings. Every one of them can be undone. */

/** Makes `history` the current one: the model follows its present. */
function show(history: History<Work>, bases = getState().bases): void {
  const { history: before, model: modelBefore, bases: basesBefore } = getState();
  const { baseId, sources } = history.present;
  const isSameDocument = before?.present.baseId === baseId && before.present.sources === sources;
  if (isSameDocument && modelBefore !== null) {
    setState({ history, bases });
    return;
  }
  const base = bases.get(baseId)!;
  const baseBefore = before && basesBefore.get(before.present.baseId);
  const known = baseBefore && modelBefore ? { base: baseBefore, model: modelBefore } : null;
  setState({ history, bases, model: boardModel(base, sources, known) });
}

/** One edit as an undoable step. `mergeKey` (say `drives.3.delay`) joins keystrokes or a drag into one step. */
export function edit(label: string, change: (work: Work) => Work, mergeKey?: string): void {
  const { history } = getState();
  if (history === null) return;
  show(edited(history, label, change(history.present), performance.now(), mergeKey));
}

export const editSources = (label: string, change: (sources: SourcesPart) => SourcesPart, mergeKey?: string): void =>
  edit(label, (work) => ({ ...work, sources: change(work.sources) }), mergeKey);

export const editSettings = (label: string, patch: Partial<RunSettings>, mergeKey?: string): void =>
  edit(label, (work) => ({ ...work, settings: { ...work.settings, ...patch } }), mergeKey);

/** Changes the copper or the stack. The host keeps the new base before the step is made. Throws what the host says. */
export async function editLayout(
  label: string,
  change: (layout: LayoutPart) => LayoutPart,
  mergeKey?: string,
): Promise<void> {
  const { history, bases, project } = getState();
  if (history === null || project === null) return;
  const before = bases.get(history.present.baseId)!;
  const layout = parseWith(boardFileSchema, change(before.layout));
  const base: BoardBase = { ...before, layout };
  const { baseId } = await call('base.put', { projectId: project.projectId, base });
  rememberBase(baseId, base);
  edit(label, (work) => ({ ...work, baseId }), mergeKey);
}

export function undo(): void {
  const { history } = getState();
  if (history !== null) show(undone(history));
}

export function redo(): void {
  const { history } = getState();
  if (history !== null) show(redone(history));
}

/** A base the window already has keeps its identity. */
function rememberBase(baseId: string, base: BoardBase): ReadonlyMap<string, BoardBase> {
  const { bases } = getState();
  if (bases.has(baseId)) return bases;
  const more = new Map(bases).set(baseId, base);
  setState({ bases: more });
  return more;
}

/** Fetches a base the window does not have yet. */
export async function needBase(projectId: string, baseId: string): Promise<void> {
  if (getState().bases.has(baseId)) return;
  const { base } = await call('base.get', { projectId, baseId });
  rememberBase(baseId, base);
}

/** Shows another document: the first one starts the history, later ones are a step of it. */
export function showWork(label: string, work: Work, base?: BoardBase): void {
  if (base !== undefined) rememberBase(work.baseId, base);
  const { history } = getState();
  show(history === null ? startHistory(work) : edited(history, label, work, performance.now()));
}
