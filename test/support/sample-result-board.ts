import type { Board, Net, Pin, PointM, StackLayer, Trace } from '../../app/board/board.ts';

/** An invented board for tests of reports: 92 × 58 mm, four copper layers, some forty undriven nets from a fixed seed. */

const MM = 1e-3;
const at = (xMm: number, yMm: number): PointM => [xMm * MM, yMm * MM];

const TOP = 0;
const GND = 2;
const PWR = 4;
const BOT = 6;

const row = (name: string, kind: StackLayer['kind'], thicknessMm: number): Omit<StackLayer, 'zBottomM' | 'zTopM'> => ({
  name,
  kind,
  thicknessM: thicknessMm * MM,
  epsilonR: kind === 'copper' ? 1 : 4.3,
  tanDelta: kind === 'copper' ? 0 : 0.02,
  isGuessed: name === 'D2',
});

function stackup(): StackLayer[] {
  const rows = [
    row('L1 TOP', 'copper', 0.035),
    row('D1', 'dielectric', 0.2),
    row('L2 GND', 'copper', 0.018),
    row('D2', 'dielectric', 1.06),
    row('L3 PWR', 'copper', 0.018),
    row('D3', 'dielectric', 0.2),
    row('L4 BOT', 'copper', 0.035),
  ];
  let zM = rows.reduce((sum, { thicknessM }) => sum + thicknessM, 0);
  return rows.map((each) => {
    const zTopM = zM;
    zM -= each.thicknessM;
    return { ...each, zTopM, zBottomM: zM };
  });
}

const trace = (layerIndex: number, widthMm: number, ...pointsMm: readonly (readonly [number, number])[]): Trace => ({
  layerIndex,
  widthM: widthMm * MM,
  pointsM: pointsMm.map(([x, y]) => at(x, y)),
});
const pin = (name: string, xMm: number, yMm: number, layerIndex = TOP): Pin => ({
  name,
  atM: at(xMm, yMm),
  layerIndex,
});
const via = (xMm: number, yMm: number) => ({
  atM: at(xMm, yMm),
  fromLayerIndex: TOP,
  toLayerIndex: BOT,
  drillM: 0.3 * MM,
});

const drivenNets: readonly Net[] = [
  {
    name: 'CLK_25M',
    traces: [
      trace(TOP, 0.2, [22, 34], [30, 34], [34, 38], [52, 38]),
      trace(BOT, 0.2, [52, 38], [60, 30], [60, 18], [74, 18]),
      trace(TOP, 0.2, [74, 18], [78, 18]),
    ],
    vias: [via(52, 38), via(74, 18)],
    pins: [pin('U1.3', 22, 34), pin('U4.11', 78, 18)],
  },
  {
    name: 'SPI_SCK',
    traces: [trace(TOP, 0.15, [24, 30], [40, 30], [44, 26], [44, 12], [50, 8])],
    vias: [],
    pins: [pin('U1.9', 24, 30), pin('J3.4', 50, 8)],
  },
  {
    name: 'DATA0',
    traces: [trace(TOP, 0.15, [24, 42], [28, 46], [66, 46])],
    vias: [],
    pins: [pin('U1.20', 24, 42), pin('U5.2', 66, 46)],
  },
  {
    name: 'DATA1',
    traces: [trace(TOP, 0.15, [24, 43], [28, 47], [66, 47])],
    vias: [],
    pins: [pin('U1.21', 24, 43), pin('U5.3', 66, 47)],
  },
];

/** Quiet nets: two straight pieces with a corner, from a small linear congruential generator. */
function quietNets(count: number): Net[] {
  let state = 20_251;
  const random = () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
  return Array.from({ length: count }, (_, i) => {
    const x = 8 + 74 * random();
    const y = 6 + 46 * random();
    const dx = (random() - 0.5) * 24;
    const dy = (random() - 0.5) * 18;
    const end: readonly [number, number] = [Math.min(88, Math.max(4, x + dx)), Math.min(54, Math.max(4, y + dy))];
    return {
      name: `N$${i + 1}`,
      traces: [trace(random() < 0.6 ? TOP : BOT, random() < 0.8 ? 0.15 : 0.5, [x, y], [end[0], y], end)],
      vias: random() < 0.3 ? [via(x, y)] : [],
      pins: [pin(`R${i + 1}.1`, x, y), pin(`R${i + 1}.2`, end[0], end[1])],
    };
  });
}

