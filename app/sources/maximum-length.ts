import { inputError } from '../errors.ts';

/**
 * Feedback stages of a shift register of n stages, one entry per n from 2 to 15: the polynomial x^n + … + 1 has one
 * term per stage named here. n = 9, 11 and 15 are the sequences of ITU-T O.150 (05/96), clauses 5.1 to 5.3 (stages
 * 5 and 9, 9 and 11, 14 and 15); n = 7 is the x⁷ + x⁶ + 1 of common practice; the rest are primitive polynomials of
 * the usual tables (from memory; the tests prove every one of maximum length).
 */
const FEEDBACK_STAGES: ReadonlyMap<number, readonly number[]> = new Map([
  [2, [2, 1]],
  [3, [3, 2]],
  [4, [4, 3]],
  [5, [5, 3]],
  [6, [6, 5]],
  [7, [7, 6]],
  [8, [8, 6, 5, 4]],
  [9, [9, 5]],
  [10, [10, 7]],
  [11, [11, 9]],
  [12, [12, 11, 10, 4]],
  [13, [13, 12, 11, 8]],
  [14, [14, 13, 12, 2]],
  [15, [15, 14]],
]);

/** Stages n of the register whose sequence has `sequenceBits` = 2^n − 1 bits; undefined for any other length. */
export function registerStages(sequenceBits: number): number | undefined {
  const stages = Math.log2(sequenceBits + 1);
  return FEEDBACK_STAGES.has(stages) ? stages : undefined;
}

/**
 * One period of the maximum-length sequence of `sequenceBits` = 2^n − 1 bits (0 or 1), n = 2 … 15.
 *
 *   Q1(t+1) = sum mod 2 of the feedback stages,  Q(i+1)(t+1) = Q(i)(t),  output Q(n), all stages 1 at the start
 *
 * So it begins with the first of its n consecutive ones (O.150 clause 5.1 fixes that phase for 511 bits) and ends in a
 * zero. O.150 transmits the sequence of 2¹⁵ − 1 bits inverted, which is not done here: a drive can be inverted.
 * Throws `input` for another length.
 */
export function maximumLengthBits(sequenceBits: number): Uint8Array {
  const stages = registerStages(sequenceBits);
  if (stages === undefined) throw inputError('sequenceBits', '2^n − 1 with n from 2 to 15', sequenceBits);
  const feedback = FEEDBACK_STAGES.get(stages)!;
  const bits = new Uint8Array(sequenceBits);
  // Stage i is bit i − 1 of the register.
  let register = sequenceBits;
  for (let i = 0; i < sequenceBits; i++) {
    bits[i] = (register >> (stages - 1)) & 1;
    let sum = 0;
    for (const stage of feedback) sum ^= (register >> (stage - 1)) & 1;
    register = ((register << 1) | sum) & sequenceBits;
  }
  return bits;
}
