import type { Polarization } from '../estimate/result.ts';
import type { Orientation } from '../site/site.ts';
import { ETA0_OHM } from '../units/constants.ts';
import { mhzToHz, mmToM } from '../units/convert.ts';

/**
 * Two parallel wires of length L and spacing D with straight end wires: a source with its resistance in the middle of
 * one end, a load in the middle of the other. Solved by a thin-wire moment method for reference, and estimated as a net.
 */
export interface NecCase {
  readonly id: string;
  /** 'line': D ≤ L/10 and D ≤ λ/30 at every frequency. 'wide-loop': a loop whose sides are of like length. */
  readonly kind: 'line' | 'wide-loop';
  readonly lengthM: number;
  /** Between the wires' axes. */
  readonly spacingM: number;
  readonly wireRadiusM: number;
  /** Direction of the wires in board axes. */
  readonly along: 'x' | 'y';
  readonly orientation: Orientation;
  readonly sourceOhm: number;
  readonly loadOhm: number;
  readonly frequenciesHz: readonly number[];
}

/** Peak amplitude of the source at every frequency, V. */
export const NEC_SOURCE_V = 1;
/** Distances of the antenna from the turntable axis, m. */
export const NEC_DISTANCES_M = [3, 10] as const;

/**
 * Characteristic impedance of two parallel wires in air, Ω: (η0/π)·acosh(D/2a), η0/π = 120 Ω to 0.07 %.
 * Source: D. M. Pozar, Microwave Engineering, 4th ed., table 2.1.
 */
export const twoWireImpedanceOhm = ({ spacingM, wireRadiusM }: Pick<NecCase, 'spacingM' | 'wireRadiusM'>): number =>
  (ETA0_OHM / Math.PI) * Math.acosh(spacingM / (2 * wireRadiusM));

const line = (
  lengthMm: number,
  spacingMm: number,
  sourceOhm: number,
  loadOhm: number,
  stands: Pick<NecCase, 'along' | 'orientation'>,
  frequenciesMhz: readonly number[] = [50, 100, 200, 400, 800],
  spacingPerRadius = 40,
): NecCase => ({
  id: [`${lengthMm}x${spacingMm}mm`, `${sourceOhm}-${loadOhm}ohm`, `${stands.orientation}-${stands.along}`].join('-'),
  kind: 10 * spacingMm <= lengthMm ? 'line' : 'wide-loop',
  lengthM: mmToM(lengthMm),
  spacingM: mmToM(spacingMm),
  wireRadiusM: mmToM(spacingMm / spacingPerRadius),
  ...stands,
  sourceOhm,
  loadOhm,
  frequenciesHz: frequenciesMhz.map(mhzToHz),
});

const FLAT = { orientation: 'flat', along: 'x' } as const;
const FLAT_Y = { orientation: 'flat', along: 'y' } as const;
const UPRIGHT = { orientation: 'upright', along: 'x' } as const;
const UPRIGHT_Y = { orientation: 'upright', along: 'y' } as const;
/** Spacing at most λ/30; and below the first resonance of the line that is nearly open. */
const LOWER_MHZ = [50, 100, 200, 400];
/** Spacing at most a tenth of a wavelength: beyond it a loop is no line at all. */
const WIDE_MHZ = [50, 100, 200, 400, 600];

/** Matched (442 Ω), low, high and everyday loads; lengths 30–300 mm; lying, standing along and across. */
export const NEC_CASES: readonly NecCase[] = [
  line(30, 3, 50, 442, FLAT),
  line(40, 3, 25, 10, FLAT_Y),
  line(60, 5, 25, 50, FLAT),
  line(60, 6, 20, 10, UPRIGHT),
  line(100, 10, 50, 220, FLAT),
  line(100, 10, 50, 5, FLAT),
  line(100, 5, 50, 5000, FLAT, LOWER_MHZ),
  line(100, 5, 33, 100, FLAT_Y, undefined, 25),
  line(150, 10, 442, 442, FLAT),
  line(150, 10, 50, 220, UPRIGHT),
  line(150, 10, 50, 220, UPRIGHT_Y),
  line(200, 12, 100, 5, FLAT),
  line(200, 20, 50, 150, UPRIGHT_Y, LOWER_MHZ, 100),
  line(300, 12, 50, 50, FLAT),
  line(300, 12, 442, 442, UPRIGHT_Y),
  line(100, 25, 50, 220, FLAT),
  line(60, 40, 50, 220, FLAT, undefined, 100),
  line(60, 60, 50, 50, FLAT, [50, 100, 200, 400], 100),
  line(100, 50, 50, 50, FLAT, WIDE_MHZ, 100),
  line(100, 50, 50, 220, UPRIGHT, WIDE_MHZ, 100),
  line(20, 20, 50, 5, FLAT_Y, undefined, 50),
];

/** Maxima over antenna height and turntable angle, peak phasors. */
export interface NecMaximum {
  readonly caseId: string;
  /** From the turntable axis. */
  readonly distanceM: number;
  readonly frequencyHz: number;
  readonly horizontalVPerM: number;
  readonly verticalVPerM: number;
}

export const fieldVPerM = (maximum: NecMaximum, component: Polarization): number =>
  component === 'horizontal' ? maximum.horizontalVPerM : maximum.verticalVPerM;

/** A weaker component is compared down to 20 dB below the stronger one: below, it decides no level. */
const COMPARED_RATIO = 10;

/** The components of a maximum that count, the stronger one first. */
export function comparedComponents(maximum: NecMaximum): Polarization[] {
  const { horizontalVPerM, verticalVPerM } = maximum;
  const [strong, weak]: Polarization[] =
    horizontalVPerM >= verticalVPerM ? ['horizontal', 'vertical'] : ['vertical', 'horizontal'];
  return fieldVPerM(maximum, weak!) * COMPARED_RATIO >= fieldVPerM(maximum, strong!) ? [strong!, weak!] : [strong!];
}
