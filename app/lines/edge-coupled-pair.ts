import { type Caveat, inputError } from '../errors.ts';
import { ETA0_OHM } from '../units/constants.ts';
import { checkMaterial } from './cross-section.ts';
import { ellipticRatio } from './elliptic.ts';
import {
  airImpedanceOhm,
  epsilonEffOf,
  exponentOfEpsilon,
  exponentOfU,
  thinAirImpedanceOhm,
  thinEpsilonEff,
} from './hammerstad-jensen.ts';
import { striplineAirImpedanceOhm, thinStriplineOhm } from './stripline.ts';

/** Two equal traces side by side over one plane, or midway between two (`heightM`: from the trace to either plane). */
export interface CoupledSection {
  readonly kind: 'microstrip' | 'stripline';
  readonly widthM: number;
  readonly thicknessM: number;
  readonly heightM: number;
  readonly gapM: number;
  readonly epsilonR: number;
}

export interface Mode {
  /** Of one trace to the plane. */
  readonly z0Ohm: number;
  readonly epsilonEff: number;
}

export interface CoupledPair {
  /** Both traces with the same voltage. */
  readonly even: Mode;
  /** Opposite voltages; the differential impedance is twice this. */
  readonly odd: Mode;
  readonly caveats: readonly Caveat[];
}

/**
 * Even and odd mode of an edge-coupled pair, static.
 *
 * Microstrip: closed forms for thin traces, 0.1 ≤ w/h ≤ 10, 0.1 ≤ s/h ≤ 10, ε_r ≤ 18, stated there within 0.8 %.
 * Stripline: exact for thin traces.
 * Thickness: added to the capacitance of a thin trace in its mode (outer edge, and in the odd mode the facing walls):
 *   even  C(0) + ½ ΔC,   odd  C(0) + ½ ΔC + ε0·2t/s,   ΔC = C(t) − C(0) of a single microstrip; Cohn's own for stripline.
 * Against a method-of-moments solution, t ≤ 0.3 h: microstrip even 1.7 %, odd 3.5 % (Z0, high); stripline 2 % and 1 % for
 * w/2h ≥ 0.3.
 * Source: M. Kirschning, R. H. Jansen, Accurate wide-range design equations for the frequency-dependent characteristic of
 * parallel coupled microstrip lines, IEEE Trans. MTT-32(1), 1984, eqs. 3–9; S. B. Cohn, Shielded coupled-strip transmission
 * line, IRE Trans. MTT-3(5), 1955 (his thickness terms, here also for microstrip).
 * Outside: caveat `line-outside-validity`. Throws `input` for impossible dimensions.
 */
export function edgeCoupledPair(section: CoupledSection): CoupledPair {
  for (const field of ['widthM', 'heightM', 'gapM'] as const) {
    if (!(section[field] > 0 && section[field] < Infinity)) {
      throw inputError(`section.${field}`, 'a positive finite length', section[field]);
    }
  }
  const { thicknessM, epsilonR } = section;
  if (!(thicknessM >= 0 && thicknessM < Infinity)) {
    throw inputError('section.thicknessM', 'a finite length of at least 0', thicknessM);
  }
  checkMaterial('section', section);
  const modes = section.kind === 'microstrip' ? microstripModes(section) : striplineModes(section);
  const u = section.widthM / section.heightM;
  const g = section.gapM / section.heightM;
  const isWithin =
    section.kind === 'microstrip'
      ? u >= 0.1 && u <= 10 && g >= 0.1 && g <= 10 && epsilonR <= 18 && thicknessM <= 0.3 * section.heightM
      : u >= 0.6 && thicknessM <= 0.3 * section.heightM;
  const message = 'edge-coupled pair outside the range of its formulas (w/h, s/h, permittivity or copper thickness)';
  const caveats = isWithin ? [] : [{ code: 'line-outside-validity', message, where: '', fromHz: 0, toHz: 0 }];
  return { ...modes, caveats };
}

/** Capacitances of one trace as C/ε0: in air and with the dielectric. */
interface Capacitances {
  readonly air: number;
  readonly filled: number;
}

function modeOf({ air, filled }: Capacitances): Mode {
  return { z0Ohm: ETA0_OHM / Math.sqrt(air * filled), epsilonEff: filled / air };
}

function microstripModes({ widthM, thicknessM, heightM, gapM, epsilonR }: CoupledSection): { even: Mode; odd: Mode } {
  const u = widthM / heightM;
  const g = gapM / heightM;
  const t = thicknessM / heightM;
  const thin = thinPair(u, g, epsilonR);
  const thickAir = ETA0_OHM / airImpedanceOhm(u, t);
  const thinAir = ETA0_OHM / airImpedanceOhm(u, 0);
  const edge: Capacitances = {
    air: (thickAir - thinAir) / 2,
    filled: (thickAir * epsilonEffOf(u, t, epsilonR) - thinAir * epsilonEffOf(u, 0, epsilonR)) / 2,
  };
  const widened = ({ z0Ohm, epsilonEff }: Mode, wall: number): Mode =>
    modeOf({
      air: ETA0_OHM / (z0Ohm * Math.sqrt(epsilonEff)) + edge.air + wall,
      filled: (ETA0_OHM * Math.sqrt(epsilonEff)) / z0Ohm + edge.filled + wall,
    });
  // The inner edges of the odd mode: facing walls across a narrow gap, the widening of a single trace across a wide one.
  return { even: widened(thin.even, 0), odd: widened(thin.odd, Math.max((2 * t) / g, edge.air)) };
}

