import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findJsonFault } from '../../app/schema/json-position.ts';

const isJson = (text: string): boolean => {
  try {
    JSON.parse(text);
    return true;
  } catch {
    return false;
  }
};

describe('findJsonFault', () => {
  it('agrees with the engine on what is JSON, for valid texts and texts with one character changed', () => {
    const damaged = fc
      .tuple(
        fc.json(),
        fc.nat(),
        fc.constantFrom('', '"', '\\', ',', ']', '}', ':', '0', '-', '.', 'e', ' ', '\n', 'x'),
      )
      .map(([text, at, put]) => {
        const place = at % (text.length + 1);
        return text.slice(0, place) + put + text.slice(place + 1);
      });
    fc.assert(
      fc.property(fc.oneof(fc.json(), damaged), (text) => {
        expect(findJsonFault(text) === null).toBe(isJson(text));
      }),
      { seed: 20260, numRuns: 4000 },
    );
  });

  it.each([
    ['{"a": 1,\n "b": tru}', 2, 7, 'a value'],
    ['{"a": 1,\n "b": 2,}', 2, 9, 'a key in double quotes'],
    ['[1, 2\n\n3]', 3, 1, '"," or "]"'],
    ['{"a" 1}', 1, 6, '":" after the key'],
    ['{} x', 1, 4, 'the end of the file'],
    ['', 1, 1, 'a value'],
    ['["a\nb"]', 1, 4, 'a text that ends with a double quote and has no raw line breaks or unknown escapes'],
  ])('finds the place in %j', (text, line, column, expected) => {
    expect(findJsonFault(text)).toEqual({ line, column, expected });
  });

  it('is not stopped by deep nesting', () => {
    expect(findJsonFault(`${'['.repeat(200_000)}x`)).toEqual({ line: 1, column: 200_001, expected: 'a value' });
  });
});
