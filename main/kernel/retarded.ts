const TURNS_PER_RAD: f64 = 0.15915494309189535;
/** 2π in two parts: the first has 33 bits, so its multiples by whole numbers are exact. */
const TURN_HIGH_RAD: f64 = 6.2831853069365025;
const TURN_LOW_RAD: f64 = 2.430840202602477e-10;
/** Distances below count as this: the kernel has then reached its limit −jk. */
const LEAST_M: f64 = 1e-12;

/** Bytes of a source: place and vector, the image's place and vector, amplitude (re, im). */
const SOURCE: usize = 14 * 8;
const IMAGE: usize = 6 * 8;
const AMPLITUDE: usize = 12 * 8;

/**
 * Σ a_s G(s, t) for every target t, G = static part + retarded part + the image's retarded part.
 *
 * `sources`: `sourceCount` records (SOURCE); `statics`: a row of `count` static parts for each source; `targets`: six arrays of
 * `count` (even) numbers, x, y, z and the vector v of each target; `work`: 2 × `count` numbers; `re`, `im`: the sums, `count`
 * each, added to. All but counts and flags are addresses.
 */
export function addSources(
  kPerM: f64,
  sourceCount: i32,
  sources: usize,
  hasImages: bool,
  statics: usize,
  count: i32,
  targets: usize,
  work: usize,
  re: usize,
  im: usize,
): void {
  const bytes = (<usize>count) << 3;
  const end = sources + <usize>sourceCount * SOURCE;
  for (let source = sources; source < end; source += SOURCE) {
    const aRe = load<f64>(source, AMPLITUDE);
    const aIm = load<f64>(source, AMPLITUDE + 8);
    if (!(aRe === 0 && aIm === 0)) {
      memory.copy(work, statics, bytes);
      memory.fill(work + bytes, 0, bytes);
      addRetarded(kPerM, source, count, targets, work, work + bytes);
      if (hasImages) addRetarded(kPerM, source + IMAGE, count, targets, work, work + bytes);
      addProduct(count, work, work + bytes, aRe, aIm, re, im);
    }
    statics += bytes;
  }
}

/**
 * Adds to every target the retarded kernel g = (e^(−jkR) − 1)/R from one point, weighed by l · v.
 *
 * `source`: address of the point and its vector l. With s, c = sin, cos(kR/2): g = −2 s (s + jc)/R, free of cancellation. s and
 * c come from a quarter of the phase, whole turns taken out, by series good to 2e-14 (Abramowitz & Stegun 4.3.65–66), and from the
 * double-angle formulas.
 */
function addRetarded(kPerM: f64, source: usize, count: i32, targets: usize, re: usize, im: usize): void {
  const bytes = (<usize>count) << 3;
  const k = f64x2.splat(kPerM);
  const x = v128.load64_splat(source);
  const y = v128.load64_splat(source, 8);
  const z = v128.load64_splat(source, 16);
  const ux = v128.load64_splat(source, 24);
  const uy = v128.load64_splat(source, 32);
  const uz = v128.load64_splat(source, 40);
  for (let at: usize = 0; at < bytes; at += 16) {
    let target = targets + at;
    const dx = f64x2.sub(v128.load(target), x);
    target += bytes;
    const dy = f64x2.sub(v128.load(target), y);
    target += bytes;
    const dz = f64x2.sub(v128.load(target), z);
    target += bytes;
    let weight = f64x2.mul(ux, v128.load(target));
    target += bytes;
    weight = f64x2.add(weight, f64x2.mul(uy, v128.load(target)));
    target += bytes;
    weight = f64x2.add(weight, f64x2.mul(uz, v128.load(target)));
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
function addProduct(count: i32, gRe: usize, gIm: usize, re: f64, im: f64, outRe: usize, outIm: usize): void {
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
