/**
 * Solves A x = b in place with the factors of `factor`: L y = b, z = y/D, Lᵀ x = z. All but `size` are addresses.
 */
export function solve(re: usize, im: usize, size: i32, bRe: usize, bIm: usize): void {
  const rowBytes = (<usize>size) << 3;
  let row: usize = 0;
  for (let i: usize = 0; i < rowBytes; i += 8) {
    subtractRow(re + row, im + row, i, bRe, bIm);
    row += rowBytes;
  }
  let diagonal: usize = 0;
  for (let i: usize = 0; i < rowBytes; i += 8) {
    const dRe = load<f64>(re + diagonal);
    const dIm = load<f64>(im + diagonal);
    const yRe = load<f64>(bRe + i);
    const yIm = load<f64>(bIm + i);
    store<f64>(bRe + i, yRe * dRe - yIm * dIm);
    store<f64>(bIm + i, yRe * dIm + yIm * dRe);
    diagonal += rowBytes + 8;
  }
  for (let i = rowBytes - 8; i > 0; i -= 8) {
    row -= rowBytes;
    spreadRow(re + row, im + row, i, bRe, bIm);
  }
}

/** b[i] −= Σ A[i][j] b[j] over the columns before `end` (bytes: the row's own place). */
function subtractRow(re: usize, im: usize, end: usize, bRe: usize, bIm: usize): void {
  let sumRe = f64x2.splat(0);
  let sumIm = f64x2.splat(0);
  let at: usize = 0;
  for (; at + 8 < end; at += 16) {
    const aRe = v128.load(re + at);
    const aIm = v128.load(im + at);
    const xRe = v128.load(bRe + at);
    const xIm = v128.load(bIm + at);
    sumRe = f64x2.sub(f64x2.add(sumRe, f64x2.mul(aRe, xRe)), f64x2.mul(aIm, xIm));
    sumIm = f64x2.add(f64x2.add(sumIm, f64x2.mul(aRe, xIm)), f64x2.mul(aIm, xRe));
  }
  let re2 = f64x2.extract_lane(sumRe, 0) + f64x2.extract_lane(sumRe, 1);
  let im2 = f64x2.extract_lane(sumIm, 0) + f64x2.extract_lane(sumIm, 1);
  if (at < end) {
    const aRe = load<f64>(re + at);
    const aIm = load<f64>(im + at);
    const xRe = load<f64>(bRe + at);
    const xIm = load<f64>(bIm + at);
    re2 += aRe * xRe - aIm * xIm;
    im2 += aRe * xIm + aIm * xRe;
  }
  store<f64>(bRe + end, load<f64>(bRe + end) - re2);
  store<f64>(bIm + end, load<f64>(bIm + end) - im2);
}

/** b[j] −= A[i][j] b[i] for the columns before `end` (bytes: the row's own place). */
function spreadRow(re: usize, im: usize, end: usize, bRe: usize, bIm: usize): void {
  const valueRe = load<f64>(bRe + end);
  const valueIm = load<f64>(bIm + end);
  const xRe = f64x2.splat(valueRe);
  const xIm = f64x2.splat(valueIm);
  let at: usize = 0;
  for (; at + 8 < end; at += 16) {
    const aRe = v128.load(re + at);
    const aIm = v128.load(im + at);
    const targetRe = v128.load(bRe + at);
    const targetIm = v128.load(bIm + at);
    v128.store(bRe + at, f64x2.add(f64x2.sub(targetRe, f64x2.mul(aRe, xRe)), f64x2.mul(aIm, xIm)));
    v128.store(bIm + at, f64x2.sub(f64x2.sub(targetIm, f64x2.mul(aRe, xIm)), f64x2.mul(aIm, xRe)));
  }
  if (at < end) {
    const aRe = load<f64>(re + at);
    const aIm = load<f64>(im + at);
    store<f64>(bRe + at, load<f64>(bRe + at) - aRe * valueRe + aIm * valueIm);
    store<f64>(bIm + at, load<f64>(bIm + at) - aRe * valueIm - aIm * valueRe);
  }
}