export function sampleResultBoard(): Board {
  const outline = [at(0, 0), at(92, 0), at(92, 50), at(84, 58), at(0, 58)];
  const slot = [at(56, 14), at(57.5, 14), at(57.5, 34), at(56, 34)];
  return {
    name: 'Greenhouse damper controller',
    revision: 'C',
    notes: 'Prototype without the metal lid.',
    outlineM: [outline, [at(4, 4), at(4, 7), at(7, 7), at(7, 4)]],
    stackup: stackup(),
    planes: [
      { layerIndex: GND, net: 'GND', ringM: outline, cutoutsM: [slot] },
      { layerIndex: PWR, net: '+3V3', ringM: [at(1, 1), at(62, 1), at(62, 57), at(1, 57)], cutoutsM: [] },
      { layerIndex: PWR, net: '+12V', ringM: [at(63, 1), at(91, 1), at(91, 49), at(83, 57), at(63, 57)], cutoutsM: [] },
    ],
    nets: [...drivenNets, ...quietNets(44)],
    waveforms: [
      {
        name: 'clk',
        kind: 'trapezoid',
        quantity: 'V',
        frequencyHz: 25e6,
        low: 0,
        high: 3.3,
        dutyRatio: 0.5,
        rise1090S: 1e-9,
        fall1090S: 1e-9,
        clockDomain: 'main',
      },
      {
        name: 'bus',
        kind: 'random-data',
        quantity: 'V',
        bitRateHz: 50e6,
        low: 0,
        high: 1.8,
        rise1090S: 0.8e-9,
        fall1090S: 0.8e-9,
        sequenceBits: 127,
      },
      {
        name: 'converter current',
        kind: 'piecewise',
        quantity: 'A',
        periodS: 2e-6,
        timesS: [0, 5e-9, 900e-9, 905e-9],
        values: [0, 1.2, 1.8, 0],
      },
    ],
    drives: [
      drive('CLK_25M', 'U1.3', 'clk', 25, 22),
      drive('SPI_SCK', 'U1.9', 'clk', 40, 0),
      drive('DATA0', 'U1.20', 'bus', 35, 0),
      { ...drive('DATA1', 'U1.21', 'bus', 35, 0), isPinChosen: true, isInverted: true, delayS: 2e-9 },
    ],
    loads: [
      { net: 'CLK_25M', pin: 'U4.11', resistanceOhm: 1e6, capacitanceF: 5e-12, isPinChosen: false },
      { net: 'SPI_SCK', pin: 'J3.4', capacitanceF: 8e-12, isPinChosen: true },
      { net: 'DATA0', pin: 'U5.2', resistanceOhm: 1e6, capacitanceF: 4e-12, isPinChosen: false },
      { net: 'DATA1', pin: 'U5.3', resistanceOhm: 1e6, capacitanceF: 4e-12, isPinChosen: false },
    ],
    loops: [
      {
        name: 'converter loop',
        pointsM: [
          [70 * MM, 26 * MM, 1.6 * MM],
          [79 * MM, 26 * MM, 1.6 * MM],
          [79 * MM, 32 * MM, 1.6 * MM],
          [70 * MM, 32 * MM, 1.6 * MM],
        ],
        waveform: 'converter current',
        delayS: 0,
        isInverted: false,
      },
    ],
    cables: [
      {
        name: 'damper cable',
        pointsM: [
          [92 * MM, 24 * MM, 0],
          [0.3, 24 * MM, 0],
          [0.3, 24 * MM, -0.7],
        ],
        radiusM: 1.5 * MM,
        farEnd: 'open',
        seriesOhm: 0,
      },
      {
        name: 'sensor cable',
        pointsM: [
          [0, 40 * MM, 0],
          [-0.2, 40 * MM, 0],
          [-0.2, 0.12, -0.8],
        ],
        radiusM: 1 * MM,
        farEnd: 'ground',
        seriesOhm: 0,
        commonModeRms: [
          { frequencyHz: 30e6, currentRmsA: 4e-6 },
          { frequencyHz: 300e6, currentRmsA: 1e-6 },
        ],
      },
    ],
    structure: { planes: 'solved' },
  };
}

function drive(net: string, pinName: string, waveform: string, sourceOhm: number, seriesOhm: number) {
  return { net, pin: pinName, waveform, sourceOhm, seriesOhm, delayS: 0, isInverted: false, isPinChosen: false };
}
