/**
 * out[r] = Σ_i weights[r][i] rows[i] for `rowCount` rows r: `inner` rows of `length` (even) numbers are combined. All but the
 * counts are addresses.
 */
export function combineRows(weights: usize, rowCount: i32, inner: i32, rows: usize, length: i32, out: usize): void {
  const bytes = (<usize>length) << 3;
  const weightBytes = (<usize>inner) << 3;
  for (let r = 0; r < rowCount; r++) {
    let at: usize = 0;
    for (; at + 56 < bytes; at += 64) combineEight(weights, weightBytes, rows + at, bytes, out + at);
    for (; at < bytes; at += 16) combineTwo(weights, weightBytes, rows + at, bytes, out + at);
    weights += weightBytes;
    out += bytes;
  }
}

function combineEight(weights: usize, weightBytes: usize, source: usize, bytes: usize, out: usize): void {
  let a = f64x2.splat(0);
  let b = f64x2.splat(0);
  let c = f64x2.splat(0);
  let d = f64x2.splat(0);
  for (let i: usize = 0; i < weightBytes; i += 8) {
    const weight = v128.load64_splat(weights + i);
    a = f64x2.add(a, f64x2.mul(weight, v128.load(source)));
    b = f64x2.add(b, f64x2.mul(weight, v128.load(source, 16)));
    c = f64x2.add(c, f64x2.mul(weight, v128.load(source, 32)));
    d = f64x2.add(d, f64x2.mul(weight, v128.load(source, 48)));
    source += bytes;
  }
  v128.store(out, a);
  v128.store(out, b, 16);
  v128.store(out, c, 32);
  v128.store(out, d, 48);
}

function combineTwo(weights: usize, weightBytes: usize, source: usize, bytes: usize, out: usize): void {
  let a = f64x2.splat(0);
  for (let i: usize = 0; i < weightBytes; i += 8) {
    a = f64x2.add(a, f64x2.mul(v128.load64_splat(weights + i), v128.load(source)));
    source += bytes;
  }
  v128.store(out, a);
}
