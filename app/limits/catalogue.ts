import { CISPR_11_LINES } from './data/cispr-11.ts';
import { CISPR_14_1_LINES } from './data/cispr-14-1.ts';
import { CISPR_32_LINES, VCCI_LINES } from './data/cispr-32.ts';
import { FCC_15_LINES } from './data/fcc-15.ts';
import { GENERIC_LINES } from './data/generic.ts';
import { ICES_003_LINES } from './data/ices-003.ts';
import type { LimitLine } from './limit-line.ts';

/** Every built-in limit line, standard by standard. */
export const allLimitLines: readonly LimitLine[] = [
  ...CISPR_32_LINES,
  ...FCC_15_LINES,
  ...CISPR_11_LINES,
  ...CISPR_14_1_LINES,
  ...GENERIC_LINES,
  ...ICES_003_LINES,
  ...VCCI_LINES,
];
