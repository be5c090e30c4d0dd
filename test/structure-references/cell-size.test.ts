import { describe, expect, it } from 'vitest';
import { STRUCTURE_CASES, type StructureCase } from '../../app/validate/structure-cases.ts';
import { compareStructure } from '../../app/validate/structure-compare.ts';
import { estimateStructure } from '../../app/validate/structure-estimate.ts';

const caseOf = (id: string): StructureCase => STRUCTURE_CASES.find((testCase) => testCase.id === id)!;
const SMALL = caseOf('plane-60x40');
/** The small plane with a cable as another case has it: halved cells stay quick to solve. */
const withCable = (id: string, frequenciesHz: readonly number[]): StructureCase => ({
  ...SMALL,
  id: `${SMALL.id} with ${id}`,
  orientation: caseOf(id).orientation,
  cables: caseOf(id).cables.map((cable) => ({
    ...cable,
    pointsM: cable.pointsM.map(([x, y, z]) => [x - 0.04, Math.abs(y - 0.03) < 1e-9 ? 0.0225 : y, z] as const),
  })),
  frequenciesHz,
});

/** No caveat of an opening under the trace applies to these. */
const CASES: readonly StructureCase[] = [
  { ...SMALL, frequenciesHz: [30e6, 400e6, 1000e6] },
  { ...caseOf('plane-80x50-220ohm'), frequenciesHz: [200e6, 1000e6] },
  withCable('cable-open', [30e6, 400e6]),
  withCable('cable-upright-grounded', [200e6]),
];

describe('cells halved', () => {
  it.each(CASES)('$id changes by less than 0.5 dB', (testCase) => {
    const compared = compareStructure(testCase, estimateStructure(testCase, 2.5e-3), estimateStructure(testCase, 5e-3));
    expect(compared.length).toBeGreaterThanOrEqual(testCase.frequenciesHz.length * (1 + testCase.cables.length));
    for (const { frequencyHz, quantity, differenceDb } of compared) {
      const what = `${quantity} at ${frequencyHz / 1e6} MHz: ${differenceDb.toFixed(2)} dB`;
      expect(Math.abs(differenceDb), what).toBeLessThan(0.5);
    }
  });
});
