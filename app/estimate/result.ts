import type { Caveat } from '../errors.ts';

/** The result of an estimate, as the JSON contract has it. Numbers unrounded; worst margin first, ties by frequency. */

export type Detector = 'quasi-peak' | 'average' | 'peak';
export type Polarization = 'horizontal' | 'vertical';
export type Verdict = 'meets' | 'exceeds' | 'falls-short' | 'within-uncertainty';

export interface Contributor {
  readonly kind: 'net' | 'loop' | 'cable';
  readonly name: string;
  /** At the height, angle and polarisation of the point's maximum. */
  readonly levelDbuvPerM: number;
  /** Where its current radiates from: "pair", "plane", or a cable's name. */
  readonly viaDbuvPerM: Readonly<Record<string, number>>;
}

export interface ResultPoint {
  readonly frequencyHz: number;
  readonly detector: Detector;
  readonly levelDbuvPerM: number;
  readonly limitDbuvPerM: number;
  readonly marginDb: number;
  readonly polarization: Polarization;
  readonly antennaHeightM: number;
  readonly turntableDeg: number;
  /** Maximum of the total over height and angle, per polarisation. */
  readonly horizontalDbuvPerM: number;
  readonly verticalDbuvPerM: number;
  /** Linear sum of all contributors at the maximum. */
  readonly upperBoundDbuvPerM: number;
  /** Strongest first. */
  readonly contributors: readonly Contributor[];
}

/** A place on the board a reviewer can go and look at. */
export interface Finding {
  readonly code: string;
  readonly net: string;
  readonly message: string;
  /** Board axes, m. */
  readonly atM: readonly [number, number];
  readonly layer: string;
}

/** Currents that the nets and loops drive over the planes and into the cables at one frequency. Board axes, rms; domains added as powers. */
export interface StructureCurrentMap {
  readonly frequencyHz: number;
  /** Side of the square cells. */
  readonly cellM: number;
  /** Magnitude of the sheet current density at each cell's centre. */
  readonly cells: readonly { readonly atM: readonly [number, number]; readonly densityRmsAPerM: number }[];
  /** Solved cables: a chain of points from the board outwards, the current at each of them. */
  readonly cables: readonly {
    readonly name: string;
    readonly pointsM: readonly (readonly [number, number, number])[];
    readonly currentRmsA: readonly number[];
  }[];
}

export interface EstimateResult {
  readonly format: 'quietboard-result';
  readonly version: 1;
  readonly board: { readonly name: string; readonly revision: string; readonly sha256: string };
  readonly program: { readonly version: string };
  readonly site: {
    readonly kind: 'ground-plane' | 'free-space';
    readonly distanceM: number;
    readonly measuredFrom: 'boundary' | 'center';
    readonly orientation: 'flat' | 'upright';
    readonly tableHeightM: number;
    /** Radius about the turntable axis that encloses outline and cables. */
    readonly boundaryRadiusM: number;
  };
  readonly limit: {
    readonly standard: string;
    readonly class: string;
    readonly distanceM: number;
    readonly requiredMarginDb: number;
    readonly edition: string;
    readonly source: string;
    readonly sourceStatus: string;
    /** Upper end of the judged range and the rule that gave it. */
    readonly maxHz: number;
    readonly maxRule: string;
    /** How a limit was converted to this distance; absent when it was not. */
    readonly conversion?: string;
    /** Expanded uncertainty of the laboratory's instrumentation, CISPR 16-4-2, dB. */
    readonly labUncertaintyDb: number;
  };
  readonly structure: 'solved' | 'pair-only';
  readonly points: readonly ResultPoint[];
  /** null when no line fell into the judged range. */
  readonly worst: { readonly frequencyHz: number; readonly marginDb: number } | null;
  readonly verdict: Verdict;
  readonly caveats: readonly Caveat[];
  readonly findings: readonly Finding[];
  /** Of some of the worst lines; absent when the structure was not solved. */
  readonly currentMaps?: readonly StructureCurrentMap[];
  /** What the user should know about choices the program made (pins chosen, drives without a net …). */
  readonly notes: readonly string[];
  /** The standing cautions that go with every estimate. */
  readonly cautions: readonly string[];
}
