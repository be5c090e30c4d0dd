import {
  type Ipc2581Document,
  isCopperFunction,
  isDielectricFunction,
  type Stackup,
  type StackupRow,
} from '../document.ts';
import { type Findings, nameList } from './findings.ts';
import { roundMm } from './frame.ts';
import { MaterialFinder } from './material.ts';

/** A physical row, top first. */
export interface PhysicalRow {
  readonly name: string;
  readonly kind: 'copper' | 'dielectric' | 'mask';
  readonly thicknessMm: number;
  readonly epsilonR: number | undefined;
  readonly lossTangent: number | undefined;
}

/** The physical rows of the board's stackup as written: copper, dielectric, and solder mask; nothing is added. */
export function physicalRows(document: Ipc2581Document, stepName: string, findings: Findings): PhysicalRow[] {
  const materials = new MaterialFinder(document);
  const stackup = chooseStackup(document, findings);
  if (stackup === undefined) return [];
  const rows: PhysicalRow[] = [];
  for (const row of chooseRows(document, stackup, stepName, findings)) {
    const material = materials.find(row);
    const kind = kindOf(document, row, material.text);
    if (kind === undefined || isAir(material.text)) continue;
    const { thicknessMm, layerRef: name } = row;
    rows.push({ name, kind, thicknessMm, epsilonR: material.epsilonR, lossTangent: material.lossTangent });
  }
  findings.add(
    'spec-ref-dangling',
    materials.dangling,
    `${materials.dangling} material references lead to no entry: the entries were looked up by the layers' names`,
  );
  return topFirst(document, dropCovered(rows), findings);
}

/** Rows outside that are no board material: zero-thick dielectric anywhere, mask between coppers. */
function dropCovered(rows: readonly PhysicalRow[]): PhysicalRow[] {
  const first = rows.findIndex((row) => row.kind === 'copper');
  const last = rows.findLastIndex((row) => row.kind === 'copper');
  return rows.filter((row, i) => {
    if (row.kind === 'copper') return true;
    return roundMm(row.thicknessMm) > 0 && (row.kind === 'dielectric' || i < first || i > last);
  });
}

/** By layerFunction; a row that is no declared layer is dielectric unless its material says otherwise. */
function kindOf(document: Ipc2581Document, row: StackupRow, materialText: string): PhysicalRow['kind'] | undefined {
  const layer = document.layers.get(row.layerRef);
  if (layer === undefined) {
    if (/copper/i.test(materialText)) return 'copper';
    return /solder.?(mask|resist)/i.test(materialText) ? 'mask' : 'dielectric';
  }
  if (isCopperFunction(layer.layerFunction)) return 'copper';
  if (isDielectricFunction(layer.layerFunction)) return 'dielectric';
  return layer.layerFunction === 'SOLDERMASK' ? 'mask' : undefined;
}

/** Some revision A stackups begin and end with a row of air. */
const isAir = (materialText: string): boolean => /^\s*air\s*$/i.test(materialText);

function chooseStackup(document: Ipc2581Document, findings: Findings): Stackup | undefined {
  const { stackups } = document;
  findings.add(
    'several-stackups',
    stackups.length > 1 ? stackups.length : 0,
    `the file holds ${stackups.length} stackups (a rigid-flex board?): only the main one is imported, for the whole board`,
  );
  const primary = stackups.find(({ name }) => name.toUpperCase() === 'PRIMARY');
  if (primary !== undefined) return primary;
  const coppers = (stackup: Stackup): number =>
    copperNames(
      document,
      stackup.groups.flatMap(({ rows }) => rows),
    ).size;
  return stackups.reduce<Stackup | undefined>(
    (best, next) => (best === undefined || coppers(next) > coppers(best) ? next : best),
    undefined,
  );
}

const copperNames = (document: Ipc2581Document, rows: readonly StackupRow[]): Set<string> =>
  new Set(
    rows.map((row) => row.layerRef).filter((name) => isCopperFunction(document.layers.get(name)?.layerFunction ?? '')),
  );

/**
 * Rows of all groups in order, or of one group when the groups repeat each other: a panel may hold the whole board
 * twice, once for each step, and the sum would be twice the true thickness.
 */
function chooseRows(document: Ipc2581Document, stackup: Stackup, stepName: string, findings: Findings): StackupRow[] {
  const groups = topLevelGroups(document, stackup);
  const all = groups.flatMap(({ rows }) => rows);
  const coppers = copperNames(document, all);
  const isRepeated = all.filter((row) => coppers.has(row.layerRef)).length > coppers.size;
  if (!isRepeated) return inSequence(groups.map(({ rows }) => rows));

  const complete = groups.filter(({ rows }) => copperNames(document, rows).size === coppers.size);
  const own = complete.find(({ name }) => stepName !== '' && name.includes(stepName));
  const seen = new Set<string>();
  const kept = (own === undefined ? groups : [own]).map(({ rows }) =>
    rows.filter(({ layerRef }) => !seen.has(layerRef) && seen.add(layerRef)),
  );
  const dropped = all.length - kept.flat().length;
  findings.add(
    'stackup-repeated',
    dropped,
    `the stackup repeats its layers: ${nameList([...coppers])}; ${dropped} repeated rows are left out`,
  );
  return inSequence(kept);
}

/** A row may stand for a whole group; such a group is put in its place and counts only there. */
function topLevelGroups(document: Ipc2581Document, stackup: Stackup): { name: string; rows: StackupRow[] }[] {
  const byName = new Map(stackup.groups.map((group) => [group.name, group]));
  const nested = new Set<string>();
  for (const { rows } of stackup.groups) {
    for (const { layerRef } of rows) if (!document.layers.has(layerRef) && byName.has(layerRef)) nested.add(layerRef);
  }
  const expand = (row: StackupRow): StackupRow[] => (nested.has(row.layerRef) ? byName.get(row.layerRef)!.rows : [row]);
  return stackup.groups
    .filter(({ name }) => !nested.has(name))
    .map(({ name, rows }) => ({ name, rows: rows.flatMap(expand) }));
}

/** By `sequence` when every row has one; over all groups when no number repeats, else inside each group. */
function inSequence(groups: readonly (readonly StackupRow[])[]): StackupRow[] {
  const all = groups.flat();
  const numbers = new Set(all.map(({ sequence }) => sequence));
  if (numbers.has(undefined)) return all;
  const sorted = (rows: readonly StackupRow[]): StackupRow[] => rows.toSorted((p, q) => p.sequence! - q.sequence!);
  return numbers.size === all.length ? sorted(all) : groups.flatMap(sorted);
}

/** Rows come top first; a file that begins with the bottom side is turned over. */
function topFirst(document: Ipc2581Document, rows: PhysicalRow[], findings: Findings): PhysicalRow[] {
  const side = (row: PhysicalRow | undefined): string => document.layers.get(row?.name ?? '')?.side ?? '';
  const coppers = rows.filter(({ kind }) => kind === 'copper');
  if (side(coppers[0]) !== 'BOTTOM' || side(coppers.at(-1)) !== 'TOP') return rows;
  findings.add('stackup-reversed', 1, 'the stackup begins with the bottom side: its rows are turned over');
  return rows.toReversed();
}
