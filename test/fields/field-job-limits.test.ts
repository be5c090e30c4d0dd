import { describe, expect, it } from 'vitest';
import { parseFieldJob } from '../../app/fields/field-job.ts';
import { runFieldJob } from '../../app/fields/run-field-job.ts';
import { appFailure } from '../support/app-failure.ts';

const job = (changes: object) => ({
  format: 'quietboard-field',
  version: 1,
  frequenciesHz: [100e6],
  ground: 'none',
  elements: [{ fromM: [0, 0, 1], toM: [0.01, 0, 1], currentA: [1, 0] }],
  observersM: [[3, 0, 1]],
  ...changes,
});

describe('numbers beyond any field job', () => {
  it.each([
    ['observersM[0][0]', { observersM: [[1e200, 0, 1]] }],
    ['elements[0].toM[1]', { elements: [{ fromM: [0, 0, 1], toM: [0, -1e160, 1], currentA: [1, 0] }] }],
    ['elements[0].currentA[1]', { elements: [{ fromM: [0, 0, 1], toM: [0, 1, 1], currentA: [1, 1e308] }] }],
    ['frequenciesHz[0]', { frequenciesHz: [1e300] }],
    ['frequenciesHz[0]', { frequenciesHz: [1e-300] }],
  ])('%s is refused by name', (path, changes) => {
    expect(appFailure(() => parseFieldJob(job(changes))).message).toContain(`${path} must be a number at`);
  });

  it('at the ends of what is allowed every number of the answer is finite', () => {
    const elements = [
      { fromM: [-1e5, 1e5, 1e5], toM: [-1e5, 1e5, 99999.99], currentA: [1e9, -1e9] },
      { fromM: [1e-3, 0, 0], toM: [1e-3, 0, 1e-6], currentA: [1e-30, 0] },
    ];
    for (const frequenciesHz of [[1], [1e12]]) {
      const { fields } = runFieldJob(
        parseFieldJob(
          job({
            frequenciesHz,
            elements,
            observersM: [
              [1e5, -1e5, -1e5],
              [0, 0, 0],
            ],
          }),
        ),
      );
      for (const { electricVPerM, magneticAPerM } of fields[0]!.observers) {
        for (const part of [...electricVPerM, ...magneticAPerM].flat()) expect(Number.isFinite(part)).toBe(true);
      }
    }
  });
});
