import { KERNEL_HEX } from './kernel-bytes.ts';

/** The part of the language that runs the kernel (Node and browsers have it; the language's own types do not). */
declare const WebAssembly: {
  readonly Memory: new (size: { initial: number }) => { readonly buffer: ArrayBuffer };
  readonly Module: new (bytes: Uint8Array<ArrayBuffer>) => object;
  readonly Instance: new (module: object, imports: object) => { readonly exports: unknown };
};

const PAGE_BYTES = 65_536;

/** What main/kernel/ exports; places are bytes from the memory's start. */
interface KernelFunctions {
  factor(re: number, im: number, size: number, w: number, l: number, corner: number): number;
  solve(re: number, im: number, size: number, bRe: number, bIm: number): void;
  combineRows(weights: number, rowCount: number, inner: number, rows: number, length: number, out: number): void;
  addSources(
    kPerM: number,
    sourceCount: number,
    sources: number,
    hasImages: boolean,
    statics: number,
    count: number,
    targets: number,
    work: number,
    re: number,
    im: number,
  ): void;
}

/** Compiled numerical loops with a memory of their own. Basic arithmetic in a fixed order: the same numbers on every machine. */
export interface Kernel {
  readonly functions: KernelFunctions;
  /** The memory as numbers; place in bytes = 8 × index. */
  readonly floats: Float64Array;
}

let compiled: object | null = null;

/** A kernel whose memory holds at least `count` zeros. */
export function newKernel(count: number): Kernel {
  compiled ??= new WebAssembly.Module(bytesOf(KERNEL_HEX));
  const memory = new WebAssembly.Memory({ initial: Math.ceil((8 * count) / PAGE_BYTES) });
  const instance = new WebAssembly.Instance(compiled, { env: { memory } });
  return { functions: instance.exports as KernelFunctions, floats: new Float64Array(memory.buffer) };
}

let scratch: Kernel | null = null;

/** One kernel for work that leaves nothing behind: its memory (at least `count` numbers) holds what the last user left. */
export function scratchKernel(count: number): Kernel {
  if (!scratch || scratch.floats.length < count) scratch = newKernel(count);
  return scratch;
}

function bytesOf(hex: string): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(hex.length / 2);
  for (let i = 0; i < bytes.length; i++) bytes[i] = Number.parseInt(hex.slice(2 * i, 2 * i + 2), 16);
  return bytes;
}
