import { imageOf, type LinearElement } from '../fields/linear-element.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { type Check, check } from './check.ts';
import { closedLoop, fieldOf, magnitude, radiatedPowerW, shapedWire, shortWire } from './radiator.ts';

/** Handbook values are rounded to three digits or so; the field is computed exactly as the formula's model says. */
const ROUNDING = 0.005;

/**
 * Far-zone |E| per ampere at a distance (over ground: at the plane). Taken a thousand times as far and scaled back: the
 * closed forms hold in that limit, at 3 m and 30 MHz the near terms would add 13 % to a pair's field.
 */
const farFieldPerA = (elements: readonly LinearElement[], frequencyHz: number, distanceM: number): number =>
  FAR_FACTOR * magnitude(fieldOf(elements, frequencyHz, [FAR_FACTOR * distanceM, 0, 0]).electric);
const FAR_FACTOR = 1000;

/** Elements and their images in the ground plane z = 0. */
const overGround = (elements: readonly LinearElement[]): LinearElement[] => [...elements, ...elements.map(imageOf)];

/** A wire so short that its length does not matter, with the moment of `lengthM` at 1 A: the model of the formulas. */
const hertzian = (xM: number, zM: number, lengthM: number, currentA = 1): LinearElement =>
  shortWire([xM, 0, zM], SHORT_M, (currentA * lengthM) / SHORT_M);
const SHORT_M = 1e-4;

const RIBBON_SPACING_M = 50 * 25.4e-6;
const LOOP_SIDE_M = Math.sqrt(10e-4);

/** Vertical square loop of 1 A standing on the ground plane. */
const standingLoop = (sideM: number): LinearElement[] => {
  const half = sideM / 2;
  const corners = [
    [-half, 0, 1e-6],
    [half, 0, 1e-6],
    [half, 0, sideM],
    [-half, 0, sideM],
  ] as const;
  return closedLoop(corners, 1);
};

/** Maximum-field formulas, radiation resistances and their worked examples, through the program's own element field. */
export function handbookChecks(): Check[] {
  return [...differentialMode(), ...commonMode(), ...resistances(), ...fieldFromPower()];
}

function differentialMode(): Check[] {
  const pair = [hertzian(-RIBBON_SPACING_M / 2, 0, 1), hertzian(RIBBON_SPACING_M / 2, 0, 1, -1)];
  const ottVPerM = farFieldPerA(overGround(standingLoop(LOOP_SIDE_M)), 30e6, 3) * 25e-3;
  return [
    row('paul-dm-ribbon', {
      source: 'C. R. Paul, Introduction to EMC: 1 m ribbon cable, 50 mil, 30 MHz, 100 µV/m at 3 m',
      sourceStatus: 'from memory',
      quantity: 'differential-mode current that just meets the limit',
      unit: 'mA',
      expected: 19.95,
      computed: (1e3 * 100e-6) / farFieldPerA(pair, 30e6, 3),
    }),
    row('ott-dm-10cm2', {
      source: 'H. W. Ott, Noise Reduction Techniques: 10 cm² loop, 25 mA, 30 MHz, 3 m, over ground',
      sourceStatus: 'from memory',
      quantity: 'differential-mode field',
      unit: 'µV/m',
      expected: 197,
      computed: 1e6 * ottVPerM,
    }),
    row('ott-dm-largest-loop', {
      source: 'H. W. Ott, largest loop 380·E·r/(f²·I): 100 µV/m, 3 m, 30 MHz, 25 mA',
      sourceStatus: 'seen',
      quantity: 'loop area that just meets the limit',
      unit: 'cm²',
      expected: (380 * 100 * 3) / (30 ** 2 * 25),
      computed: (10 * 100e-6) / ottVPerM,
    }),
  ];
}

