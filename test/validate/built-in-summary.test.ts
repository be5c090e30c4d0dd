import { expect, test } from 'vitest';
import { summarizeChecks } from '../../app/report/validation-summary.ts';
import { allChecks } from '../../app/validate/all-checks.ts';
import { BUILT_IN_CHECKS } from '../../app/validate/built-in-summary.ts';

/** Reports print the table's outcome without running it for ten seconds: it must be what running it gives. */
test('the summary of the checks that reports print is that of the checks', () => {
  expect(BUILT_IN_CHECKS).toEqual(summarizeChecks(allChecks(), '').groups);
});
