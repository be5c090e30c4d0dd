import type { Board } from '../board/board.ts';
import { parseBoardFile, toBoard } from '../board/parse-board.ts';
import { hzToMhz, mToMm } from '../units/convert.ts';
import { CABLE_RADIUS_M, STRUCTURE_SOURCE_V, type StructureCase, wireOverPlaneOhm } from './structure-cases.ts';

/** The case as a board a user would draw: trace over a plane in air, measured impedance, cables from the edge. */
export function structureBoard(testCase: StructureCase, cellM?: number): Board {
  const { widthM, heightM, traceHeightM, traceRadiusM, sourceOhm, loadOhm, slotM, cables } = testCase;
  const outlineMm = rectangleMm([0, 0], [widthM, heightM]);
  const [startMm, endMm] = testCase.traceM.map(([x, y]): [number, number] => [mToMm(x), mToMm(y)]) as [
    [number, number],
    [number, number],
  ];
  return toBoard(
    parseBoardFile({
      format: 'quietboard-board',
      version: 1,
      name: testCase.id,
      outline: [{ pointsMm: outlineMm }],
      stackup: [
        { name: 'TOP', kind: 'copper', thicknessMm: 0 },
        { name: 'AIR', kind: 'dielectric', thicknessMm: mToMm(traceHeightM), epsilonR: 1 },
        { name: 'PLANE', kind: 'copper', thicknessMm: 0 },
      ],
      planes: [
        {
          layer: 'PLANE',
          net: 'GND',
          pointsMm: outlineMm,
          cutoutsMm: slotM === undefined ? [] : [rectangleMm(slotM[0], slotM[1])],
        },
      ],
      nets: [
        {
          name: 'LINE',
          traces: [{ layer: 'TOP', widthMm: 4 * mToMm(traceRadiusM), pointsMm: [startMm, endMm] }],
          pins: [
            { name: 'source', atMm: startMm, layer: 'TOP' },
            { name: 'load', atMm: endMm, layer: 'TOP' },
          ],
          z0Ohm: wireOverPlaneOhm(testCase),
          epsilonEff: 1,
        },
      ],
      waveforms: [
        {
          name: 'lines',
          kind: 'lines',
          lines: testCase.frequenciesHz.map((frequencyHz) => ({
            frequencyMhz: hzToMhz(frequencyHz),
            amplitudeV: STRUCTURE_SOURCE_V,
            phaseDeg: 0,
          })),
        },
      ],
      drives: [{ net: 'LINE', pin: 'source', waveform: 'lines', sourceOhm }],
      loads: [{ net: 'LINE', pin: 'load', resistanceOhm: loadOhm }],
      cables: cables.map(({ name, pointsM, farEnd }) => ({
        name,
        pointsMm: pointsM.map(([x, y, z]): [number, number, number] => [mToMm(x), mToMm(y), mToMm(z)]),
        radiusMm: mToMm(CABLE_RADIUS_M),
        farEnd,
      })),
      ...(cellM === undefined ? {} : { structure: { cellMm: mToMm(cellM) } }),
    }),
  ).board;
}

const rectangleMm = ([lowX, lowY]: readonly [number, number], [highX, highY]: readonly [number, number]) =>
  [
    [lowX, lowY],
    [highX, lowY],
    [highX, highY],
    [lowX, highY],
  ].map(([x, y]): [number, number] => [mToMm(x!), mToMm(y!)]);
