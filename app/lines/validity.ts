import type { Caveat } from '../errors.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../units/constants.ts';
import type { CrossSection, Line } from './cross-section.ts';

/** The cross-section counts as small below this part of the wavelength on the line. */
const SMALL_PART_OF_WAVELENGTH = 0.1;

/** Everything of the section that is outside the range in which its formulas were published or checked here. */
export function validityCaveats(section: CrossSection): Caveat[] {
  return outsideRange(section).map((message) => ({
    code: 'line-outside-validity',
    message,
    where: '',
    fromHz: 0,
    toHz: 0,
  }));
}

function outsideRange(section: CrossSection): string[] {
  const { widthM, thicknessM, epsilonR } = section;
  const found: string[] = [];
  const expect = (isWithin: boolean, message: string) => {
    if (!isWithin) found.push(message);
  };
  expect(thicknessM <= 2 * widthM, 'copper more than twice as thick as the trace is wide');
  expect(epsilonR <= 128, 'relative permittivity above 128');
  switch (section.kind) {
    case 'microstrip': {
      const u = widthM / section.heightM;
      expect(u >= 0.01 && u <= 100, 'microstrip with w/h outside 0.01 to 100');
      expect(thicknessM <= section.heightM, 'microstrip copper thicker than the dielectric under it');
      const { cover } = section;
      expect(
        !cover || cover.thicknessM === 0 || cover.epsilonR <= 1.5 * epsilonR,
        'cover with more than 1.5 times the permittivity of the substrate',
      );
      break;
    }
    case 'stripline': {
      const low = Math.min(section.heightAboveM, section.heightBelowM);
      const high = Math.max(section.heightAboveM, section.heightBelowM);
      expect(low >= 0.02 * high, 'stripline with one plane more than 50 times as far as the other');
      expect(thicknessM <= low, 'stripline copper thicker than the dielectric to the nearer plane');
      break;
    }
    case 'coplanar-strips': {
      const gapM = section.centreDistanceM - widthM;
      expect(thicknessM <= 1.5 * gapM, 'coplanar strips with copper thicker than 1.5 times the gap');
      expect(widthM >= 0.002 * section.centreDistanceM, 'coplanar strips more than 500 widths apart');
    }
  }
  return found;
}

/**
 * Frequency above which the section is no longer small against the wavelength on the line: c/(√ε_eff · 10 d), d the
 * largest of the distances over which the field spreads (dielectric heights or centre distance, and the width).
 * Source: common practice (a tenth of the wavelength).
 */
export function quasiTemLimitHz(section: CrossSection, line: Pick<Line, 'epsilonEff'>): number {
  return (SMALL_PART_OF_WAVELENGTH * SPEED_OF_LIGHT_M_PER_S) / (Math.sqrt(line.epsilonEff) * extentM(section));
}

/** The caveat `line-not-tem` for results up to `maxHz`, if any. */
export function lineNotTemCaveat(
  section: CrossSection,
  line: Pick<Line, 'epsilonEff'>,
  maxHz: number,
): Caveat | undefined {
  const fromHz = quasiTemLimitHz(section, line);
  if (fromHz >= maxHz) return undefined;
  const message = 'cross-section larger than a tenth of the wavelength on the line: the line model is an estimate';
  return { code: 'line-not-tem', message, where: '', fromHz, toHz: maxHz };
}

function extentM(section: CrossSection): number {
  switch (section.kind) {
    case 'microstrip':
      return Math.max(section.widthM, section.heightM);
    case 'stripline':
      return Math.max(section.widthM, section.heightAboveM + section.thicknessM + section.heightBelowM);
    case 'coplanar-strips':
      return section.centreDistanceM + section.widthM;
  }
}
