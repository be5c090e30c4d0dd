import { bitsOf, doubleOf } from './double-bits.ts';
import { findMultiples, MOST_BASES } from './multiples.ts';
import { GUESSES, NumberGuesses } from './number-guesses.ts';

/**
 * Packs numbers that come in columns, bit for bit. Many numbers of a result repeat another one near them (the level is
 * that of one polarisation), miss it by a rounding (a lone contributor), are a difference (margin = limit − level) or a
 * harmonic: those cost a code and little else. The others are laid out plane by plane, highest byte first, for the
 * compressor that follows.
 */

/** Largest distance, in units of the last place, that counts as a rounding. */
const NEAR = 127;

/** Codes: 0 as it is; 1 + 2g guess g exactly; 2 + 2g guess g with an offset; FIRST_BASE + b a multiple of base b. */
const RAW = 0;
const FIRST_BASE = 1 + 2 * GUESSES;
const isOffset = (code: number): boolean => code > RAW && code < FIRST_BASE && code % 2 === 0;

/** Column after column in each. */
export interface PackedNumbers {
  /** How each number was coded. */
  readonly codes: Uint8Array;
  /** Distances of those that miss a guess by a rounding. */
  readonly offsets: Int8Array;
  /** For each column the count of its bases, as a double, then the bases. */
  readonly bases: Float64Array;
  /** Factors of multiples: two planes for each column. */
  readonly factors: Uint8Array;
  /** Numbers as they are: eight planes for each column. */
  readonly planes: Uint8Array;
}

interface Column {
  readonly codes: number[];
  readonly offsets: number[];
  readonly raw: number[];
}

/** Takes numbers in the order of the walk. */
export class NumberPacker {
  readonly #columns: Column[] = [];
  readonly #guesses = new NumberGuesses();

  add(number: number, column: number): void {
    this.#columns[column] ??= { codes: [], offsets: [], raw: [] };
    const { codes, offsets, raw } = this.#columns[column];
    const [code, offset] = this.#guess(number, column);
    codes.push(code);
    if (code === RAW) raw.push(number);
    else if (isOffset(code)) offsets.push(offset);
    this.#guesses.add(number, column);
  }

  #guess(number: number, column: number): [code: number, offset: number] {
    const [high, low] = bitsOf(number);
    let near: [number, number] = [RAW, 0];
    for (let guess = 0; guess < GUESSES; guess++) {
      const [guessHigh, guessLow] = bitsOf(this.#guesses.at(guess, column));
      if (guessHigh !== high) continue;
      const distance = low - guessLow;
      if (distance === 0) return [1 + 2 * guess, 0];
      if (near[0] === RAW && Math.abs(distance) <= NEAR) near = [2 + 2 * guess, distance];
    }
    return near;
  }

  finish(): PackedNumbers {
    const packed = this.#columns.map(({ codes, offsets, raw }) => {
      const { bases, baseOf, factors } = findMultiples(raw);
      let at = 0;
      return {
        codes: codes.map((code) => {
          if (code !== RAW) return code;
          const base = baseOf[at++] ?? -1;
          return base < 0 ? RAW : FIRST_BASE + base;
        }),
        offsets,
        bases: [bases.length, ...bases],
        factors: planesOf(
          factors.filter((factor) => factor > 0).map((factor) => [factor]),
          2,
        ),
        planes: planesOf(raw.filter((_, i) => (baseOf[i] ?? -1) < 0).map(bitsOf), 4),
      };
    });
    return {
      codes: Uint8Array.from(packed.flatMap(({ codes }) => codes)),
      offsets: Int8Array.from(packed.flatMap(({ offsets }) => offsets)),
      bases: Float64Array.from(packed.flatMap(({ bases }) => bases)),
      factors: Uint8Array.from(packed.flatMap(({ factors }) => factors)),
      planes: Uint8Array.from(packed.flatMap(({ planes }) => planes)),
    };
  }
}

/** Words of so many bytes (several for each number) as planes: all highest bytes first, and so on. */
function planesOf(numbers: readonly (readonly number[])[], bytesEach: number): number[] {
  const planes: number[] = [];
  const words = numbers[0]?.length ?? 0;
  for (let word = 0; word < words; word++) {
    for (let shift = 8 * (bytesEach - 1); shift >= 0; shift -= 8) {
      for (const number of numbers) planes.push((number[word]! >>> shift) & 255);
    }
  }
  return planes;
}

interface Cursor {
  code: number;
  offset: number;
  factor: number;
  plane: number;
  /** How many of its kind the column holds: planes are so long. */
  readonly multiples: number;
  readonly raws: number;
  readonly bases: Float64Array;
}

/** Gives the numbers back in the order of the walk. Throws RangeError when the parts do not fit together. */
export class NumberUnpacker {
  readonly #packed: PackedNumbers;
  readonly #cursors: Cursor[] = [];
  readonly #guesses = new NumberGuesses();

  /** `counts`: how many numbers each column holds. */
  constructor(packed: PackedNumbers, counts: readonly number[]) {
    this.#packed = packed;
    let [code, offset, factor, plane, base] = [0, 0, 0, 0, 0];
    for (const count of counts) {
      const codes = packed.codes.subarray(code, code + count);
      const raws = codes.filter((item) => item === RAW).length;
      const multiples = codes.filter((item) => item >= FIRST_BASE).length;
      const bases = packed.bases.subarray(base + 1, base + 1 + (packed.bases[base] ?? 0));
      if (codes.some((item) => item >= FIRST_BASE + Math.min(MOST_BASES, bases.length))) throw unfit();
      this.#cursors.push({ code, offset, factor, plane, multiples, raws, bases });
      code += count;
      offset += codes.filter(isOffset).length;
      factor += 2 * multiples;
      plane += 8 * raws;
      base += 1 + bases.length;
    }
    const { codes, offsets, factors, planes, bases } = packed;
    const ends = [codes, offsets, factors, planes, bases].map(({ length }) => length);
    if ([code, offset, factor, plane, base].some((end, i) => end !== ends[i])) throw unfit();
  }

  next(column: number): number {
    const cursor = this.#cursors[column]!;
    const code = this.#packed.codes[cursor.code++]!;
    const number = this.#decode(code, column, cursor);
    this.#guesses.add(number, column);
    return number;
  }

  #decode(code: number, column: number, cursor: Cursor): number {
    const { factors, planes, offsets } = this.#packed;
    if (code === RAW) {
      const word = (from: number) => wordAt(planes, cursor.plane + from * cursor.raws, cursor.raws, 4);
      const number = doubleOf(word(0), word(4));
      cursor.plane++;
      return number;
    }
    if (code >= FIRST_BASE) {
      return wordAt(factors, cursor.factor++, cursor.multiples, 2) * cursor.bases[code - FIRST_BASE]!;
    }
    const guess = this.#guesses.at((code - 1) >> 1, column);
    if (!isOffset(code)) return guess;
    const [high, low] = bitsOf(guess);
    return doubleOf(high, low + offsets[cursor.offset++]!);
  }
}

/** A word of so many bytes, each in a plane of its own. */
function wordAt(planes: Uint8Array, at: number, planeLength: number, bytes: number): number {
  let word = 0;
  for (let byte = 0; byte < bytes; byte++) word = word * 256 + planes[at + byte * planeLength]!;
  return word;
}

const unfit = () => new RangeError('numbers do not fit their shape');
