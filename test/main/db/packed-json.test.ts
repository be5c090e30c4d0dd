import { createHash } from 'node:crypto';
import { brotliCompressSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { packJson, unpackJson } from '../../../main/db/packed-json.ts';
import { appFailure } from '../../support/app-failure.ts';
import { hostileResult } from '../../support/hostile-names.ts';
import { denseResult, sampleResult } from '../../support/sample-result.ts';

const SEED = 4711;

/** Every number by its bits, keys in their order, own keys "__proto__" as such. */
function exactForm(value: unknown): unknown {
  if (typeof value === 'number') return Buffer.from(new Float64Array([value]).buffer).toString('hex');
  if (Array.isArray(value)) return value.map(exactForm);
  if (typeof value === 'object' && value !== null)
    return Object.entries(value).map(([key, item]) => [key, exactForm(item)]);
  return value;
}
function roundTrip(value: unknown): void {
  expect(exactForm(unpackJson(packJson(value)))).toEqual(exactForm(value));
}

describe('comes back bit for bit', () => {
  it.each([
    ['results', [sampleResult(), denseResult(700)]],
    ['hostile names', hostileResult()],
    ['single values', [null, true, false, 'text', 0, -0, 5e-324, Number.MAX_VALUE, -1.5]],
    ['nothing', []],
    ['a lone number', 7],
    ['a lone text', '\ud800\0😀'],
    ['keys of object internals', JSON.parse('{"__proto__":1,"a":{"__proto__":{"b":-0}},"constructor":2,"7":1,"3":2}')],
    ['lists in lists', [[1, [2, [3]]], [[]], [{ a: [1] }, { a: [] }]]],
  ])('%s', (_, value) => roundTrip(value));

  it('any JSON', () => {
    fc.assert(fc.property(fc.jsonValue({ maxDepth: 5 }), roundTrip), { seed: SEED, numRuns: 300 });
  });

  it('numbers that repeat, nearly repeat, differ, or are harmonics', () => {
    const anyBits = fc.tuple(fc.nat(0xffffffff), fc.nat(0xffffffff)).map(([high, low]) => {
      const bytes = Buffer.alloc(8);
      bytes.writeUInt32BE(high);
      bytes.writeUInt32BE(low, 4);
      return bytes.readDoubleBE();
    });
    const next = (number: number, steps: number) => {
      const bytes = Buffer.alloc(8);
      bytes.writeDoubleBE(number);
      bytes.writeBigInt64BE(bytes.readBigInt64BE() + BigInt(steps));
      return bytes.readDoubleBE();
    };
    const columns = fc
      .array(
        fc.record({
          free: anyBits,
          kind: fc.constantFrom('free', 'repeat', 'near', 'difference', 'harmonic'),
          steps: fc.integer({ min: -200, max: 200 }),
          base: fc.constantFrom(25e6, 1e9 / 7, 1 / 3, 1e-9 / 3),
          factor: fc.integer({ min: 0, max: 70_000 }),
        }),
        { maxLength: 80 },
      )
      .map((rows) => {
        const numbers: number[] = [1, 2];
        for (const { free, kind, steps, base, factor } of rows) {
          const [before, last] = [numbers.at(-2)!, numbers.at(-1)!];
          const number = {
            free,
            repeat: before,
            near: next(last, steps),
            difference: last - before,
            harmonic: factor * base,
          }[kind];
          if (Number.isFinite(number)) numbers.push(number);
        }
        return [{ a: numbers }, { a: numbers, b: [...numbers].reverse() }, numbers.map((one) => ({ c: one, d: -one }))];
      });
    fc.assert(fc.property(columns, roundTrip), { seed: SEED, numRuns: 300 });
  });
});

describe('packs', () => {
  it('harmonics into a third of their bits', () => {
    // 25 MHz · n and 1/7 GHz · n in a scattered order: ten bits of order and factor are needed for each, of 64.
    const numbers = Array.from({ length: 1000 }, (_, i) => ((i * 387) % 1000) + 1).map((n) =>
      n % 2 ? 25e6 * n : (1e9 / 7) * n,
    );
    expect(packJson(numbers).length).toBeLessThan((8 * 1000) / 3);
  });

  it('margins, repeated levels and roundings into next to nothing', () => {
    const level = (i: number) => 40 * Math.sin(i * i);
    const alone = Array.from({ length: 1000 }, (_, i) => ({ levelDb: level(i) }));
    const whole = alone.map(({ levelDb }) => ({
      levelDb,
      limitDb: 47,
      marginDb: 47 - levelDb,
      verticalDb: levelDb,
      boundDb: levelDb * (1 + 2e-16),
    }));
    expect(packJson(whole).length).toBeLessThan(packJson(alone).length + 1500);
  });
});

describe('refuses', () => {
  it.each([Number.NaN, Number.POSITIVE_INFINITY])('%d', (number) => {
    expect(appFailure(() => packJson({ a: [1, number] })).message).toMatch(/^a\[1\] must be a finite number/);
  });

  const block = packJson(sampleResult());
  const changed = (change: (bytes: Buffer) => Buffer | undefined): Buffer => {
    const bytes = Buffer.from(block);
    return change(bytes) ?? bytes;
  };
  const resealed = (plain: Buffer): Buffer => {
    const body = brotliCompressSync(plain);
    return Buffer.concat([block.subarray(0, 6), createHash('sha256').update(body).digest().subarray(0, 16), body]);
  };

  it.each<[string, Buffer, string]>([
    ['no magic', changed((bytes) => void bytes.write('XXXX')), 'is no packed data'],
    [
      'another version',
      changed((bytes) => void bytes.writeUInt8(2, 4)),
      'is packed in version 2, layout 1; this program reads 1, 1',
    ],
    ['another layout', changed((bytes) => void bytes.writeUInt8(7, 5)), 'layout 7'],
    ['a changed byte', changed((bytes) => void bytes.writeUInt8(bytes[99]! ^ 1, 99)), 'has changed bytes'],
    ['a cut end', changed((bytes) => bytes.subarray(0, -1)), 'has changed bytes'],
    ['nothing', Buffer.alloc(0), 'is no packed data'],
    ['parts that do not end where the data does', resealed(Buffer.alloc(30)), 'is cut short'],
    [
      'numbers that do not fit',
      resealed(Buffer.concat([Buffer.from(new Uint32Array([3, 0, 0, 0, 0, 0]).buffer), Buffer.from('[0]')])),
      'numbers do not fit their shape',
    ],
  ])('%s', (_, bytes, message) => {
    expect(() => unpackJson(bytes)).toThrow(message);
  });
});
