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

const ALONG = 0;
const SHUNT = 1;
const ENDS = 2;

/** Rules of many elements, packed for the loop over frequencies. */
export interface PackedRules {
  readonly kinds: Uint8Array;
  readonly sections: Int32Array;
  readonly placesM: Float64Array;
  readonly factors: Float64Array;
  readonly endTerms: readonly (readonly EndTerm[])[];
}

export function packRules(rules: readonly CurrentRule[]): PackedRules {
  return {
    kinds: Uint8Array.from(rules, ({ kind }) => (kind === 'along' ? ALONG : kind === 'shunt' ? SHUNT : ENDS)),
    sections: Int32Array.from(rules, (rule) => (rule.kind === 'ends' ? -1 : rule.section)),
    placesM: Float64Array.from(rules, (rule) => (rule.kind === 'ends' ? 0 : rule.atM)),
    factors: Float64Array.from(rules, (rule) => (rule.kind === 'ends' ? 0 : rule.factor)),
    endTerms: rules.map((rule) => (rule.kind === 'ends' ? rule.terms : [])),
  };
}

/**
 * Currents of elements from a net's response: I(s) = I⁺e^(−γs) + I⁻e^(+γs), V(s) = Z0 (I⁺e^(−γs) − I⁻e^(+γs)).
 * Adds phasor·current to `out` (re, im per element; A, or A for shunt elements whose vector holds the length).
 */
export function addElementCurrents(
  { kinds, sections: sectionOf, placesM, factors, endTerms }: PackedRules,
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
  for (let i = 0; i < kinds.length; i++) {
    let re = 0;
    let im = 0;
    if (kinds[i] === ENDS) {
      for (const { section, isAtB, factor } of endTerms[i]!) {
        wavesAt(response, section, isAtB ? sections[section]!.lengthM : 0, wave);
        waveSection = -1;
        const sign = isAtB ? -factor : factor;
        re += sign * (wave[0]! + wave[2]!);
        im += sign * (wave[1]! + wave[3]!);
      }
    } else {
      const section = sectionOf[i]!;
      const atM = placesM[i]!;
      // Trace, return and polarisation of one place follow each other and share its waves.
      if (section !== waveSection || atM !== waveAtM) {
        wavesAt(response, section, atM, wave);
        waveSection = section;
        waveAtM = atM;
      }
      if (kinds[i] === ALONG) {
        re = factors[i]! * (wave[0]! + wave[2]!);
        im = factors[i]! * (wave[1]! + wave[3]!);
      } else {
        const scale = omega * factors[i]! * sections[section]!.z0Ohm;
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
