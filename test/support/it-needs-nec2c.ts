import { it } from 'vitest';
import { hasNec2c } from './nec2c.ts';

const isCi = !['', 'false', undefined].includes(process.env.CI);
const isLeftOut = !isCi && !hasNec2c();
if (isLeftOut) console.warn('nec2c is not installed: tests against it are left out here (in CI they fail)');

/** A test that needs the solver: always runs in CI (and fails there without the solver), elsewhere only where it exists. */
export const itNeedsNec2c = it.skipIf(isLeftOut);
