import type { BoardFileInput } from '../../../../app/board/board-file.ts';
import type { ImportSummary } from '../../../../app/board/import-summary.ts';
import type { Ipc2581Document, Step } from '../document.ts';
import { chooseStep } from './choose-step.ts';
import { collectCopper } from './copper.ts';
import { Findings, nameList } from './findings.ts';
import { Flattener } from './flattener.ts';
import { reportHatchedPlanes } from './hatch.ts';
import { buildJoints, type FileVia } from './joints.ts';
import { buildOutline } from './outline.ts';
import { buildPins, type FilePin } from './pins.ts';
import { buildPlanes } from './planes.ts';
import { ShapeResolver } from './shape-resolver.ts';
import { buildStackup, reportGuesses } from './stackup.ts';
import { buildTraces, type FileTrace } from './traces.ts';

type FileNet = BoardFileInput['nets'][number];

/**
 * Board file and summary of a document that was read completely. Throws ContentError when it holds no copper, or
 * draws more than fits into memory.
 */
export function buildBoard(
  document: Ipc2581Document,
  fallbackName: string,
  damagedChunks: number,
): { board: BoardFileInput; summary: ImportSummary } {
  const findings = new Findings();
  const flattener = new Flattener();
  const resolver = new ShapeResolver(document);
  const step = chooseStep(document, findings);
  const copper = collectCopper(document, step, resolver, findings);
  const outline = buildOutline(step, copper, flattener, findings);
  const { frame } = outline;
  const planes = buildPlanes(
    { document, step, frame, flattener, findings, boardMm2: outline.areaMm2, boardCutouts: outline.cutouts },
    copper,
  );
  const usedLayers = new Set([...copper.strokes, ...copper.areas, ...planes].map(({ layer }) => layer));
  const stackup = buildStackup(document, step, usedLayers, findings);
  reportGuesses(stackup, findings);
  const coppers = stackup.filter(({ kind }) => kind === 'copper').map(({ name }) => name);
  reportEmptyLayers(document, step, coppers, findings);

  const traces = buildTraces(copper.strokes, frame, flattener, findings);
  reportHatchedPlanes(copper.strokes, findings);
  const joints = buildJoints(document, step, coppers, { frame, flattener, resolver, findings });
  const pins = buildPins(step, coppers, frame, findings);
  reportNets(step, findings);
  findings.add(
    'unresolved-references',
    resolver.unresolved,
    `${resolver.unresolved} references lead to no dictionary entry: what they draw is missing`,
  );
  findings.add('damaged-text', damagedChunks, 'some bytes do not fit the encoding: names may hold replaced characters');

  const board: BoardFileInput = {
    format: 'quietboard-board',
    version: 1,
    name: step.name === '' ? fallbackName : step.name,
    ...(outline.ringMm === undefined ? {} : { outline: [{ pointsMm: outline.ringMm }] }),
    stackup,
    ...(planes.length === 0 ? {} : { planes }),
    nets: [...step.netNames].map((name) => fileNet(name, traces.byNet, joints.byNet, pins)),
  };
  const summary: ImportSummary = {
    format: 'quietboard-import',
    source: { format: 'IPC-2581', revision: document.revision, units: document.units },
    copperLayers: coppers.length,
    nets: step.netNames.size,
    netsWithTraces: traces.netLengths.length,
    segments: traces.segments,
    arcs: traces.arcs,
    vias: joints.viaCount,
    components: step.componentCount,
    boardMm: outline.sizeMm,
    traceLengthMm: traces.lengthMm,
    netLengths: traces.netLengths,
    findings: findings.list,
  };
  return { board, summary };
}

function fileNet(
  name: string,
  traces: ReadonlyMap<string, FileTrace[]>,
  vias: ReadonlyMap<string, FileVia[]>,
  pins: ReadonlyMap<string, FilePin[]>,
): FileNet {
  const net: FileNet = { name };
  if (traces.has(name)) net.traces = traces.get(name)!;
  if (vias.has(name)) net.vias = vias.get(name)!;
  if (pins.has(name)) net.pins = pins.get(name)!;
  return net;
}

/** Exports for assembly or test hold the outer layers only: without its planes a board is judged wrongly by far. */
function reportEmptyLayers(
  document: Ipc2581Document,
  step: Step,
  coppers: readonly string[],
  findings: Findings,
): void {
  const isEmpty = (name: string): boolean => {
    const count = step.featureCounts.get(name);
    // A negative layer on which nothing is drawn is a whole plane, when it was exported at all.
    return count === undefined || (count === 0 && !document.layers.get(name)?.isNegative);
  };
  const empty = coppers.filter(isEmpty);
  const mode = document.functionMode === '' ? '' : ` (exported as ${document.functionMode})`;
  findings.add(
    'copper-layers-empty',
    empty.length,
    `nothing is drawn on copper layers ${nameList(empty)}${mode}: export all layers, without planes the result is wrong`,
  );
}

function reportNets(step: Step, findings: Findings): void {
  findings.add(
    'no-nets',
    step.netNames.size === 0 ? 1 : 0,
    'no copper carries a net name: export the board with its nets',
  );
  const bare = [...step.logicalNets].filter((name) => !step.netNames.has(name));
  findings.add(
    'nets-without-copper',
    bare.length,
    `nets of the net list without copper are left out: ${nameList(bare)}`,
  );
}
