import { gaussLegendre } from '../fields/quadrature.ts';

/**
 * What lies on one side of a thin strip, in the Fourier domain along the surface: the ratio Y(β) of the normal flux
 * density to ε0 β φ, β in 1/m.
 */
export type SurfaceAdmittance = (betaPerM: number) => number;

/** A dielectric of thickness h on a plane: Y = ε coth βh. */
export const slabOnPlane =
  (thicknessM: number, epsilonR: number): SurfaceAdmittance =>
  (betaPerM) =>
    epsilonR / Math.tanh(betaPerM * thicknessM);

/** A dielectric of thickness d with air behind it: Y = ε (1 + ε tanh βd) / (ε + tanh βd). */
export const slabInAir =
  (thicknessM: number, epsilonR: number): SurfaceAdmittance =>
  (betaPerM) => {
    const tanh = Math.tanh(betaPerM * thicknessM);
    return (epsilonR * (1 + epsilonR * tanh)) / (epsilonR + tanh);
  };

export const air: SurfaceAdmittance = () => 1;

/** Gauss–Legendre points in a panel of the integration. */
const PANEL_POINTS = 8;
/** Panels of half a period of the strip's transform; what lies beyond is below 1e-5 of the integral and cancels in a ratio. */
const STRIP_PANELS = 30;
/** Periods of the pair's factor that are followed; beyond, its mean value serves (Riemann–Lebesgue). */
const PAIR_PERIODS = 40;

/**
 * ∝ 1/C of a thin strip, or of two that carry ±Q at `centreDistanceM`, between two surroundings, by the variational expression
 *
 *   1/C ∝ ∫₀^∞ f(β)² p(β) / (β [Y_above + Y_below]) dβ
 *
 * f: transform of the charge 1 + |2x/w|³ (total 1); p = 1 for one strip, 2 sin²(β·centreDistance/2) for two.
 * Stationary about the true charge, so a charge wrong by some per cent gives C to some tenths of a per cent.
 * Meant for ratios of two surroundings of the same strip, where most of that error cancels.
 * Source: E. Yamashita, R. Mittra, Variational method for the analysis of microstrip lines, IEEE Trans. MTT-16(4), 1968;
 * E. Yamashita, Variational method for the analysis of microstrip-like transmission lines, IEEE Trans. MTT-16(8), 1968.
 */
export function inverseCapacitance(
  widthM: number,
  above: SurfaceAdmittance,
  below: SurfaceAdmittance,
  centreDistanceM = 0,
): number {
  const { nodes, weights } = gaussLegendre(PANEL_POINTS);
  // x = βw/2; the pair's factor 2 sin²(x·ratio) has the period π/ratio.
  const ratio = centreDistanceM / widthM;
  const panelWidth = ratio > 1 ? Math.PI / ratio : Math.PI;
  const pairEnd = PAIR_PERIODS * panelWidth;
  const panel = (from: number, to: number): number => {
    let sum = 0;
    for (let i = 0; i < PANEL_POINTS; i++) {
      const x = from + (to - from) * nodes[i]!;
      const betaPerM = (2 * x) / widthM;
      const charge = chargeTransform(x);
      const pair = ratio === 0 || from >= pairEnd ? 1 : 2 * Math.sin(x * ratio) ** 2;
      sum += (weights[i]! * charge * charge * pair) / (x * (above(betaPerM) + below(betaPerM)));
    }
    return sum * (to - from);
  };
  let sum = 0;
  // Down to where every plane is near (Y ~ 1/β: the integrand is constant) or the pair's factor has vanished.
  for (let high = panelWidth; high > 1e-9 * panelWidth; high /= 4) sum += panel(high / 4, high);
  let from = panelWidth;
  while (from < STRIP_PANELS * Math.PI) {
    // Beyond the followed periods only the strip's own transform limits the panels: they grow to its half period.
    const to = from + (from < pairEnd ? panelWidth : Math.min(Math.PI, from / 2));
    sum += panel(from, to);
    from = to;
  }
  return sum;
}

/** ∫ (1 + |ξ|³) cos xξ dξ over −1…1, divided by its value at x = 0. */
function chargeTransform(x: number): number {
  if (x < 0.5) {
    // Taylor series, where the closed form below cancels; moments of the charge are 0.8 [1/(2k+1) + 1/(2k+4)].
    const x2 = x * x;
    return 1 - x2 * (0.2 - x2 * (13 / 1200 - x2 * (17 / 63_000 - x2 / 259_200)));
  }
  const half = Math.sin(x / 2) / (x / 2);
  return (1.6 * Math.sin(x)) / x + (2.4 / (x * x)) * (Math.cos(x) - (2 * Math.sin(x)) / x + half * half);
}
