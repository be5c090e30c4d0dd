import { scratchKernel } from '../kernel/kernel.ts';

/** Numbers of a source in the kernel: place and vector, the image's place and vector, amplitude. */
const SOURCE = 14;
const AMPLITUDE = 12;

/** Where sources and their images stand, with a vector each: 3 numbers for each source. No ground: no images. */
export interface SumSources {
  readonly placesM: Float64Array;
  readonly vectors: Float64Array;
  readonly images: { readonly placesM: Float64Array; readonly vectors: Float64Array } | null;
}

/** Where the sum is wanted, with a vector each: 3 numbers for each target. */
export interface SumTargets {
  readonly placesM: Float64Array;
  readonly vectors: Float64Array;
}

/**
 * Sums Σ_s a_s G(s, t) at targets t over sources s of fixed places, for any amplitudes and frequency:
 *   G = static(s, t) + (l_s · v_t) (e^(−jkR) − 1)/R, and the latter again for the image of s.
 * The kernel of `PartialElements`; scalars have the vector (1, 0, 0), images of charges (−1, 0, 0).
 */
export class FilamentSums {
  readonly #sourceCount: number;
  readonly #targetCount: number;
  /** Even, for the kernel: one more target without vector may follow. */
  readonly #paddedCount: number;
  readonly #hasImages: boolean;
  readonly #sources: Float64Array;
  readonly #targets: Float64Array;
  readonly #statics: Float64Array;
  /** 0 for sources across all targets: they add nothing. */
  readonly #acts: Uint8Array;

  /** `staticOf`: static part between a source and a target, image included; 0 where the vectors are across each other. */
  constructor(sources: SumSources, targets: SumTargets, staticOf: (source: number, target: number) => number) {
    this.#sourceCount = sources.placesM.length / 3;
    this.#targetCount = targets.placesM.length / 3;
    this.#paddedCount = this.#targetCount + (this.#targetCount % 2);
    this.#hasImages = sources.images !== null;
    this.#sources = new Float64Array(SOURCE * this.#sourceCount);
    this.#targets = new Float64Array(6 * this.#paddedCount);
    this.#statics = new Float64Array(this.#sourceCount * this.#paddedCount);
    this.#acts = Uint8Array.from({ length: this.#sourceCount }, (_, s) => (actsOn(sources, s, targets) ? 1 : 0));
    for (let t = 0; t < this.#targetCount; t++) {
      for (let axis = 0; axis < 3; axis++) {
        this.#targets[axis * this.#paddedCount + t] = targets.placesM[3 * t + axis]!;
        this.#targets[(3 + axis) * this.#paddedCount + t] = targets.vectors[3 * t + axis]!;
      }
    }
    const blocks = [sources.placesM, sources.vectors, sources.images?.placesM, sources.images?.vectors];
    for (let s = 0; s < this.#sourceCount; s++) {
      for (const [b, block] of blocks.entries()) {
        if (block) this.#sources.set(block.subarray(3 * s, 3 * s + 3), SOURCE * s + 3 * b);
      }
      if (this.#acts[s] === 0) continue;
      for (let t = 0; t < this.#targetCount; t++) this.#statics[s * this.#paddedCount + t] = staticOf(s, t);
    }
  }

  /** The sums for complex amplitudes (re, im of each source), re and im apart. The next call of anyone overwrites them. */
  at(kPerM: number, amplitudes: Float64Array): { readonly re: Float64Array; readonly im: Float64Array } {
    for (let s = 0; s < this.#sourceCount; s++) {
      this.#sources[SOURCE * s + AMPLITUDE] = this.#acts[s]! * amplitudes[2 * s]!;
      this.#sources[SOURCE * s + AMPLITUDE + 1] = this.#acts[s]! * amplitudes[2 * s + 1]!;
    }
    const count = this.#paddedCount;
    const targets = this.#sources.length;
    const statics = targets + this.#targets.length;
    const work = statics + this.#statics.length;
    const re = work + 2 * count;
    const im = re + count;
    const { floats, functions } = scratchKernel(im + count);
    floats.set(this.#sources);
    floats.set(this.#targets, targets);
    floats.set(this.#statics, statics);
    floats.fill(0, re, im + count);
    functions.addSources(
      kPerM,
      this.#sourceCount,
      0,
      this.#hasImages,
      8 * statics,
      count,
      8 * targets,
      8 * work,
      8 * re,
      8 * im,
    );
    return { re: floats.subarray(re, re + this.#targetCount), im: floats.subarray(im, im + this.#targetCount) };
  }
}

function actsOn({ vectors, images }: SumSources, s: number, targets: SumTargets): boolean {
  for (const own of images ? [vectors, images.vectors] : [vectors]) {
    for (let t = 0; t < targets.vectors.length; t += 3) {
      if (
        own[3 * s]! * targets.vectors[t]! +
          own[3 * s + 1]! * targets.vectors[t + 1]! +
          own[3 * s + 2]! * targets.vectors[t + 2]! !==
        0
      ) {
        return true;
      }
    }
  }
  return false;
}
