/**
 * Discrete Fourier transform of any length N, in place of (re, im):  Z_m = Σ_k z_k e^(−j2πmk/N),  m = 0 … N − 1.
 *
 * Chirp form (L. I. Bluestein, IEEE Trans. Audio Electroacoustics 18(4), 1970): mk = (m² + k² − (m − k)²)/2 turns the
 * sum into a convolution, done with a radix-2 transform. The chirp's phase πk²/N is reduced in whole numbers, so the
 * result is exact to rounding for N up to 2²⁵ (k² stays below 2⁵³).
 */
export function discreteFourierTransform(re: Float64Array, im: Float64Array): void {
  const n = re.length;
  if (n < 2) return;
  let size = 1;
  while (size < 2 * n - 1) size *= 2;
  const chirpRe = new Float64Array(n);
  const chirpIm = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    const angleRad = (Math.PI * ((k * k) % (2 * n))) / n;
    chirpRe[k] = Math.cos(angleRad);
    chirpIm[k] = Math.sin(angleRad);
  }
  const aRe = new Float64Array(size);
  const aIm = new Float64Array(size);
  const bRe = new Float64Array(size);
  const bIm = new Float64Array(size);
  for (let k = 0; k < n; k++) {
    const [c, s] = [chirpRe[k]!, chirpIm[k]!];
    aRe[k] = re[k]! * c + im[k]! * s;
    aIm[k] = im[k]! * c - re[k]! * s;
    bRe[k] = c;
    bIm[k] = s;
    if (k === 0) continue;
    bRe[size - k] = c;
    bIm[size - k] = s;
  }
  powerOfTwoTransform(aRe, aIm);
  powerOfTwoTransform(bRe, bIm);
  for (let i = 0; i < size; i++) {
    const productRe = aRe[i]! * bRe[i]! - aIm[i]! * bIm[i]!;
    aIm[i] = aRe[i]! * bIm[i]! + aIm[i]! * bRe[i]!;
    aRe[i] = productRe;
  }
  // Exchanging real and imaginary parts on the way in and out makes the forward transform the inverse one.
  powerOfTwoTransform(aIm, aRe);
  for (let k = 0; k < n; k++) {
    const [c, s] = [chirpRe[k]! / size, chirpIm[k]! / size];
    re[k] = aRe[k]! * c + aIm[k]! * s;
    im[k] = aIm[k]! * c - aRe[k]! * s;
  }
}

/** Radix-2 transform in place, length a power of two (decimation in time, one table of twiddle factors). */
function powerOfTwoTransform(re: Float64Array, im: Float64Array): void {
  const n = re.length;
  for (let i = 1, j = 0; i < n; i++) {
    let bit = n >> 1;
    for (; (j & bit) !== 0; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i >= j) continue;
    [re[i], re[j]] = [re[j]!, re[i]!];
    [im[i], im[j]] = [im[j]!, im[i]!];
  }
  const cosines = new Float64Array(n / 2);
  const sines = new Float64Array(n / 2);
  for (let k = 0; k < n / 2; k++) {
    cosines[k] = Math.cos((2 * Math.PI * k) / n);
    sines[k] = -Math.sin((2 * Math.PI * k) / n);
  }
  for (let half = 1; half < n; half *= 2) {
    const stride = n / (2 * half);
    for (let start = 0; start < n; start += 2 * half) {
      for (let k = 0; k < half; k++) {
        const [c, s] = [cosines[k * stride]!, sines[k * stride]!];
        const [p, q] = [start + k, start + k + half];
        const tRe = re[q]! * c - im[q]! * s;
        const tIm = re[q]! * s + im[q]! * c;
        re[q] = re[p]! - tRe;
        im[q] = im[p]! - tIm;
        re[p] = re[p]! + tRe;
        im[p] = im[p]! + tIm;
      }
    }
  }
}
