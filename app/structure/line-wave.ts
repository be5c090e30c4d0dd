/**
 * Current of a straight trace piece at one frequency, peak phasors: I(s) = I⁺ e^(−γs) + I⁻ e^(+γs), s from its start (m),
 * positive along the piece. γ = 0 gives a uniform current I⁺ + I⁻.
 */
export interface LineWave {
  readonly gammaRePerM: number;
  readonly gammaImPerM: number;
  readonly forwardReA: number;
  readonly forwardImA: number;
  readonly backwardReA: number;
  readonly backwardImA: number;
}

/** I(s): re, im into `out`, A. */
export function currentAt(wave: LineWave, sM: number, out: Float64Array): void {
  const decay = Math.exp(-wave.gammaRePerM * sM);
  const c = Math.cos(wave.gammaImPerM * sM);
  const s = Math.sin(wave.gammaImPerM * sM);
  const { forwardReA: fr, forwardImA: fi, backwardReA: br, backwardImA: bi } = wave;
  out[0] = decay * (fr * c + fi * s) + (br * c - bi * s) / decay;
  out[1] = decay * (fi * c - fr * s) + (bi * c + br * s) / decay;
}

/**
 * ∫ I ds from `fromM` to `toM`: re, im into `out`, A·m. Each wave is its value in the middle times
 * Δ·sinh(γΔ/2)/(γΔ/2), which has no cancellation for short pieces.
 */
export function currentIntegral(wave: LineWave, fromM: number, toM: number, out: Float64Array): void {
  currentAt(wave, (fromM + toM) / 2, out);
  const lengthM = toM - fromM;
  // sinh(u)/u with u = γΔ/2 = x + jy.
  const x = (wave.gammaRePerM * lengthM) / 2;
  const y = (wave.gammaImPerM * lengthM) / 2;
  const u2 = x * x + y * y;
  let ratioRe = 1;
  let ratioIm = 0;
  if (u2 < 1e-4) {
    // 1 + u²/6 + u⁴/120, the next term below 1e-15.
    const sRe = x * x - y * y;
    const sIm = 2 * x * y;
    ratioRe = 1 + sRe / 6 + (sRe * sRe - sIm * sIm) / 120;
    ratioIm = sIm / 6 + (2 * sRe * sIm) / 120;
  } else {
    const nRe = Math.sinh(x) * Math.cos(y);
    const nIm = Math.cosh(x) * Math.sin(y);
    ratioRe = (nRe * x + nIm * y) / u2;
    ratioIm = (nIm * x - nRe * y) / u2;
  }
  const re = out[0]!;
  const im = out[1]!;
  out[0] = lengthM * (re * ratioRe - im * ratioIm);
  out[1] = lengthM * (re * ratioIm + im * ratioRe);
}
