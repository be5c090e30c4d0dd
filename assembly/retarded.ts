const TURNS_PER_RAD: f64 = 0.15915494309189535;
/** 2π in two parts: the first has 33 bits, so its multiples by whole numbers are exact. */
const TURN_HIGH_RAD: f64 = 6.2831853069365025;
const TURN_LOW_RAD: f64 = 2.430840202602477e-10;
/** Distances below count as this: the kernel has then reached its limit −jk. */
const LEAST_M: f64 = 1e-12;

/**
 * Adds to every target the retarded kernel g = (e^(−jkR) − 1)/R from one point, weighed by l · v.
 *
 * `targets`: addresses of six arrays of `count` (even) numbers one after the other: x, y, z and the vector v of each
 * target; `re`, `im`: addresses of the sums, `count` each. (px, py, pz): the point, (lx, ly, lz): its vector.
 * With s, c = sin, cos(kR/2): g = −2 s (s + jc)/R, free of cancellation. s and c come from a quarter of the phase, whole turns
 * taken out, by series good to 2e-14 (Abramowitz & Stegun 4.3.65–66), and from the double-angle formulas.
 */
export function addRetarded(
  kPerM: f64,
  px: f64,
  py: f64,
  pz: f64,
  lx: f64,
  ly: f64,
  lz: f64,
  count: i32,
  targets: usize,
  re: usize,
  im: usize,
): void {
  const bytes = (<usize>count) << 3;
  const k = f64x2.splat(kPerM);
  const x = f64x2.splat(px);
  const y = f64x2.splat(py);
  const z = f64x2.splat(pz);
  const ux = f64x2.splat(lx);
  const uy = f64x2.splat(ly);
  const uz = f64x2.splat(lz);
  for (let at: usize = 0; at < bytes; at += 16) {
    let source = targets + at;
    const dx = f64x2.sub(v128.load(source), x);
    source += bytes;
    const dy = f64x2.sub(v128.load(source), y);
    source += bytes;
    const dz = f64x2.sub(v128.load(source), z);
    source += bytes;
    let weight = f64x2.mul(ux, v128.load(source));
    source += bytes;
    weight = f64x2.add(weight, f64x2.mul(uy, v128.load(source)));
    source += bytes;
    weight = f64x2.add(weight, f64x2.mul(uz, v128.load(source)));
    const r2 = f64x2.add(f64x2.add(f64x2.mul(dx, dx), f64x2.mul(dy, dy)), f64x2.mul(dz, dz));
    const distance = f64x2.max(f64x2.sqrt(r2), f64x2.splat(LEAST_M));
    const t = quarterPhase(f64x2.mul(k, distance));
    const t2 = f64x2.mul(t, t);
    const sinT = f64x2.mul(t, sinSeries(t2));
    const s = f64x2.mul(f64x2.add(sinT, sinT), cosSeries(t2));
    const c = f64x2.sub(f64x2.splat(1), f64x2.mul(f64x2.add(sinT, sinT), sinT));
    const scale = f64x2.div(f64x2.mul(f64x2.mul(weight, s), f64x2.splat(-2)), distance);
    v128.store(re + at, f64x2.add(v128.load(re + at), f64x2.mul(scale, s)));
    v128.store(im + at, f64x2.add(v128.load(im + at), f64x2.mul(scale, c)));
  }
}

/** A quarter of the phase without its whole turns: −π/4 … π/4. */
function quarterPhase(phase: v128): v128 {
  const turns = f64x2.nearest(f64x2.mul(phase, f64x2.splat(TURNS_PER_RAD)));
  const high = f64x2.sub(phase, f64x2.mul(turns, f64x2.splat(TURN_HIGH_RAD)));
  return f64x2.mul(f64x2.sub(high, f64x2.mul(turns, f64x2.splat(TURN_LOW_RAD))), f64x2.splat(0.25));
}

/** sin(t)/t from t². */
function sinSeries(t2: v128): v128 {
  let sum = f64x2.splat(1.0 / 6227020800.0);
  sum = f64x2.sub(f64x2.mul(sum, t2), f64x2.splat(1.0 / 39916800.0));
  sum = f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1.0 / 362880.0));
  sum = f64x2.sub(f64x2.mul(sum, t2), f64x2.splat(1.0 / 5040.0));
  sum = f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1.0 / 120.0));
  sum = f64x2.sub(f64x2.mul(sum, t2), f64x2.splat(1.0 / 6.0));
  return f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1));
}

/** cos(t) from t². */
function cosSeries(t2: v128): v128 {
  let sum = f64x2.splat(-1.0 / 87178291200.0);
  sum = f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1.0 / 479001600.0));
  sum = f64x2.sub(f64x2.mul(sum, t2), f64x2.splat(1.0 / 3628800.0));
  sum = f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1.0 / 40320.0));
  sum = f64x2.sub(f64x2.mul(sum, t2), f64x2.splat(1.0 / 720.0));
  sum = f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1.0 / 24.0));
  sum = f64x2.sub(f64x2.mul(sum, t2), f64x2.splat(0.5));
  return f64x2.add(f64x2.mul(sum, t2), f64x2.splat(1));
}

/** out += (re + j im) · g, `count` (even) numbers; addresses of real and imaginary parts. */
export function addProduct(count: i32, gRe: usize, gIm: usize, re: f64, im: f64, outRe: usize, outIm: usize): void {
  const bytes = (<usize>count) << 3;
  const factorRe = f64x2.splat(re);
  const factorIm = f64x2.splat(im);
  for (let at: usize = 0; at < bytes; at += 16) {
    const xRe = v128.load(gRe + at);
    const xIm = v128.load(gIm + at);
    const sumRe = f64x2.sub(f64x2.mul(factorRe, xRe), f64x2.mul(factorIm, xIm));
    const sumIm = f64x2.add(f64x2.mul(factorRe, xIm), f64x2.mul(factorIm, xRe));
    v128.store(outRe + at, f64x2.add(v128.load(outRe + at), sumRe));
    v128.store(outIm + at, f64x2.add(v128.load(outIm + at), sumIm));
  }
}
