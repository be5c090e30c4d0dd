import type { NetworkResponse } from '../network/network.ts';

/** Current taken from the end of a section, counted as leaving the node into the section. */
export interface EndTerm {
  readonly section: number;
  /** The section's node B (else node A). */
  readonly isAtB: boolean;
  readonly factor: number;
}

/** How the current of one element follows from the solved net. */
export type CurrentRule =
  /** factor · I(s) of a section, s from its node A. */
  | { readonly kind: 'along'; readonly section: number; readonly atM: number; readonly factor: number }
  /** jω · factor (F/m) · V(s): displacement current per length, A/m. */
  | { readonly kind: 'shunt'; readonly section: number; readonly atM: number; readonly factor: number }
  /** Σ factor · (current leaving a node into a section). */
  | { readonly kind: 'ends'; readonly terms: readonly EndTerm[] };

/**
 * Currents of elements from a net's response: I(s) = I⁺e^(−γs) + I⁻e^(+γs), V(s) = Z0 (I⁺e^(−γs) − I⁻e^(+γs)).
 * Adds phasor·current to `out` (re, im per element; A, or A for shunt elements whose vector holds the length).
 */
export function addElementCurrents(
  rules: readonly CurrentRule[],
  response: NetworkResponse,
  sections: readonly { readonly lengthM: number; readonly z0Ohm: number }[],
  frequencyHz: number,
  phasorRe: number,
  phasorIm: number,
  out: Float64Array,
): void {
  const wave = new Float64Array(4);
  const omega = 2 * Math.PI * frequencyHz;
  let waveSection = -1;
  let waveAtM = 0;
  for (let i = 0; i < rules.length; i++) {
    const rule = rules[i]!;
    let re = 0;
    let im = 0;
    if (rule.kind === 'ends') {
      for (const { section, isAtB, factor } of rule.terms) {
        wavesAt(response, section, isAtB ? sections[section]!.lengthM : 0, wave);
        waveSection = -1;
        const sign = isAtB ? -factor : factor;
        re += sign * (wave[0]! + wave[2]!);
        im += sign * (wave[1]! + wave[3]!);
      }
    } else {
      // Trace, return and polarisation of one place follow each other and share its waves.
      if (rule.section !== waveSection || rule.atM !== waveAtM) {
        wavesAt(response, rule.section, rule.atM, wave);
        waveSection = rule.section;
        waveAtM = rule.atM;
      }
      if (rule.kind === 'along') {
        re = rule.factor * (wave[0]! + wave[2]!);
        im = rule.factor * (wave[1]! + wave[3]!);
      } else {
        const scale = omega * rule.factor * sections[rule.section]!.z0Ohm;
        re = -scale * (wave[1]! - wave[3]!);
        im = scale * (wave[0]! - wave[2]!);
      }
    }
    out[2 * i]! += re * phasorRe - im * phasorIm;
    out[2 * i + 1]! += re * phasorIm + im * phasorRe;
  }
}

/** Forward and backward current wave of a section at `atM` from its node A: [I⁺ re, I⁺ im, I⁻ re, I⁻ im]. */
function wavesAt(response: NetworkResponse, section: number, atM: number, out: Float64Array): void {
  const at = 2 * section;
  const decay = Math.exp(-response.gamma[at]! * atM);
  const phase = response.gamma[at + 1]! * atM;
  const c = Math.cos(phase);
  const s = Math.sin(phase);
  const fRe = response.forward[at]!;
  const fIm = response.forward[at + 1]!;
  const bRe = response.backward[at]!;
  const bIm = response.backward[at + 1]!;
  out[0] = decay * (fRe * c + fIm * s);
  out[1] = decay * (fIm * c - fRe * s);
  out[2] = (bRe * c - bIm * s) / decay;
  out[3] = (bIm * c + bRe * s) / decay;
}
