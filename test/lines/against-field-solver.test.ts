import { describe, expect, it } from 'vitest';
import type { CrossSection } from '../../app/lines/cross-section.ts';
import { edgeCoupledPair } from '../../app/lines/edge-coupled-pair.ts';
import { lineOf } from '../../app/lines/line.ts';
import { expectClose } from '../support/expect-close.ts';
import { type CoverShape, solveLine, solvePair } from '../support/line-field-solution.ts';

/** Second way: the closed forms against the 2-D field solver (itself within 0.2 % here: 64 against 96 panels). */
const PANELS = 64;

interface Case {
  readonly section: CrossSection;
  readonly z0Part: number;
  readonly epsilonPart: number;
  readonly shape?: CoverShape;
}

const against = (section: CrossSection, z0Part: number, epsilonPart: number, shape?: CoverShape): Case => ({
  section,
  z0Part,
  epsilonPart,
  ...(shape && { shape }),
});

const microstrip = (w: number, t: number, epsilonR: number, d = 0, coverEpsilon = 1): CrossSection => ({
  kind: 'microstrip',
  widthM: w,
  thicknessM: t,
  heightM: 1,
  epsilonR,
  tanDelta: 0,
  ...(d > 0 && { cover: { thicknessM: d, epsilonR: coverEpsilon, tanDelta: 0 } }),
});
const stripline = (w: number, t: number, heightBelowM: number, heightAboveM: number): CrossSection => ({
  kind: 'stripline',
  widthM: w,
  thicknessM: t,
  heightAboveM,
  heightBelowM,
  epsilonR: 3.7,
  tanDelta: 0,
});
const coplanar = (w: number, t: number, centreDistanceM: number, substrateM: number): CrossSection => ({
  kind: 'coplanar-strips',
  widthM: w,
  thicknessM: t,
  centreDistanceM,
  substrateM,
  epsilonR: 4.3,
  tanDelta: 0,
});

const rows: Record<string, readonly Case[]> = {
  'surface microstrip': [
    against(microstrip(1, 0.1, 4.3), 0.005, 0.008),
    against(microstrip(0.5, 0.2, 4.3), 0.005, 0.008),
    against(microstrip(1, 0.35, 4.3), 0.005, 0.008),
    against(microstrip(5, 0.2, 4.3), 0.005, 0.008),
    against(microstrip(0.3, 0.3, 4.3), 0.005, 0.012),
    against(microstrip(1.4, 0.06, 10), 0.005, 0.008),
  ],
  'covered microstrip, cover following the trace': [
    against(microstrip(1, 0.1, 4.3, 0.2, 3.5), 0.008, 0.015),
    against(microstrip(2, 0.2, 4.3, 0.12, 3.5), 0.008, 0.016),
    against(microstrip(0.5, 0.2, 4.3, 0.1, 3.5), 0.008, 0.015),
    against(microstrip(1, 0.2, 3, 1, 4.3), 0.008, 0.015),
  ],
  'embedded microstrip, level above': [
    against(microstrip(1, 0.02, 4.3, 0.4, 4.3), 0.005, 0.008, 'level'),
    against(microstrip(1, 0.2, 4.3, 1, 4.3), 0.005, 0.008, 'level'),
    against(microstrip(1, 0.1, 4.3, 0.2, 3.5), 0.015, 0.03, 'level'),
  ],
  'centred stripline': [
    against(stripline(0.5, 0.1, 0.45, 0.45), 0.002, 0.001),
    against(stripline(0.25, 0.01, 0.5, 0.5), 0.002, 0.001),
    against(stripline(1.5, 0.2, 0.4, 0.4), 0.002, 0.001),
  ],
  'off-centre stripline': [
    against(stripline(0.5, 0.1, 0.3, 0.7), 0.013, 0.001),
    against(stripline(0.5, 0.01, 0.8, 0.2), 0.013, 0.001),
    against(stripline(0.15, 0.1, 0.2, 0.8), 0.013, 0.001),
    against(stripline(2, 0.1, 0.2, 0.8), 0.013, 0.001),
    against(stripline(0.1, 0.02, 0.02, 0.98), 0.027, 0.001),
  ],
  'coplanar strips': [
    against(coplanar(1, 0.01, 2, 5), 0.012, 0.015),
    against(coplanar(0.2, 0.035, 2, 1.6), 0.012, 0.015),
    against(coplanar(0.2, 0.035, 10, 1.6), 0.012, 0.015),
    against(coplanar(1, 0.035, 1.5, 1.6), 0.012, 0.015),
    against(coplanar(0.1, 0.035, 0.2, 0.2), 0.012, 0.015),
    against(coplanar(0.2, 0.035, 0.25, 1.6), 0.012, 0.015),
    against(coplanar(1, 0.01, 2, 0.5), 0.017, 0.03),
  ],
};

describe.each(Object.entries(rows))('%s against the field solver', (_, cases) => {
  it.each(cases)('$section', ({ section, z0Part, epsilonPart, shape }) => {
    const line = lineOf(section);
    const solved = solveLine(section, PANELS, shape);
    const because = 'accuracy stated beside the formula, plus 0.2 % of the solver';
    expectClose(line.z0Ohm, solved.z0Ohm, { rel: z0Part, because });
    expectClose(line.epsilonEff, solved.epsilonEff, { rel: epsilonPart, because });
    expect(line.caveats.filter(({ code }) => code !== 'thin-conductor')).toEqual([]);
  });
});

describe('edge-coupled pair against the field solver', () => {
  it.each([
    ['microstrip', 1, 0.005, 1, 0.3, 4.3, 0.006, 0.006],
    ['microstrip', 0.5, 0.005, 1, 0.5, 10, 0.006, 0.006],
    ['microstrip', 1, 0.1, 1, 1, 4.3, 0.02, 0.02],
    ['microstrip', 2, 0.2, 1, 0.3, 4.3, 0.02, 0.02],
    ['microstrip', 0.3, 0.2, 1, 0.5, 4.3, 0.02, 0.035],
    ['stripline', 0.5, 0.05, 0.475, 0.2, 3.7, 0.02, 0.012],
    ['stripline', 0.5, 0.1, 0.45, 0.5, 3.7, 0.02, 0.012],
    ['stripline', 0.5, 0.1, 0.45, 0.1, 3.7, 0.02, 0.012],
  ] as const)(
    '%s w %f, t %f, h %f, gap %f, ε %f',
    (kind, widthM, thicknessM, heightM, gapM, epsilonR, evenPart, oddPart) => {
      const section = { kind, widthM, thicknessM, heightM, gapM, epsilonR };
      const pair = edgeCoupledPair(section);
      const even = solvePair(section, 'even', PANELS);
      const odd = solvePair(section, 'odd', PANELS);
      const because = 'accuracy stated beside the formula';
      expectClose(pair.even.z0Ohm, even.z0Ohm, { rel: evenPart, because });
      expectClose(pair.odd.z0Ohm, odd.z0Ohm, { rel: oddPart, because });
      expectClose(pair.even.epsilonEff, even.epsilonEff, { rel: 0.015, because });
      expectClose(pair.odd.epsilonEff, odd.epsilonEff, { rel: 0.03, because });
    },
  );
});
