import type { FieldTerms } from '../fields/element-field.ts';
import { ElementCollector } from '../fields/element-set.ts';
import { scanMaxima } from '../site/scan.ts';
import { ETA0_OHM, SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import { hzToMhz, mhzToHz, peakFieldToDbuvPerM } from '../units/convert.ts';
import { type Check, check } from './check.ts';
import { NSA_GEOMETRIES, NSA_TABLE } from './nsa-table.ts';

/** 50 Ω voltage and antenna-factor chain: 20·log10(279.1). */
const ANTENNA_FACTOR_CHAIN_DB = 48.92;
/** The table is rounded to 0.1 dB and recalled; the formula behind it reproduces it within 0.11 dB. */
const TABLE_TOLERANCE_DB = 0.15;

type Geometry = (typeof NSA_GEOMETRIES)[number];

/**
 * Site attenuation A_N = −20·log10(f/MHz) + 48.92 − E_max(dBµV/m), with E_max found by this program's own element field
 * and site scan for one dipole whose far field is that of a half-wave dipole radiating 1 pW: E·d = √(49.2 · 1 pW) rms.
 * `terms: 'far'` is what the published table assumes; 'all' is the truth near the source.
 */
export function siteAttenuationDb(frequencyHz: number, geometry: Geometry, terms: FieldTerms): number {
  const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
  const momentAm = (Math.SQRT2 * Math.sqrt(49.2e-12) * 4 * Math.PI) / (kPerM * ETA0_OHM);
  const collector = new ElementCollector();
  collector.add([0, 0, geometry.sourceHeightM], geometry.component === 'horizontal' ? [1, 0, 0] : [0, 0, 1]);
  const maxima = scanMaxima([[{ elements: collector.finish(), currentsA: Float64Array.of(momentAm, 0) }]], {
    kPerM,
    scanRadiusM: geometry.distanceM,
    site: 'ground-plane',
    box: null,
    terms,
  });
  const levelDbuvPerM = peakFieldToDbuvPerM(Math.sqrt(maxima[geometry.component].power));
  return -20 * Math.log10(hzToMhz(frequencyHz)) + ANTENNA_FACTOR_CHAIN_DB - levelDbuvPerM;
}

/** All 216 entries of the table, each a row. */
export function siteAttenuationChecks(): Check[] {
  return NSA_TABLE.flatMap(([frequencyMhz, ...expected]) =>
    NSA_GEOMETRIES.map((geometry, i) =>
      check({
        id: `nsa-${geometry.component[0]}-${geometry.distanceM}m-h1-${geometry.sourceHeightM}m-${frequencyMhz}mhz`,
        source: 'CISPR 16-1-4, theoretical normalised site attenuation, broadband antennas',
        sourceStatus: 'from memory',
        quantity: `NSA ${geometry.component} ${geometry.distanceM} m, source at ${geometry.sourceHeightM} m, ${frequencyMhz} MHz`,
        unit: 'dB',
        expected: expected[i]!,
        computed: siteAttenuationDb(mhzToHz(frequencyMhz), geometry, 'far'),
        tolerance: TABLE_TOLERANCE_DB,
      }),
    ),
  );
}
