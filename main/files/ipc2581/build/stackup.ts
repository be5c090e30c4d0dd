import type { BoardFileInput } from '../../../../app/board/board-file.ts';
import { type Ipc2581Document, isCopperFunction, type Step } from '../document.ts';
import { type Findings, nameList } from './findings.ts';
import { roundMm } from './frame.ts';
import { type PhysicalRow, physicalRows } from './stackup-rows.ts';
import { UniqueNames } from './unique-names.ts';

type FileRow = BoardFileInput['stackup'][number];

/** Guess for FR-4 laminate without a stated permittivity; every row that uses it is marked. */
const GUESSED_EPSILON_R = 4.3;
/** Solder mask without one: 3.3 to 3.8 is common practice. */
const GUESSED_MASK_EPSILON_R = 3.5;
/** Common practice where a file says nothing: 1.6 mm board, 35 µm copper. */
const GUESSED_BOARD_MM = 1.6;
const GUESSED_COPPER_MM = 0.035;
/** Between two coppers when the stated thickness leaves nothing, or only what rounding left. */
const GUESSED_GAP_MM = 0.2;
const THINNEST_GAP_MM = 0.01;
/** Stated and summed thickness may differ by mask, paste and rounding. */
const THICKNESS_TOLERANCE = 0.02;

/**
 * Stackup rows of the board file, top first: copper, dielectric, and solder mask as thin dielectric on the outside.
 * Neighbouring dielectrics stay rows of their own. `usedLayers` hold traces or planes: they are never dropped, and
 * added where the file's stackup lacks them.
 */
export function buildStackup(
  document: Ipc2581Document,
  step: Step,
  usedLayers: ReadonlySet<string>,
  findings: Findings,
): FileRow[] {
  const written = physicalRows(document, step.name, findings);
  const rows = addMissingCoppers(document, step, dropEmptyCoppers(written, usedLayers, findings), usedLayers, findings);
  const statedMm = document.stackups.reduce((most, { overallThicknessMm }) => Math.max(most, overallThicknessMm), 0);
  const complete = fillGaps(rows, statedMm, findings);
  if (written.length > 0) checkThickness(complete, statedMm, findings);
  return withUniqueNames(complete.map((row) => toFileRow(row)));
}

/** Helper layers of zero thickness that hold pads at most (drill pads) are no copper of the board. */
function dropEmptyCoppers(rows: PhysicalRow[], usedLayers: ReadonlySet<string>, findings: Findings): PhysicalRow[] {
  const isEmpty = (row: PhysicalRow): boolean =>
    row.kind === 'copper' && row.thicknessMm === 0 && !usedLayers.has(row.name);
  const dropped = rows.filter(isEmpty).map(({ name }) => name);
  findings.add(
    'copper-layer-dropped',
    dropped.length,
    `copper layers of zero thickness without traces or planes are left out: ${nameList(dropped)}`,
  );
  return rows.filter((row) => !isEmpty(row));
}

/** Adds copper layers the stackup lacks: without any stackup all declared ones, else those that are used. */
function addMissingCoppers(
  document: Ipc2581Document,
  step: Step,
  rows: PhysicalRow[],
  usedLayers: ReadonlySet<string>,
  findings: Findings,
): PhysicalRow[] {
  const present = new Set(rows.map(({ name }) => name));
  const hasStackup = rows.some(({ kind }) => kind === 'copper');
  const missing = [...document.layers.values()].filter(
    ({ name, layerFunction }) =>
      isCopperFunction(layerFunction) &&
      !present.has(name) &&
      (usedLayers.has(name) || (!hasStackup && (step.featureCounts.get(name) ?? 0) > 0)),
  );
  if (missing.length === 0) return rows;
  const names = nameList(missing.map(({ name }) => name));
  if (hasStackup) {
    const message = `copper layers with traces or planes are not in the stackup and were added: ${names}`;
    findings.add('layer-not-in-stackup', missing.length, message);
  } else {
    const message = `the file states no stackup: copper layers ${names}, evenly spaced, are a guess to be edited`;
    findings.add('no-stackup', missing.length, message);
  }
  const copper = (name: string): PhysicalRow => ({
    name,
    kind: 'copper',
    thicknessMm: GUESSED_COPPER_MM,
    epsilonR: undefined,
    lossTangent: undefined,
  });
  const onSide = (side: string): PhysicalRow[] =>
    missing.filter((layer) => layer.side === side).map(({ name }) => copper(name));
  const inside = missing.filter(({ side }) => side !== 'TOP' && side !== 'BOTTOM').map(({ name }) => copper(name));
  const last = rows.findLastIndex(({ kind }) => kind === 'copper');
  const [above, below] = last > 0 ? [rows.slice(0, last), rows.slice(last)] : [rows, []];
  return [...onSide('TOP'), ...above, ...inside, ...below, ...onSide('BOTTOM')];
}

