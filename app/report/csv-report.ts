import type { Contributor, EstimateResult, ResultPoint } from '../estimate/result.ts';
import { mainContributor } from './contributor-text.ts';
import { type Cell, csvText } from './csv-text.ts';
import { inListOrder, type Mechanism, MechanismList, mechanismText } from './mechanisms.ts';
import { mechanismLevels } from './radiation.ts';
import { standingOf } from './verdict.ts';

/**
 * The points as a table for a spreadsheet (`csvText`).
 * One row a point, worst margin first; after the fixed columns one column a mechanism with what all contributors radiate
 * through it (added as powers), then one a contributor with its level at that point; empty where there is none. Numbers are unrounded; what is not finite is an empty cell. Text that a spreadsheet would
 * take for a formula gets a leading apostrophe. Each contributor's own paths stand in the JSON result.
 */
export function csvReport(result: EstimateResult): string {
  const contributors = contributorColumns(result.points);
  const list = new MechanismList();
  const byMechanism = result.points.map((point) => mechanismLevels(point, list));
  const mechanisms = [...new Set(byMechanism.flatMap((levels) => [...levels.keys()]))].sort(inListOrder);
  const rows: Cell[][] = [
    [
      ...FIXED_COLUMNS.map(([head]) => head),
      ...mechanisms.map((mechanism) => `via ${mechanismHead(mechanism)} (dBuV/m)`),
      ...contributors.map(({ kind, name }) => `${kind} ${name} (dBuV/m)`),
    ],
    ...result.points.map((point, i) => {
      const levels = new Map(point.contributors.map((each) => [keyOf(each), each.levelDbuvPerM]));
      return [
        ...FIXED_COLUMNS.map(([, cell]) => cell(point, result)),
        ...mechanisms.map((mechanism) => byMechanism[i]!.get(mechanism) ?? ''),
        ...contributors.map((column) => levels.get(keyOf(column)) ?? ''),
      ];
    }),
  ];
  return csvText(rows);
}

const FIXED_COLUMNS: readonly (readonly [head: string, cell: (point: ResultPoint, result: EstimateResult) => Cell])[] =
  [
    ['frequency (Hz)', (point) => point.frequencyHz],
    ['detector', (point) => point.detector],
    ['level (dBuV/m)', (point) => point.levelDbuvPerM],
    ['limit (dBuV/m)', (point) => point.limitDbuvPerM],
    ['margin (dB)', (point) => point.marginDb],
    ['standing', (point, { limit }) => standingOf(point, limit.requiredMarginDb)],
    ['polarization', (point) => point.polarization],
    ['antenna height (m)', (point) => point.antennaHeightM],
    ['turntable (deg)', (point) => point.turntableDeg],
    ['horizontal (dBuV/m)', (point) => point.horizontalDbuvPerM],
    ['vertical (dBuV/m)', (point) => point.verticalDbuvPerM],
    ['upper bound (dBuV/m)', (point) => point.upperBoundDbuvPerM],
    ['main contributor', (point) => mainContributor(point)?.contributor.name ?? ''],
    ['radiates mainly from', (point) => mainContributor(point)?.path?.name ?? ''],
  ];

const mechanismHead = (mechanism: Mechanism): string => mechanismText(mechanism, (name) => `cable ${name}`);

const keyOf = ({ kind, name }: Contributor): string => JSON.stringify([kind, name]);

/** Every contributor once, in order of first appearance: the ones that matter come first. */
function contributorColumns(points: readonly ResultPoint[]): Contributor[] {
  const columns = new Map<string, Contributor>();
  for (const point of points) {
    for (const contributor of point.contributors) {
      const key = keyOf(contributor);
      if (!columns.has(key)) columns.set(key, contributor);
    }
  }
  return [...columns.values()];
}
