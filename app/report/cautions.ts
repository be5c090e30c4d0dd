/** Said with every estimate. Nothing here depends on the result: a good number must not make the words go away. */
export const CAUTIONS: readonly string[] = [
  'This level is calculated. It is an estimate, not a measurement, and shows nothing about compliance with any standard or law.',
  'Compliance is decided by testing the real product, built and cabled as it will be, by the method of the standard, as a rule at an accredited laboratory. The edition in force counts, with its amendments and national deviations; where this report differs from the text of the standard, the standard is right.',
  'The model works with ideal ground, simplified sources and currents that follow from what was entered. A real board departs from that: errors of 10 dB and more are normal, and resonances of cables, enclosure and power planes can be missed altogether.',
  'Common-mode current on cables is usually what decides. It depends on imbalance, ground bounce and the bonding of connectors, which no layout file holds. A low level here is no comfort where a cable or connector was left out.',
  'Even an accredited test carries about ±5 to 6 dB of instrumentation uncertainty, and the spread from the way cables lie comes on top. Plan a margin to the line.',
  'Moving a limit between 3 m and 10 m by 10 dB or 10.46 dB is a convention. Over a ground plane the field does not fall by that amount.',
  'Limits differ by product type, class, country and edition. Choosing the right one is up to the user; the program cannot know it.',
  'Limit values whose status is "from memory" were recalled, not read: compare them with the bought standard before a release depends on them.',
];

/** The same for a terminal, where eight sentences would drown the table. */
export const CAUTIONS_SHORT =
  'An estimate, not a measurement: errors of 10 dB and more are normal, cables usually decide, and even an accredited test has ±5 to 6 dB. Limits must be chosen by the user; those from memory must be checked.';

/** Who decides. */
export const DEFERENCE =
  'Compliance is decided by the text of the standard in force and a test of the real product, as a rule at an accredited laboratory.';
