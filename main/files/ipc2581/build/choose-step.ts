import { ContentError } from '../attributes.ts';
import type { Ipc2581Document, Step } from '../document.ts';
import { type Findings, nameList } from './findings.ts';

/**
 * The step that is the board: the one with most copper that has nets, then with most copper. A panel repeats it and
 * draws at most frames and marks of its own. Throws ContentError when no step holds copper.
 */
export function chooseStep(document: Ipc2581Document, findings: Findings): Step {
  const ranked = document.steps
    .filter((step) => featuresOf(step) > 0)
    .toSorted((p, q) => nettedOf(q) - nettedOf(p) || featuresOf(q) - featuresOf(p));
  const board = ranked[0];
  if (board === undefined) {
    const mode = document.functionMode === '' ? '' : ` (exported as ${document.functionMode})`;
    throw new ContentError(`holds no copper${mode}: export the board with all copper layers`);
  }
  const panels = document.steps.filter((step) => step.repeats > 0 && step !== board);
  findings.add(
    'panel-step-chosen',
    panels.length,
    `the file holds a panel: only the board step ${nameList([board.name])} is imported`,
  );
  const others = ranked.filter((step) => step !== board && !panels.includes(step)).map(({ name }) => name);
  findings.add('steps-left-out', others.length, `other steps with copper are left out: ${nameList(others)}`);
  return board;
}

const featuresOf = (step: Step): number => [...step.featureCounts.values()].reduce((sum, count) => sum + count, 0);
const nettedOf = (step: Step): number =>
  step.shapes.filter(({ net }) => net !== undefined).length + step.pads.filter(({ net }) => net !== undefined).length;
