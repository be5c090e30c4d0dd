import type { LineSpectrum } from '../../app/sources/spectrum.ts';

/** Positive root nodes and weights of the 5-point Gauss–Legendre rule (Abramowitz & Stegun, table 25.4). */
const NODES = [0, 0.538469310105683, 0.906179845938664];
const WEIGHTS = [0.568888888888889, 0.478628670499366, 0.236926885056189];

/**
 * 2/T ∫ v(t) e^(−j2πft) dt over one period by Gauss–Legendre panels between `breaksS` (from 0 to T), at least
 * `perCycle` panels a cycle of f: the definition of a peak Fourier phasor, with no closed form in it.
 */
export function integratedPhasor(
  value: (timeS: number) => number,
  breaksS: readonly number[],
  frequencyHz: number,
  perCycle = 12,
): [re: number, im: number] {
  const periodS = breaksS.at(-1)! - breaksS[0]!;
  let re = 0;
  let im = 0;
  for (let b = 1; b < breaksS.length; b++) {
    const [fromS, toS] = [breaksS[b - 1]!, breaksS[b]!];
    const panels = Math.ceil((toS - fromS) * frequencyHz * perCycle) + 1;
    const halfS = (toS - fromS) / panels / 2;
    for (let p = 0; p < panels; p++) {
      const middleS = fromS + (2 * p + 1) * halfS;
      for (const [i, node] of NODES.entries()) {
        for (const signedNode of node === 0 ? [0] : [-node, node]) {
          const timeS = middleS + signedNode * halfS;
          const weight = WEIGHTS[i]! * halfS * value(timeS);
          re += weight * Math.cos(2 * Math.PI * frequencyHz * timeS);
          im -= weight * Math.sin(2 * Math.PI * frequencyHz * timeS);
        }
      }
    }
  }
  return [(2 * re) / periodS, (2 * im) / periodS];
}

export const magnitudes = ({ phasors }: LineSpectrum): number[] =>
  Array.from({ length: phasors.length / 2 }, (_, i) => Math.hypot(phasors[2 * i]!, phasors[2 * i + 1]!));

/** Largest distance in the complex plane between two spectra of equal lines. */
export function largestDifference(a: LineSpectrum, b: LineSpectrum): number {
  if (a.phasors.length !== b.phasors.length) return Infinity;
  let largest = 0;
  for (let i = 0; i < a.phasors.length; i += 2) {
    largest = Math.max(largest, Math.hypot(a.phasors[i]! - b.phasors[i]!, a.phasors[i + 1]! - b.phasors[i + 1]!));
  }
  return largest;
}

/** Σ X_m e^(jωt), real part: the waveform without its mean, from its lines. */
export function resynthesise({ frequenciesHz, phasors }: LineSpectrum, timeS: number): number {
  let sum = 0;
  for (const [i, frequencyHz] of frequenciesHz.entries()) {
    const angleRad = 2 * Math.PI * frequencyHz * timeS;
    sum += phasors[2 * i]! * Math.cos(angleRad) - phasors[2 * i + 1]! * Math.sin(angleRad);
  }
  return sum;
}
