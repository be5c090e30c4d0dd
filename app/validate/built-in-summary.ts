import type { ValidationGroup } from '../report/validation-summary.ts';

/** How the rows of `quietboard validate` come out with this version; a test computes them anew and compares. */
export const BUILT_IN_CHECKS: readonly ValidationGroup[] = [];
