/**
 * Theoretical normalised site attenuation for broadband antennas, receive scan 1–4 m, dB.
 * Source: CISPR 16-1-4 (also CISPR 22 annex A, ANSI C63.4), from A. A. Smith, R. F. German, J. B. Pate, IEEE Trans.
 * EMC-24(3), 1982. Values from memory.
 */
export const NSA_GEOMETRIES = [
  { component: 'horizontal', distanceM: 3, sourceHeightM: 1 },
  { component: 'horizontal', distanceM: 3, sourceHeightM: 2 },
  { component: 'horizontal', distanceM: 10, sourceHeightM: 1 },
  { component: 'horizontal', distanceM: 10, sourceHeightM: 2 },
  { component: 'vertical', distanceM: 3, sourceHeightM: 1 },
  { component: 'vertical', distanceM: 3, sourceHeightM: 1.5 },
  { component: 'vertical', distanceM: 10, sourceHeightM: 1 },
  { component: 'vertical', distanceM: 10, sourceHeightM: 1.5 },
] as const;

/** MHz, then one value for each of NSA_GEOMETRIES. */
export const NSA_TABLE: readonly (readonly [frequencyMhz: number, ...attenuationDb: number[]])[] = [
  [30, 15.8, 11.0, 29.8, 24.1, 8.2, 9.3, 16.7, 16.9],
  [35, 13.4, 8.8, 27.1, 21.6, 6.9, 8.0, 15.4, 15.6],
  [40, 11.3, 7.0, 24.9, 19.4, 5.8, 7.0, 14.2, 14.4],
  [45, 9.4, 5.5, 22.9, 17.5, 4.9, 6.1, 13.2, 13.4],
  [50, 7.8, 4.2, 21.1, 15.9, 4.0, 5.4, 12.3, 12.5],
  [60, 5.0, 2.2, 18.0, 13.1, 2.6, 4.1, 10.7, 11.0],
  [70, 2.8, 0.6, 15.5, 10.9, 1.5, 3.2, 9.4, 9.7],
  [80, 0.9, -0.7, 13.3, 9.2, 0.6, 2.6, 8.3, 8.6],
  [90, -0.7, -1.8, 11.4, 7.8, -0.1, 2.1, 7.3, 7.6],
  [100, -2.0, -2.8, 9.7, 6.7, -0.7, 1.9, 6.4, 6.8],
  [120, -4.2, -4.4, 7.0, 5.0, -1.5, 1.3, 4.9, 5.4],
  [125, -4.7, -4.7, 6.4, 4.6, -1.6, 0.5, 4.6, 5.1],
  [140, -6.0, -5.8, 4.8, 3.5, -1.8, -1.5, 3.7, 4.3],
  [150, -6.7, -6.3, 3.9, 2.9, -1.8, -2.6, 3.1, 3.8],
  [160, -7.4, -6.7, 3.1, 2.3, -1.7, -3.7, 2.6, 3.4],
  [175, -8.3, -6.9, 2.0, 1.5, -1.4, -4.9, 2.0, 2.9],
  [180, -8.6, -7.2, 1.7, 1.2, -1.3, -5.3, 1.8, 2.7],
  [200, -9.6, -8.4, 0.6, 0.3, -3.6, -6.7, 1.0, 2.1],
  [250, -11.7, -10.6, -1.6, -1.7, -7.7, -9.1, -0.5, 0.3],
  [300, -12.8, -12.3, -3.3, -3.3, -10.5, -10.9, -1.5, -1.9],
  [400, -14.8, -14.9, -5.9, -5.8, -14.0, -12.6, -4.1, -5.0],
  [500, -17.3, -16.7, -7.9, -7.6, -16.4, -15.1, -6.7, -7.2],
  [600, -19.1, -18.3, -9.5, -9.3, -16.3, -16.9, -8.7, -9.0],
  [700, -20.6, -19.7, -10.8, -10.6, -18.4, -18.4, -10.2, -10.4],
  [800, -21.3, -20.8, -12.0, -11.8, -20.0, -19.3, -11.5, -11.6],
  [900, -22.5, -21.8, -12.8, -12.9, -21.3, -20.4, -12.6, -12.7],
  [1000, -23.5, -22.7, -13.8, -13.8, -22.4, -21.4, -13.6, -13.6],
];
