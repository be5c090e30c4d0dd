import { getState } from '../state/app-store.ts';
import { redo, undo } from '../state/document.ts';
import { jobOf } from '../state/jobs.ts';
import { discardChanges, estimate, keepForComparison, shownOf, stop } from '../state/result.ts';
import { selectLine, stepBackSelection, stepLine } from '../state/selection.ts';
import { showTab } from '../state/tabs.ts';
import { chooseTheme } from '../state/theme.ts';
import type { Command } from './command.ts';
import { FILE_COMMANDS } from './file-commands.ts';
import { showOverlay } from './overlays.ts';

/** What the window can do whatever parts it has. */

const hasDocument = (): boolean => getState().history !== null;
const hasLines = (): boolean => (shownOf(getState())?.points.length ?? 0) > 0;
const step = (by: 1 | -1) => (): void => stepLine(shownOf(getState())?.points ?? [], by);

/** Whether the document can be estimated now. */
export const canEstimate = ({ model, jobs }: Pick<ReturnType<typeof getState>, 'model' | 'jobs'>): boolean =>
  model !== null && model.problems.length === 0 && jobs.every(({ kind }) => kind !== 'estimate');

const EDIT: readonly Command[] = [
  {
    name: 'edit.undo',
    label: 'Undo',
    group: 'Edit',
    keys: ['Mod+Z'],
    isEnabled: () => (getState().history?.past.length ?? 0) > 0,
    run: undo,
  },
  {
    name: 'edit.redo',
    label: 'Redo',
    group: 'Edit',
    keys: ['Mod+Y', 'Mod+Shift+Z'],
    isEnabled: () => (getState().history?.future.length ?? 0) > 0,
    run: redo,
  },
];

const ESTIMATE: readonly Command[] = [
  {
    name: 'estimate.run',
    label: 'Estimate',
    group: 'Estimate',
    keys: ['Mod+Enter'],
    isEnabled: () => canEstimate(getState()),
    run: () => estimate(),
  },
  {
    name: 'estimate.stop',
    label: 'Stop',
    group: 'Estimate',
    keys: ['Mod+.'],
    isEnabled: () => getState().jobs.length > 0,
    run: stop,
  },
  {
    name: 'compare.keep',
    label: 'Keep this result to compare against',
    group: 'Estimate',
    isEnabled: () => getState().result !== null && getState().kept === null && jobOf('estimate') === undefined,
    run: keepForComparison,
  },
  {
    name: 'compare.discard',
    label: 'Let the change go: back to the kept state',
    group: 'Estimate',
    isEnabled: () => getState().kept !== null,
    run: discardChanges,
  },
];

const VIEW: readonly Command[] = [
  {
    name: 'line.worst',
    label: 'Choose the worst line',
    group: 'View',
    keys: ['Alt+W'],
    isEnabled: () => (shownOf(getState())?.worst ?? null) !== null,
    run: () => selectLine(shownOf(getState())?.worst?.frequencyHz ?? null),
  },
  { name: 'line.next', label: 'Next line', group: 'View', keys: ['ArrowRight'], isEnabled: hasLines, run: step(1) },
  {
    name: 'line.previous',
    label: 'Previous line',
    group: 'View',
    keys: ['ArrowLeft'],
    isEnabled: hasLines,
    run: step(-1),
  },
  {
    name: 'selection.back',
    label: 'Take back the last choice',
    group: 'View',
    keys: ['Escape'],
    run: () => void stepBackSelection(),
  },
  {
    name: 'report.show',
    label: 'Report: preview, save, print',
    group: 'View',
    keys: ['Mod+P'],
    isEnabled: hasDocument,
    run: () => showTab('report'),
  },
  { name: 'theme.system', label: 'Theme: as the system', group: 'View', run: () => chooseTheme('system') },
  { name: 'theme.light', label: 'Theme: light', group: 'View', run: () => chooseTheme('light') },
  { name: 'theme.dark', label: 'Theme: dark', group: 'View', run: () => chooseTheme('dark') },
];

const HELP: readonly Command[] = [
  {
    name: 'help.palette',
    label: 'Find a command…',
    group: 'Help',
    keys: ['Mod+K', '?'],
    run: () => showOverlay('palette'),
  },
  { name: 'help.shortcuts', label: 'Keys', group: 'Help', keys: ['F1'], run: () => showOverlay('shortcuts') },
  { name: 'help.cautions', label: 'What an estimate is worth', group: 'Help', run: () => showOverlay('cautions') },
];

export const CORE_COMMANDS: readonly Command[] = [...FILE_COMMANDS, ...EDIT, ...ESTIMATE, ...VIEW, ...HELP];
