/** Columns that are eliminated together. */
export const BLOCK: i32 = 32;
/** Bytes of a panel's row: BLOCK real parts, then BLOCK imaginary parts. */
export const PANEL_ROW: usize = 512;
/** Bytes from a panel's real part to its imaginary part. */
export const PANEL_IM: usize = 256;

/** [at] −= both lanes. */
export function subtractLanes(at: usize, sum: v128): void {
  store<f64>(at, load<f64>(at) - (f64x2.extract_lane(sum, 0) + f64x2.extract_lane(sum, 1)));
}