/** Kirschning–Jansen 1984, static: eq. 3 (ε even), eq. 4 (ε odd), eqs. 8, 9 (impedances), names as there. */
function thinPair(u: number, g: number, epsilonR: number): { even: Mode; odd: Mode } {
  const single = thinEpsilonEff(u, epsilonR);
  const singleOhm = thinAirImpedanceOhm(u) / Math.sqrt(single);
  const mean = (epsilonR + 1) / 2;

  const v = (u * (20 + g * g)) / (10 + g * g) + g * Math.exp(-g);
  const even = mean + ((epsilonR - 1) / 2) * (1 + 10 / v) ** (-exponentOfU(v) * exponentOfEpsilon(epsilonR));
  const ao = 0.7287 * (single - mean) * (1 - Math.exp(-0.179 * u));
  const bo = (0.747 * epsilonR) / (0.15 + epsilonR);
  const co = bo - (bo - 0.207) * Math.exp(-0.414 * u);
  const exponent = 0.593 + 0.694 * Math.exp(-0.562 * u);
  const odd = (mean + ao - single) * Math.exp(-co * g ** exponent) + single;

  const q1 = 0.8695 * u ** 0.194;
  const q2 = 1 + 0.7519 * g + 0.189 * g ** 2.31;
  const q3 = 0.1975 + (16.6 + (8.4 / g) ** 6) ** -0.387 + Math.log(g ** 10 / (1 + (g / 3.4) ** 10)) / 241;
  const q4 = (2 * q1) / (q2 * (Math.exp(-g) * u ** q3 + (2 - Math.exp(-g)) * u ** -q3));
  const q5 = 1.794 + 1.14 * Math.log(1 + 0.638 / (g + 0.517 * g ** 2.43));
  const q6 = 0.2305 + Math.log(g ** 10 / (1 + (g / 5.8) ** 10)) / 281.3 + Math.log(1 + 0.598 * g ** 1.154) / 5.1;
  const q7 = (10 + 190 * g * g) / (1 + 82.3 * g ** 3);
  const q8 = Math.exp(-6.5 - 0.95 * Math.log(g) - (g / 0.15) ** 5);
  const q9 = Math.log(q7) * (q8 + 1 / 16.5);
  const q10 = q4 - (q5 / q2) * Math.exp(Math.log(u) * q6 * u ** -q9);

  const mode = (epsilonEff: number, q: number): Mode => ({
    epsilonEff,
    z0Ohm: (singleOhm * Math.sqrt(single / epsilonEff)) / (1 - (singleOhm / ETA0_OHM) * Math.sqrt(single) * q),
  });
  return { even: mode(even, q4), odd: mode(odd, q10) };
}

function striplineModes({ widthM, thicknessM, heightM, gapM, epsilonR }: CoupledSection): { even: Mode; odd: Mode } {
  const spacingM = 2 * heightM + thicknessM;
  const x = (Math.PI * widthM) / (2 * spacingM);
  const y = (Math.PI * (widthM + gapM)) / (2 * spacingM);
  // Thin traces, Cohn 1955: k = tanh x · tanh y (even), tanh x · coth y (odd).
  const evenAir = 4 * ellipticRatioOf(Math.tanh(x) * Math.tanh(y));
  const oddAir = 4 * ellipticRatioOf(Math.tanh(x) / Math.tanh(y));
  const singleAir = ETA0_OHM / thinStriplineOhm(widthM, spacingM);
  const section = { kind: 'stripline' as const, widthM, thicknessM, heightAboveM: heightM, heightBelowM: heightM };
  const thickAir = ETA0_OHM / striplineAirImpedanceOhm({ ...section, epsilonR, tanDelta: 0 });
  const fringe = fringing(thicknessM / spacingM);
  const thinFringe = fringing(0);
  const even = thickAir - (fringe / thinFringe) * (singleAir - evenAir);
  // Two forms for the odd mode, for narrow and for wide gaps; each reads low beyond its range (s = 5 t), so the larger holds.
  const narrowGap = oddAir + (thickAir - singleAir) - 2 * (fringe - thinFringe) + (2 * thicknessM) / gapM;
  const odd = Math.max(narrowGap, thickAir + (fringe / thinFringe) * (oddAir - singleAir));
  return {
    even: modeOf({ air: even, filled: even * epsilonR }),
    odd: modeOf({ air: odd, filled: odd * epsilonR }),
  };
}

const ellipticRatioOf = (k: number): number => ellipticRatio(k, Math.sqrt((1 - k) * (1 + k)));

/** Fringing capacitance of one edge to one plane, C/ε0, thick wide strip (Cohn 1955): x = t/b. */
function fringing(x: number): number {
  const y = 1 / (1 - x);
  const far = y === 1 ? 0 : (y - 1) * Math.log(y * y - 1);
  return (2 * y * Math.log(y + 1) - far) / Math.PI;
}
