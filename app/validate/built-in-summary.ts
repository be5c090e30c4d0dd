import type { ValidationGroup } from '../report/validation-summary.ts';

/** How the rows of `quietboard validate` come out with this version; a test computes them anew and compares. */
export const BUILT_IN_CHECKS: readonly ValidationGroup[] = [
  {
    topic: 'Normalised site attenuation',
    statuses: ['from memory'],
    pass: 216,
    fail: 0,
    info: 0,
  },
  {
    topic: 'Handbook formulas and examples of radiation',
    statuses: ['from memory', 'seen', 'derived'],
    pass: 18,
    fail: 0,
    info: 0,
  },
  {
    topic: 'Spectra of waveforms',
    statuses: ['from memory', 'seen', 'derived'],
    pass: 7,
    fail: 0,
    info: 0,
  },
  {
    topic: 'Transmission lines: impedance, delay, losses',
    statuses: ['derived', 'from memory', 'common practice', 'reference solver'],
    pass: 25,
    fail: 0,
    info: 3,
  },
  {
    topic: 'Skin effect in copper',
    statuses: ['derived'],
    pass: 6,
    fail: 0,
    info: 0,
  },
  {
    topic: 'General field solver: thin wires over ground',
    statuses: ['reference solver'],
    pass: 72,
    fail: 0,
    info: 0,
  },
  {
    topic: 'General field solver and closed forms: boards with planes and cables',
    statuses: ['reference solver', 'from memory', 'derived'],
    pass: 72,
    fail: 0,
    info: 2,
  },
  {
    topic: 'Limit lines',
    statuses: ['seen', 'derived'],
    pass: 32,
    fail: 0,
    info: 0,
  },
  {
    topic: 'Upper frequency of the judged range',
    statuses: ['seen', 'from memory'],
    pass: 9,
    fail: 0,
    info: 0,
  },
];
