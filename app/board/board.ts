/**
 * The board in SI units: what every other module works with. Board axes: x, y as drawn (seen from the top, y up),
 * z out of the top side, z = 0 at the board's underside. Layers run from top to bottom, as in the file.
 */

/** x, y in metres, board axes. */
export type PointM = readonly [xM: number, yM: number];
/** x, y, z in metres, board axes. */
export type Point3M = readonly [xM: number, yM: number, zM: number];
/** Closed ring; the last point is not repeated. */
export type RingM = readonly PointM[];

export interface StackLayer {
  readonly name: string;
  readonly kind: 'copper' | 'dielectric';
  readonly thicknessM: number;
  readonly zBottomM: number;
  readonly zTopM: number;
  /** Dielectric rows only; 1 for copper. */
  readonly epsilonR: number;
  readonly tanDelta: number;
  /** The importer had to guess the permittivity. */
  readonly isGuessed: boolean;
}

export interface Plane {
  /** Index into `Board.stackup`. */
  readonly layerIndex: number;
  readonly net: string;
  readonly ringM: RingM;
  readonly cutoutsM: readonly RingM[];
}

export interface Trace {
  readonly layerIndex: number;
  readonly widthM: number;
  readonly pointsM: readonly PointM[];
}

export interface Via {
  readonly atM: PointM;
  /** Indices into `Board.stackup`, `fromLayerIndex` ≤ `toLayerIndex` (from is nearer the top). */
  readonly fromLayerIndex: number;
  readonly toLayerIndex: number;
  readonly drillM: number;
}

export interface Pin {
  readonly name: string;
  readonly atM: PointM;
  readonly layerIndex: number;
}

export interface Net {
  readonly name: string;
  readonly traces: readonly Trace[];
  readonly vias: readonly Via[];
  readonly pins: readonly Pin[];
  readonly z0Ohm?: number;
  readonly epsilonEff?: number;
  readonly returnPath?: { readonly layerIndex: number; readonly pointsM: readonly PointM[] };
}

interface WaveformBase {
  readonly name: string;
  /** Drives of one domain add as phasors. Absent: the waveform's own name (random data: one domain a drive). */
  readonly clockDomain?: string;
  /** Volts for drives, amperes for loops. */
  readonly quantity: 'V' | 'A';
}

/** Trapezoid; edges are linear ramps, given 10–90 % (0–100 % = /0.8); t = 0 is the start of the rise. */
export interface TrapezoidWaveform extends WaveformBase {
  readonly kind: 'trapezoid';
  readonly frequencyHz: number;
  readonly low: number;
  readonly high: number;
  /** Time above the 50 % level over the period, 0–1. */
  readonly dutyRatio: number;
  readonly rise1090S: number;
  readonly fall1090S: number;
}

export interface RandomDataWaveform extends WaveformBase {
  readonly kind: 'random-data';
  readonly bitRateHz: number;
  readonly low: number;
  readonly high: number;
  readonly rise1090S: number;
  readonly fall1090S: number;
  readonly sequenceBits: number;
}

/** Periodic, linear between the points; also what sampled waveforms become. */
export interface PiecewiseWaveform extends WaveformBase {
  readonly kind: 'piecewise' | 'samples';
  readonly periodS: number;
  readonly timesS: readonly number[];
  readonly values: readonly number[];
}

/** amplitude·cos(2πft + phase), peak values. */
export interface LinesWaveform extends WaveformBase {
  readonly kind: 'lines';
  readonly lines: readonly { readonly frequencyHz: number; readonly amplitude: number; readonly phaseRad: number }[];
}

export type Waveform = TrapezoidWaveform | RandomDataWaveform | PiecewiseWaveform | LinesWaveform;

export interface Drive {
  readonly net: string;
  readonly pin: string;
  readonly waveform: string;
  readonly sourceOhm: number;
  readonly seriesOhm: number;
  readonly delayS: number;
  readonly isInverted: boolean;
  /** The pin was chosen by the program (first driver-like pin): said in the result. */
  readonly isPinChosen: boolean;
}

export interface Load {
  readonly net: string;
  readonly pin: string;
  /** Absent: no resistor (open). */
  readonly resistanceOhm?: number;
  readonly capacitanceF: number;
  readonly isPinChosen: boolean;
}

export interface CurrentLoop {
  readonly name: string;
  readonly pointsM: readonly Point3M[];
  readonly waveform: string;
  readonly delayS: number;
  readonly isInverted: boolean;
}

export interface Cable {
  readonly name: string;
  readonly pointsM: readonly Point3M[];
  readonly radiusM: number;
  readonly farEnd: 'open' | 'ground' | { readonly resistanceOhm: number };
  readonly seriesOhm: number;
  readonly seriesImpedance?: readonly {
    readonly frequencyHz: number;
    readonly resistanceOhm: number;
    readonly reactanceOhm: number;
  }[];
  /** Stated current (rms): then the cable is not solved for. */
  readonly commonModeRms?: readonly { readonly frequencyHz: number; readonly currentRmsA: number }[];
}

export interface Board {
  readonly name: string;
  readonly revision: string;
  readonly notes: string;
  readonly outlineM: readonly RingM[];
  readonly stackup: readonly StackLayer[];
  readonly planes: readonly Plane[];
  readonly nets: readonly Net[];
  readonly waveforms: readonly Waveform[];
  readonly drives: readonly Drive[];
  readonly loads: readonly Load[];
  readonly loops: readonly CurrentLoop[];
  readonly cables: readonly Cable[];
  readonly structure: { readonly planes: 'solved' | 'pair-only'; readonly cellM?: number };
}
