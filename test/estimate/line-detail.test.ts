import { expect, test } from 'vitest';
import { lineDetailSchema } from '../../app/contract/line-detail.ts';
import { estimate } from '../../app/estimate/estimate.ts';
import { lineDetail } from '../../app/estimate/line-detail.ts';
import { pieceFields } from '../../app/estimate/line-detail-pieces.ts';
import { lineLevel, scanRequestAt } from '../../app/estimate/line-level.ts';
import { planEstimate } from '../../app/estimate/plan.ts';
import { radiatingParts } from '../../app/estimate/radiating-parts.ts';
import { StructureResponder } from '../../app/estimate/structure-responder.ts';
import { degToRad } from '../../app/units/convert.ts';
import { driveFile, drivenBoard, L_SHAPE_MM, linesVoltage, netFile, pointAt, requestOf } from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';

const HZ = 240e6;
/** A slot of 4 mm across the trace's first leg. */
const slotted = {
  planes: [
    {
      layer: 'BOT',
      net: 'GND',
      pointsMm: [
        [0, 0],
        [70, 0],
        [70, 44],
        [0, 44],
      ] as [number, number][],
      cutoutsMm: [
        [
          [25, 6],
          [29, 6],
          [29, 22],
          [25, 22],
        ] as [number, number][],
      ],
    },
  ],
};
const cables = [
  {
    name: 'lead',
    pointsMm: [
      [70, 20, 0],
      [180, 20, 0],
      [180, 20, -500],
    ] as [number, number, number][],
    radiusMm: 1,
    farEnd: 'open' as const,
  },
];
const twoNets = drivenBoard(
  [
    netFile('A'),
    netFile('B', [
      [10, 38],
      [60, 38],
    ]),
  ],
  [driveFile('A', 'w'), driveFile('B', 'w', { delayNs: 0.7, seriesOhm: 22 })],
  [linesVoltage('w', [[240, 1]])],
  { cables },
);
const BOARDS = {
  'a whole plane, two nets, a cable': twoNets,
  'a trace over a slot, a cable': drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[240, 1]])], {
    ...slotted,
    cables,
  }),
};

const solvedRequest = requestOf({ request: { structure: 'solved' } });

test.each(Object.entries(BOARDS))('pieces of one domain add up to the level: %s', (_, file) => {
  for (const structure of ['solved', 'pair-only'] as const) {
    const { scene, table } = planEstimate(boardOf(file), requestOf({ request: { structure } }));
    const lines = table.find(({ frequencyHz }) => frequencyHz === HZ)!;
    const responder = scene.structure && new StructureResponder(scene, scene.structure, [HZ]);
    const level = lineLevel(scene, lines, responder)!;
    const place = {
      component: level.polarization,
      angleRad: degToRad(level.turntableDeg),
      heightM: level.antennaHeightM,
      request: scanRequestAt(scene, HZ),
    };
    const pieces = pieceFields(scene, lines, radiatingParts(scene, lines), place, responder?.answer(lines) ?? null);
    let [re, im, size] = [0, 0, 0];
    for (const { fields } of pieces) {
      expect(fields).toHaveLength(1);
      re += fields[0]!.re;
      im += fields[0]!.im;
      size += Math.hypot(fields[0]!.re, fields[0]!.im);
    }
    // The level comes from the solved currents and the plain sum over them; the pieces from the antenna's solution
    // (reciprocity): rounding of the solution, seen against the sum of the pieces' magnitudes.
    expect(Math.abs(Math.hypot(re, im) - level.fieldVPerM) / size).toBeLessThan(1e-9);
    expect(pieces.filter(({ layer }) => layer === 'TOP').length).toBeGreaterThanOrEqual(12);
    for (const { layer, fromM, toM } of pieces) {
      if (layer === '') continue;
      expect(Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1])).toBeLessThanOrEqual(5e-3 + 1e-12);
    }
  }
});

test('patterns, level and contributors are those of the estimate’s point', () => {
  const board = boardOf(twoNets);
  const point = pointAt(estimate(board, solvedRequest), HZ);
  const detail = lineDetail(planEstimate(board, solvedRequest), HZ);
  expect(lineDetailSchema.parse(detail)).toEqual(detail);
  expect(detail.levelDbuvPerM).toBeCloseTo(point.levelDbuvPerM, 9);
  expect(detail.turntableDeg).toBe(point.turntableDeg);
  expect(detail.antennaHeightM).toBe(point.antennaHeightM);
  const { azimuth, height } = detail;
  const own = point.polarization === 'horizontal' ? 'horizontalDbuvPerM' : 'verticalDbuvPerM';
  expect(Math.max(...azimuth[own])).toBeCloseTo(point.levelDbuvPerM, 9);
  expect(Math.max(...height[own])).toBeCloseTo(point.levelDbuvPerM, 9);
  expect(azimuth[own][azimuth.turntableDeg.indexOf(point.turntableDeg)]).toBeCloseTo(point.levelDbuvPerM, 9);
  // The other polarisation has its maximum elsewhere: nowhere above the point's.
  const other = own === 'horizontalDbuvPerM' ? 'verticalDbuvPerM' : 'horizontalDbuvPerM';
  for (const pattern of [azimuth, height]) expect(Math.max(...pattern[other])).toBeLessThanOrEqual(point[other] + 1e-6);
  expect(azimuth.turntableDeg[0]).toBe(0);
  expect(azimuth.turntableDeg.at(-1)).toBe(360);
  expect(azimuth[own].at(-1)).toBeCloseTo(azimuth[own][0]!, 9);
  for (const [i, deg] of azimuth.turntableDeg.entries())
    if (i > 0) expect(deg - azimuth.turntableDeg[i - 1]!).toBeLessThanOrEqual(2);
  expect(height.antennaHeightM[0]).toBe(1);
  expect(height.antennaHeightM.at(-1)).toBe(4);
});

