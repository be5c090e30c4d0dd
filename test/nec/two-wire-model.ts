import { NEC_SOURCE_V, type NecCase } from '../../app/validate/nec-cases.ts';
import { type NecDeck, type NecGrid, type NecPointM, type NecWire, necColumn } from '../support/nec2c.ts';

const TABLE_HEIGHT_M = 0.8;
/** Tags: trace, load end, return, source end, in the direction of the positive current. */
const TRACE = 1;
const LOAD_END = 2;
const RETURN = 3;
const SOURCE_END = 4;

/** How finely the model is cut: odd numbers on the end wires put source and load in their middle. */
export interface NecMesh {
  readonly endSegments: number;
  readonly sideSegments: number;
}

/** Sides cut like the ends. */
export const meshOf = ({ lengthM, spacingM }: NecCase, endSegments: number): NecMesh => ({
  endSegments,
  sideSegments: Math.ceil((lengthM * endSegments) / spacingM),
});

/** Four wires in site axes (z = 0 the ground), centred on the turntable axis, as the board lies or stands on the table. */
export function twoWireDeck(testCase: NecCase, mesh: NecMesh, grids: readonly NecGrid[]): NecDeck {
  const corners = cornersM(testCase);
  const wire = (tag: number, segments: number): NecWire => ({
    tag,
    segments,
    fromM: corners[tag - 1]!,
    toM: corners[tag % 4]!,
    radiusM: testCase.wireRadiusM,
  });
  const middle = (mesh.endSegments + 1) / 2;
  return {
    wires: [
      wire(TRACE, mesh.sideSegments),
      wire(LOAD_END, mesh.endSegments),
      wire(RETURN, mesh.sideSegments),
      wire(SOURCE_END, mesh.endSegments),
    ],
    ground: 'perfect',
    sources: [{ tag: SOURCE_END, segment: middle, voltageRe: NEC_SOURCE_V }],
    loads: [
      { tag: SOURCE_END, segment: middle, resistanceOhm: testCase.sourceOhm },
      { tag: LOAD_END, segment: middle, resistanceOhm: testCase.loadOhm },
    ],
    frequenciesHz: testCase.frequenciesHz,
    grids,
  };
}

/** Start of trace, end of trace, end of return, start of return. */
function cornersM({ lengthM, spacingM, along, orientation }: NecCase): NecPointM[] {
  const halfL = lengthM / 2;
  const halfD = spacingM / 2;
  const board: [number, number][] =
    along === 'x'
      ? [
          [-halfL, halfD],
          [halfL, halfD],
          [halfL, -halfD],
          [-halfL, -halfD],
        ]
      : [
          [-halfD, -halfL],
          [-halfD, halfL],
          [halfD, halfL],
          [halfD, -halfL],
        ];
  const lowestYM = Math.min(...board.map(([, y]) => y));
  return board.map(([x, y]) =>
    orientation === 'flat' ? [x, y, TABLE_HEIGHT_M] : [x, 0, y - lowestYM + TABLE_HEIGHT_M],
  );
}

/** Antenna positions: every `angleStepDeg` around, every `heightStepM` from 1 m to 4 m. */
export interface ScanGrid {
  readonly distanceM: number;
  readonly angleStepDeg: number;
  readonly heightStepM: number;
}

const ANTENNA_LOWEST_M = 1;
const ANTENNA_TRAVEL_M = 3;

export const heightsOf = ({ heightStepM }: ScanGrid): number => Math.round(ANTENNA_TRAVEL_M / heightStepM) + 1;
export const anglesOf = ({ angleStepDeg }: ScanGrid): number => Math.round(360 / angleStepDeg);

export const scanColumns = (scan: ScanGrid): NecGrid[] =>
  Array.from({ length: anglesOf(scan) }, (_, index) =>
    necColumn(
      scan.distanceM,
      (index * scan.angleStepDeg * Math.PI) / 180,
      ANTENNA_LOWEST_M,
      scan.heightStepM,
      heightsOf(scan),
    ),
  );