/** Puts a guessed dielectric between coppers that would touch, and below a single copper. */
function fillGaps(rows: PhysicalRow[], statedMm: number, findings: Findings): PhysicalRow[] {
  const isCopper = (row: PhysicalRow | undefined): boolean => row?.kind === 'copper';
  const isSingle = rows.filter(isCopper).length === 1 && !rows.some(({ kind }) => kind === 'dielectric');
  const gaps = rows.filter((row, i) => isCopper(row) && (isCopper(rows[i + 1]) || isSingle)).length;
  if (gaps === 0) return rows;
  const knownMm = rows.reduce((sum, { thicknessMm }) => sum + thicknessMm, 0);
  const freeMm = (statedMm > 0 ? statedMm : GUESSED_BOARD_MM) - knownMm;
  const thicknessMm = freeMm / gaps >= THINNEST_GAP_MM ? freeMm / gaps : GUESSED_GAP_MM;
  findings.add(
    'dielectric-guessed',
    gaps,
    `${gaps} gaps between copper layers have no dielectric in the file: ${roundMm(thicknessMm)} mm each is a guess`,
  );
  let count = 0;
  return rows.flatMap((row, i): PhysicalRow[] => {
    if (!isCopper(row) || !(isCopper(rows[i + 1]) || isSingle)) return [row];
    const name = `guessed dielectric ${++count}`;
    return [row, { name, kind: 'dielectric', thicknessMm, epsilonR: undefined, lossTangent: undefined }];
  });
}

/** The stated thickness may count masks or not; it should match one of both. */
function checkThickness(rows: readonly PhysicalRow[], statedMm: number, findings: Findings): void {
  const sum = (counted: readonly PhysicalRow[]): number => counted.reduce((mm, { thicknessMm }) => mm + thicknessMm, 0);
  const withMaskMm = sum(rows);
  const boardMm = sum(rows.filter(({ kind }) => kind !== 'mask'));
  const laminateMm = sum(rows.filter(({ kind }) => kind === 'dielectric'));
  const fits = [withMaskMm, boardMm, laminateMm].some(
    (mm) => Math.abs(mm - statedMm) <= THICKNESS_TOLERANCE * statedMm,
  );
  if (statedMm === 0 || fits) return;
  const message = `the stackup's rows add up to ${roundMm(boardMm)} mm, but ${roundMm(statedMm)} mm is stated: the rows are used`;
  findings.add('stackup-thickness-differs', 1, message);
}

function toFileRow({ name, kind, thicknessMm, epsilonR, lossTangent }: PhysicalRow): FileRow {
  if (kind === 'copper') return { name, kind, thicknessMm: roundMm(thicknessMm) };
  const guess = kind === 'mask' ? GUESSED_MASK_EPSILON_R : GUESSED_EPSILON_R;
  return {
    name,
    kind: 'dielectric',
    thicknessMm: roundMm(thicknessMm),
    epsilonR: epsilonR ?? guess,
    ...(lossTangent === undefined ? {} : { lossTangent }),
    ...(epsilonR === undefined ? { guessed: true } : {}),
  };
}

/** A material may lie in the board several times under one name; rows of the board file need names of their own. */
function withUniqueNames(rows: FileRow[]): FileRow[] {
  const names = new UniqueNames(rows.filter(({ kind }) => kind === 'copper').map(({ name }) => name));
  return rows.map((row) => (row.kind === 'copper' ? row : { ...row, name: names.free(row.name) }));
}

/** Says how many rows got a guessed permittivity. */
export function reportGuesses(rows: readonly FileRow[], findings: Findings): void {
  const guessed = rows.filter((row) => row.kind === 'dielectric' && row.guessed);
  const names = nameList(guessed.map(({ name }) => name));
  findings.add(
    'epsilon-guessed',
    guessed.length,
    `no permittivity stated for ${names}: ${GUESSED_EPSILON_R} (solder mask ${GUESSED_MASK_EPSILON_R}) is a guess to be edited`,
  );
}