test('pieces are listed strongest first, their current is that of the line', () => {
  // 60 mm at 30 MHz, short against the wave: I = U/(R + load) nearly everywhere, 1 V/(30 + 75) Ω.
  const file = drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[30, 1]])]);
  const detail = lineDetail(planEstimate(boardOf(file), solvedRequest), 30e6);
  const levels = detail.pieces.map(({ levelDbuvPerM }) => levelDbuvPerM);
  expect(levels).toEqual([...levels].sort((a, b) => b - a));
  for (const { currentRmsA } of detail.pieces) expect(currentRmsA).toBeCloseTo(1 / 105 / Math.SQRT2, 3);
  // Two pins, 60 mm in 5 mm pieces (39 mm: 8, 21 mm: 5).
  expect(detail.pieces.filter(({ layer }) => layer === 'TOP')).toHaveLength(13);
  expect(detail.currentMap?.frequencyHz).toBe(30e6);
  expect(detail.currentMap?.cells.length).toBeGreaterThan(50);
});

test('a piece radiates what the same stretch does as a section of its own', () => {
  // The trace with and without a joint after two of the eight pieces of its first leg.
  const [from, bend, end] = L_SHAPE_MM as [[number, number], [number, number], [number, number]];
  const joint: [number, number] = [from[0] + (bend[0] - from[0]) / 4, from[1]];
  const fieldOfStart = (pointsMm: [number, number][]) => {
    const net = netFile('A', pointsMm);
    const file = drivenBoard([net], [driveFile('A', 'w')], [linesVoltage('w', [[240, 1]])]);
    const { scene, table } = planEstimate(boardOf(file), solvedRequest);
    const place = { component: 'horizontal', angleRad: 1, heightM: 1.7, request: scanRequestAt(scene, HZ) } as const;
    const answer = new StructureResponder(scene, scene.structure!, [HZ]).answer(table[0]!);
    const pieces = pieceFields(scene, table[0]!, radiatingParts(scene, table[0]!), place, answer);
    const own = pieces.filter(({ layer, toM }) => layer === 'TOP' && toM[1] < 13e-3 && toM[0] < joint[0] * 1e-3 + 1e-6);
    const all = own.flatMap(({ fields }) => fields);
    return {
      count: own.length,
      re: all.reduce((sum, { re }) => sum + re, 0),
      im: all.reduce((sum, { im }) => sum + im, 0),
    };
  };
  const whole = fieldOfStart([from, bend, end]);
  const jointed = fieldOfStart([from, joint, bend, end]);
  expect(whole.count).toBe(2);
  // What acts on the plane is shared out by half cells (a few millimetres of these ten): a few per cent at the border.
  const size = Math.hypot(jointed.re, jointed.im);
  expect(Math.hypot(whole.re - jointed.re, whole.im - jointed.im) / size).toBeLessThan(0.03);
});

test('domains add as powers: the maps and, piece by piece, the levels at one place', () => {
  const { A, both } = { A: netFile('A'), both: [linesVoltage('w', [[240, 1]]), linesVoltage('v', [[240, 1]])] };
  const drives = [driveFile('A', 'w'), driveFile('A', 'v', { pin: 'U2.A' })];
  const { scene, table } = planEstimate(boardOf(drivenBoard([A], drives, both, { loads: [] })), solvedRequest);
  const row = table.find(({ frequencyHz }) => frequencyHz === HZ)!;
  const place = { component: 'horizontal', angleRad: 1, heightM: 1.7, request: scanRequestAt(scene, HZ) } as const;
  const fieldsOf = (lines: typeof row) => {
    const responder = new StructureResponder(scene, scene.structure!, [HZ]);
    return pieceFields(scene, lines, radiatingParts(scene, lines), place, responder.answer(lines));
  };
  const together = fieldsOf(row);
  const alone = row.lines.map((line) => fieldsOf({ ...row, lines: [line] }));
  expect(alone).toHaveLength(2);
  for (const [i, { fields, currentRmsA }] of together.entries()) {
    for (const { domain, re, im } of fields) {
      const own = alone.map((pieces) => pieces[i]!.fields[0]!).find((field) => field.domain === domain)!;
      expect([re, im]).toEqual([own.re, own.im]);
    }
    expect(currentRmsA).toBeCloseTo(Math.hypot(...alone.map((pieces) => pieces[i]!.currentRmsA)), 12);
  }
});

test('a line that the estimate does not have is refused; stop ends the work', () => {
  const plan = planEstimate(boardOf(twoNets), solvedRequest);
  expect(() => lineDetail(plan, 241e6)).toThrow(/lines/);
  expect(() => lineDetail(plan, HZ, { stop: () => true })).toThrow('stopped');
});

test('above the solved range the pair alone radiates', () => {
  const file = drivenBoard([netFile('A')], [driveFile('A', 'w')], [linesVoltage('w', [[1500, 1]])], slotted);
  const request = requestOf({ request: { structure: 'solved', maxHz: 2e9 } });
  const detail = lineDetail(planEstimate(boardOf(file), request), 1.5e9);
  expect(detail.currentMap).toBeNull();
  const point = pointAt(estimate(boardOf(file), request), 1.5e9);
  expect(detail.levelDbuvPerM).toBeCloseTo(point.levelDbuvPerM, 9);
  expect(detail.pieces.filter(({ layer }) => layer === 'TOP')).toHaveLength(13);
});
