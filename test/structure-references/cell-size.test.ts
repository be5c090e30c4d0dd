import { describe, expect, it } from 'vitest';
import { HALVED_CASES, HALVED_TOLERANCE_DB, halvedComparisons } from '../../app/validate/structure-convergence.ts';

describe('cells halved', () => {
  it.each(HALVED_CASES)('$id changes by less than 0.5 dB', (testCase) => {
    const compared = halvedComparisons(testCase);
    expect(compared.length).toBeGreaterThanOrEqual(testCase.frequenciesHz.length * (1 + testCase.cables.length));
    for (const { frequencyHz, quantity, differenceDb } of compared) {
      const what = `${quantity} at ${frequencyHz / 1e6} MHz: ${differenceDb.toFixed(2)} dB`;
      expect(Math.abs(differenceDb), what).toBeLessThan(HALVED_TOLERANCE_DB);
    }
  });
});