function commonMode(): Check[] {
  const twoWires = [hertzian(-RIBBON_SPACING_M / 2, 0, 1), hertzian(RIBBON_SPACING_M / 2, 0, 1)];
  const cable = overGround([hertzian(0, SHORT_M, 1)]);
  const ott = 'H. W. Ott: 1 m cable over ground (short monopole with its image)';
  const limits: readonly (readonly [frequencyMhz: number, limitUvPerM: number, expectedUa: number])[] = [
    [30, 100, 7.96],
    [50, 100, 4.77],
    [100, 150, 3.58],
    [230, 200, 2.08],
  ];
  return [
    row('paul-cm-ribbon', {
      source: 'C. R. Paul, Introduction to EMC: 1 m ribbon cable, 30 MHz, 100 µV/m at 3 m',
      sourceStatus: 'from memory',
      quantity: 'common-mode current per wire that just meets the limit',
      unit: 'µA',
      expected: 7.96,
      computed: (1e6 * 100e-6) / farFieldPerA(twoWires, 30e6, 3),
    }),
    row('ott-cm-5ua-3m', {
      source: `${ott}, 50 MHz, 5 µA at 3 m`,
      sourceStatus: 'from memory',
      quantity: 'common-mode field',
      unit: 'µV/m',
      expected: 105,
      computed: 5 * farFieldPerA(cable, 50e6, 3),
    }),
    row('ott-cm-15ua-10m', {
      source: `${ott}, 50 MHz, 15 µA at 10 m`,
      sourceStatus: 'from memory',
      quantity: 'common-mode field',
      unit: 'µV/m',
      expected: 94.5,
      computed: 15 * farFieldPerA(cable, 50e6, 10),
    }),
    ...limits.map(([frequencyMhz, limitUvPerM, expected]) =>
      row(`cm-limit-current-${frequencyMhz}mhz`, {
        source: `${ott}, FCC Class B ${limitUvPerM} µV/m at 3 m, ${frequencyMhz} MHz`,
        sourceStatus: 'derived',
        quantity: 'common-mode current that just meets the limit',
        unit: 'µA',
        expected,
        computed: limitUvPerM / farFieldPerA(cable, frequencyMhz * 1e6, 3),
      }),
    ),
    row('resonant-wire-3m', {
      source: 'half-wave wire in free space, E = 60·I/r (Balanis, Antenna Theory, section 4.6): 100 µV/m at 3 m',
      sourceStatus: 'from memory',
      quantity: 'current at the wire’s middle',
      unit: 'µA',
      expected: 5,
      computed: (1e6 * 100e-6) / farFieldPerA(halfWave(), HALF_WAVE_HZ, 3),
    }),
  ];
}

const HALF_WAVE_HZ = 300e6;

function halfWave(): LinearElement[] {
  const lengthM = SPEED_OF_LIGHT_M_PER_S / HALF_WAVE_HZ / 2;
  return shapedWire(lengthM, 64, (zM) => Math.cos((Math.PI * zM) / lengthM));
}

/** R = 2P/I² with P the power through a sphere one wavelength away. */
function resistances(): Check[] {
  const frequencyHz = HALF_WAVE_HZ;
  const wavelengthM = SPEED_OF_LIGHT_M_PER_S / frequencyHz;
  const sideM = wavelengthM / 100;
  const dipoleM = wavelengthM / 60;
  const half = sideM / 2;
  const loop = closedLoop(
    [
      [-half, -half, 0],
      [half, -half, 0],
      [half, half, 0],
      [-half, half, 0],
    ],
    1,
  );
  const triangle = shapedWire(dipoleM, 2, (zM) => 1 - Math.abs(zM) / (dipoleM / 2));
  const resistanceOhm = (elements: readonly LinearElement[]) => 2 * radiatedPowerW(elements, frequencyHz, wavelengthM);
  const source = 'radiation resistance, handbook table';
  const rows: readonly (readonly [id: string, quantity: string, expectedOhm: number, computedOhm: number])[] = [
    [
      'loop',
      'small loop of λ/100 sides, 320π⁴A²/λ⁴',
      320 * Math.PI ** 4 * (sideM / wavelengthM) ** 4,
      resistanceOhm(loop),
    ],
    [
      'hertzian',
      'uniform current on λ/60, 80π²(l/λ)²',
      80 * Math.PI ** 2 * (dipoleM / wavelengthM) ** 2,
      resistanceOhm([shortWire([0, 0, 0], dipoleM, 1)]),
    ],
    [
      'short-dipole',
      'triangular current on λ/60, 20π²(l/λ)²',
      20 * Math.PI ** 2 * (dipoleM / wavelengthM) ** 2,
      resistanceOhm(triangle),
    ],
    ['half-wave', 'half-wave dipole', 73, resistanceOhm(halfWave())],
    ['monopole', 'quarter-wave monopole on a plane (half the dipole’s power)', 36.5, resistanceOhm(halfWave()) / 2],
  ];
  return rows.map(([id, quantity, expected, computed]) =>
    row(`radiation-resistance-${id}`, { source, sourceStatus: 'seen', quantity, unit: 'Ω', expected, computed }),
  );
}

/** E = √(30·P·G)/r, rms, with the power taken from a sphere and E from the peak direction. */
function fieldFromPower(): Check[] {
  const distanceM = 3;
  const cases: readonly (readonly [id: string, gain: number, elements: readonly LinearElement[]])[] = [
    ['small-dipole', 1.5, [shortWire([0, 0, 0], 0.01, 1)]],
    ['half-wave', 1.64, halfWave()],
  ];
  return cases.map(([id, gain, elements]) => {
    const powerW = radiatedPowerW(elements, HALF_WAVE_HZ, 2);
    return row(`field-from-power-${id}`, {
      source: `E = √(30·P·G)/r, G = ${gain}`,
      sourceStatus: 'from memory',
      quantity: 'E·r per √W in the strongest direction (rms)',
      unit: 'V/√W',
      expected: Math.sqrt(30 * gain),
      computed: (farFieldPerA(elements, HALF_WAVE_HZ, distanceM) * distanceM) / Math.sqrt(2 * powerW),
    });
  });
}

const row = (id: string, values: Omit<Check, 'id' | 'difference' | 'tolerance' | 'status'>): Check =>
  check({ id: `handbook-${id}`, ...values, tolerance: ROUNDING * values.expected });
