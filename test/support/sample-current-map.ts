import type { StructureCurrentMap } from '../../app/estimate/result.ts';

/** Invented currents on the sample board (92 × 58 mm, a cut corner, a slot), shaped like the real ones, but no physics. */

const CELL_M = 4e-3;
/** Places from which the current spreads, m: ends of the clock's trace and the joint of the cable. */
const SOURCES: readonly (readonly [x: number, y: number, weight: number])[] = [
  [0.022, 0.034, 1],
  [0.078, 0.018, 0.8],
  [0.052, 0.038, 0.9],
  [0.092, 0.024, 0.3],
];

const isCopper = (x: number, y: number): boolean => {
  const isCut = x - 0.084 + (y - 0.05) > 0.008;
  const isSlot = x > 0.055 && x < 0.059 && y > 0.014 && y < 0.034;
  return !isCut && !isSlot;
};

export function sampleCurrentMap(frequencyHz: number): StructureCurrentMap {
  const kPerM = (2 * Math.PI * frequencyHz) / 299_792_458;
  const strength = 2e-3 * (100e6 / frequencyHz) ** 0.5;
  const cells = Array.from({ length: 14 * 23 }, (_, i): readonly [number, number] => [
    CELL_M * ((i % 23) + 0.5),
    CELL_M * (Math.floor(i / 23) + 0.5),
  ])
    .filter(([x, y]) => isCopper(x, y))
    .map((atM) => ({
      atM,
      densityRmsAPerM: SOURCES.reduce(
        (sum, [x, y, weight]) => sum + (strength * weight) / (1 + (Math.hypot(atM[0] - x, atM[1] - y) / 0.006) ** 2),
        0,
      ),
    }));
  return {
    frequencyHz,
    cellM: CELL_M,
    cells,
    cables: [
      cableCurrent('damper cable', 40e-6, 0.9, [0.092, 0.292], (sM) => Math.sin(kPerM * (0.92 - sM))),
      cableCurrent('supply cable', 15e-6, 0.78, [0, -0.1], (sM) => Math.cos(kPerM * (0.88 - sM))),
    ],
  };
}

/** Out along x, then down; a point every 20 mm. */
function cableCurrent(
  name: string,
  mostA: number,
  lengthM: number,
  [fromX, turnX]: readonly [number, number],
  shape: (sM: number) => number,
): StructureCurrentMap['cables'][number] {
  const outM = Math.abs(turnX - fromX);
  const stations = Array.from({ length: Math.round(lengthM / 0.02) + 1 }, (_, i) => 0.02 * i);
  return {
    name,
    pointsM: stations.map((sM) => [
      fromX + Math.sign(turnX - fromX) * Math.min(sM, outM),
      0.024,
      -Math.max(0, sM - outM),
    ]),
    currentRmsA: stations.map((sM) => mostA * Math.abs(shape(sM))),
  };
}
