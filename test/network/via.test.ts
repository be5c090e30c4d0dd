import { describe, expect, it } from 'vitest';
import { viaInductanceH } from '../../app/network/via.ts';
import { expectClose } from '../support/expect-close.ts';

describe('via barrel', () => {
  it('1.6 mm, drill 0.3 mm: 0.543 nH (Goldfarb–Pucel by hand)', () => {
    // 0.2 nH/mm · {1.6 ln[(1.6 + 1.60702)/0.15] + 1.5 (0.15 − 1.60702)} = 0.2 · (4.8999 − 2.1855)
    expectClose(viaInductanceH(1.6e-3, 0.3e-3), 0.5429e-9, { rel: 1e-3, because: 'four digits by hand' });
  });

  it('is 2 to 5 times below the rule 0.2 nH/mm · l · [ln(4l/d) + 1] (common practice)', () => {
    for (const [l, d] of [
      [1.6, 0.3],
      [0.8, 0.25],
      [0.4, 0.3],
    ] as const) {
      const rule = 0.2e-9 * l * (Math.log((4 * l) / d) + 1);
      const found = viaInductanceH(l * 1e-3, d * 1e-3);
      expect(found).toBeLessThan(rule / 2);
      expect(found).toBeGreaterThan(rule / 5);
    }
  });

  it('scales with size, rises with length, falls with the drill, is 0 without length', () => {
    expectClose(viaInductanceH(3.2e-3, 0.6e-3), 2 * viaInductanceH(1.6e-3, 0.3e-3), {
      rel: 1e-12,
      because: 'one scale',
    });
    expect(viaInductanceH(1.7e-3, 0.3e-3)).toBeGreaterThan(viaInductanceH(1.6e-3, 0.3e-3));
    expect(viaInductanceH(1.6e-3, 0.4e-3)).toBeLessThan(viaInductanceH(1.6e-3, 0.3e-3));
    expect(viaInductanceH(0, 0.3e-3)).toBe(0);
    expect(viaInductanceH(1e-6, 3e-3)).toBeGreaterThan(0);
  });

  it('refuses impossible dimensions', () => {
    expect(() => viaInductanceH(-1, 0.3e-3)).toThrow('lengthM');
    expect(() => viaInductanceH(1e-3, 0)).toThrow('drillM');
  });
});
