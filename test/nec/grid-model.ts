import { CABLE_RADIUS_M, STRUCTURE_SOURCE_V, type StructureCase } from '../../app/validate/structure-cases.ts';
import type { NecDeck, NecGrid, NecPointM, NecWire } from '../support/nec2c.ts';

const TABLE_HEIGHT_M = 0.8;
const GRID = 1;
const TRACE = 2;
const SOURCE_END = 3;
const LOAD_END = 4;
/** Tag of the first cable; the others follow. */
export const FIRST_CABLE = 5;
/** Source and load sit on the middle one. */
const RISER_SEGMENTS = 3;

interface Strip {
  readonly centreM: number;
  readonly widthM: number;
}

/**
 * Strips of a side. One that holds an end of the trace or a joint is cut into an odd number so that its centre stays a node
 * whatever the division.
 */
function stripsOf(lengthM: number, pitchM: number, divisions: number, keptM: readonly number[]): Strip[] {
  const count = Math.round(lengthM / pitchM);
  return Array.from({ length: count }, (_, i) => i).flatMap((i) => {
    const isKept = keptM.some((at) => Math.abs(at - (i + 0.5) * pitchM) < pitchM * 1e-6);
    const parts = isKept && divisions % 2 === 0 ? divisions + 1 : divisions;
    const widthM = pitchM / parts;
    return Array.from({ length: parts }, (_, k) => ({ centreM: i * pitchM + (k + 0.5) * widthM, widthM }));
  });
}

type Place = (xM: number, yM: number, zM: number) => NecPointM;

/**
 * The case as wires over a perfect ground, as the board lies or stands on the table. A wire of radius (strip width)/2π in the middle
 * of each strip stands for the strip: its inductance and capacitance are the sheet's (physics: the grid's wires then add
 * no reactance of their own); outer wires half a strip inside the outline.
 */
export function gridDeck(
  testCase: StructureCase,
  divisions: number,
  frequenciesHz: readonly number[],
  grids: readonly NecGrid[],
): NecDeck {
  const { widthM, heightM, traceHeightM, orientation, sourceOhm, loadOhm, cables } = testCase;
  const place: Place = (x, y, z) =>
    orientation === 'flat'
      ? [x - widthM / 2, y - heightM / 2, z + TABLE_HEIGHT_M]
      : [x - widthM / 2, traceHeightM / 2 - z, y + TABLE_HEIGHT_M];
  const middle = (RISER_SEGMENTS + 1) / 2;
  return {
    wires: [
      ...gridWires(testCase, divisions, place),
      ...traceWires(testCase, divisions, place),
      ...cables.flatMap((_, i) => cableWires(testCase, i, divisions, place)),
    ],
    ground: 'perfect',
    sources: [{ tag: SOURCE_END, segment: middle, voltageRe: STRUCTURE_SOURCE_V }],
    loads: [
      { tag: SOURCE_END, segment: middle, resistanceOhm: sourceOhm },
      { tag: LOAD_END, segment: middle, resistanceOhm: loadOhm },
    ],
    frequenciesHz,
    grids,
  };
}

function gridWires(testCase: StructureCase, divisions: number, place: Place): NecWire[] {
  const { widthM, heightM, pitchM, traceM, cables, slotM } = testCase;
  const ends = [...traceM, ...cables.map(({ pointsM }) => pointsM[0]!)];
  const columns = stripsOf(
    widthM,
    pitchM,
    divisions,
    ends.map(([x]) => x),
  );
  const rows = stripsOf(
    heightM,
    pitchM,
    divisions,
    ends.map(([, y]) => y),
  );
  const isCopper = (column: Strip, row: Strip): boolean =>
    slotM === undefined ||
    column.centreM < slotM[0][0] ||
    column.centreM > slotM[1][0] ||
    row.centreM < slotM[0][1] ||
    row.centreM > slotM[1][1];
  const wires: NecWire[] = [];
  const join = (fromColumn: Strip, fromRow: Strip, column: Strip, row: Strip, stripM: number): void => {
    if (!isCopper(fromColumn, fromRow) || !isCopper(column, row)) return;
    wires.push({
      tag: GRID,
      segments: 1,
      fromM: place(fromColumn.centreM, fromRow.centreM, 0),
      toM: place(column.centreM, row.centreM, 0),
      radiusM: stripM / (2 * Math.PI),
    });
  };
  for (const [r, row] of rows.entries()) {
    for (const [c, column] of columns.entries()) {
      if (c > 0) join(columns[c - 1]!, row, column, row, row.widthM);
      if (r > 0) join(column, rows[r - 1]!, column, row, column.widthM);
    }
  }
  return wires;
}

/** Riser with the source, trace, riser with the load, in the direction of the positive current. */
function traceWires(
  { traceM: [start, end], traceHeightM, traceRadiusM, pitchM }: StructureCase,
  divisions: number,
  place: Place,
): NecWire[] {
  const lengthM = Math.hypot(end[0] - start[0], end[1] - start[1]);
  const corners = [
    place(...start, 0),
    place(...start, traceHeightM),
    place(...end, traceHeightM),
    place(...end, 0),
  ] as const;
  const wire = (tag: number, segments: number, from: number): NecWire => ({
    tag,
    segments,
    fromM: corners[from]!,
    toM: corners[from + 1]!,
    radiusM: traceRadiusM,
  });
  return [
    wire(SOURCE_END, RISER_SEGMENTS, 0),
    wire(TRACE, Math.round((2 * divisions * lengthM) / pitchM), 1),
    wire(LOAD_END, RISER_SEGMENTS, 2),
  ];
}

/** Lengths of the first segments; then 20 mm. */
const GRADED_M = [5e-3, 5e-3, 5e-3, 5e-3, 10e-3, 10e-3];
const LONGEST_M = 20e-3;

/** From the outermost node, half a strip inside the edge, along the drawn points. */
function cableWires(
  { cables, widthM, pitchM }: StructureCase,
  index: number,
  divisions: number,
  place: Place,
): NecWire[] {
  const { pointsM } = cables[index]!;
  const [edgeX, y, z] = pointsM[0]!;
  const inwardM = pitchM / divisions / 2;
  let at: readonly [number, number, number] = [edgeX === widthM ? edgeX - inwardM : edgeX + inwardM, y, z];
  const wires: NecWire[] = [];
  const add = (to: readonly [number, number, number], segments: number): void => {
    wires.push({ tag: FIRST_CABLE + index, segments, fromM: place(...at), toM: place(...to), radiusM: CABLE_RADIUS_M });
    at = to;
  };
  for (const [corner, to] of pointsM.slice(1).entries()) {
    const from = at;
    const lengthM = Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);
    let doneM = 0;
    for (const stepM of corner === 0 ? GRADED_M : []) {
      doneM += stepM;
      const t = doneM / lengthM;
      add([from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1]), from[2] + t * (to[2] - from[2])], 1);
    }
    add(to, Math.ceil((lengthM - doneM) / LONGEST_M - 1e-9));
  }
  return wires;
}
