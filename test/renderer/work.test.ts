import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sameData } from '../../renderer/state/work.ts';

/** Oracle: JSON text with sorted keys. */

function canonical(value: unknown): string {
  return JSON.stringify(value, (_, item: unknown) =>
    typeof item === 'object' && item !== null && !Array.isArray(item)
      ? Object.fromEntries(Object.entries(item).sort(([a], [b]) => (a < b ? -1 : 1)))
      : item,
  );
}

describe('equality of plain data', () => {
  it('agrees with the canonical JSON text', () => {
    // Few different values, so that equal pairs happen.
    const leaf = fc.constantFrom<unknown>(0, 1, 'a', true, null);
    const { tree } = fc.letrec((tie) => ({
      tree: fc.oneof(
        { maxDepth: 3 },
        leaf,
        fc.array(tie('tree'), { maxLength: 2 }),
        fc.dictionary(fc.constantFrom('x', 'y'), tie('tree'), { maxKeys: 2 }),
      ),
    }));
    let equalCount = 0;
    fc.assert(
      fc.property(tree, tree, (a, b) => {
        const isSame = canonical(a) === canonical(b);
        if (isSame) equalCount++;
        return sameData(a, b) === isSame && sameData(a, structuredClone(a));
      }),
      { seed: 5, numRuns: 2000 },
    );
    expect(equalCount).toBeGreaterThan(100);
  });

  it('takes an absent key for one that is undefined', () => {
    expect(sameData({ a: 1, b: undefined }, { a: 1 })).toBe(true);
    expect(sameData({ a: 1, b: null }, { a: 1 })).toBe(false);
  });
});
