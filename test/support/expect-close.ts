import { expect } from 'vitest';

/** Fails when |actual − expected| > rel · max(|expected|, floor); `floor` is in the quantity's own unit. */
export function expectClose(
  actual: number,
  expected: number,
  { rel, floor = 0, because }: { rel: number; floor?: number; because: string },
): void {
  const allowed = rel * Math.max(Math.abs(expected), floor);
  expect(allowed, `vacuous tolerance: ${because}`).toBeGreaterThan(0);
  expect(Math.abs(actual - expected), `${actual} vs ${expected}: ${because}`).toBeLessThanOrEqual(allowed);
}
