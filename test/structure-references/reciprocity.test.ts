import { describe, expect, it } from 'vitest';
import { STRUCTURE_CASES } from '../../app/validate/structure-cases.ts';
import { farLoopReaction } from '../../app/validate/structure-reciprocity.ts';
import { expectClose } from '../support/expect-close.ts';

describe('reciprocity between structure and antenna', () => {
  it.each([
    ['plane-80x50-220ohm', 200e6],
    ['cable-grounded', 200e6],
    ['cable-bend', 150e6],
  ])(
    '%s at %s Hz: the e.m.f. its currents make in a far loop is what the loop’s field makes of them',
    (id, frequencyHz) => {
      const testCase = { ...STRUCTURE_CASES.find((one) => one.id === id)!, frequenciesHz: [frequencyHz] };
      const { byField, byReaction } = farLoopReaction(testCase);
      const because = 'the sides’ middles stand for the sides: (k·20 mm)²/24 and (20 mm/3 m)² at most 0.03 %';
      const size = Math.hypot(...byField);
      expect(size).toBeGreaterThan(0);
      expectClose(byReaction[0], byField[0], { rel: 0.003, floor: size, because });
      expectClose(byReaction[1], byField[1], { rel: 0.003, floor: size, because });
    },
  );
});
