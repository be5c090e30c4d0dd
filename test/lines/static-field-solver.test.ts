import { describe, it } from 'vitest';
import { thinStriplineOhm } from '../../app/lines/stripline.ts';
import { EPSILON0_F_PER_M, ETA0_OHM, SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { expectClose } from '../support/expect-close.ts';
import { chargesPerLength } from '../support/static-field-solver.ts';

/** The oracle itself against exact solutions. */

const circle = (radius: number, x: number, y: number, sides: number) =>
  Array.from({ length: sides }, (_, i): [number, number] => {
    const angle = (2 * Math.PI * i) / sides;
    return [x + radius * Math.cos(angle), y + radius * Math.sin(angle)];
  });

/** Inside the 24-gon: measured along the normal of the side in whose sector the point lies. */
const isInPolygon = (radius: number, x: number, y: number): boolean => {
  const sector = (2 * Math.PI) / 24;
  const angle = Math.atan2(y, x);
  const toNormal = angle - (Math.floor(angle / sector) + 0.5) * sector;
  return Math.hypot(x, y) * Math.cos(toNormal) < radius * Math.cos(sector / 2);
};

describe('2-D field solver of the tests', () => {
  it('gives a round wire over a plane: C = 2πε0 / acosh(h/a)', () => {
    const charge = chargesPerLength({
      conductors: [{ corners: circle(0.3, 0.1, 0.8, 48), voltage: 1 }],
      interfaces: [],
      epsilonAt: () => 1,
      hasGround: true,
      panels: 4,
    })[0]!;
    expectClose(charge, (2 * Math.PI * EPSILON0_F_PER_M) / Math.acosh(0.8 / 0.3), {
      rel: 2e-3,
      because: '48 sides: mean radius (π/48)²/6 = 0.07 % small, C 0.05 %; panels',
    });
  });

  it('gives a coaxial line with two dielectrics in series: 1/C = Σ ln(r₂/r₁)/2πε', () => {
    const [inner, middle, outer] = [0.5, 0.8, 1.4];
    const shield = circle(outer, 0, 0, 24);
    const charge = chargesPerLength({
      conductors: [
        { corners: circle(inner, 0, 0, 24), voltage: 1 },
        { corners: [...shield, shield[0]!], voltage: 0, isSheet: true },
      ],
      interfaces: [[...circle(middle, 0, 0, 24), [middle, 0]]],
      epsilonAt: (x, y) => (isInPolygon(middle, x, y) ? 6 : 2),
      hasGround: false,
      panels: 8,
    })[0]!;
    const series = Math.log(middle / inner) / 6 + Math.log(outer / middle) / 2;
    expectClose(charge, (2 * Math.PI * EPSILON0_F_PER_M) / series, {
      rel: 6e-3,
      because: '24 sides: up to (π/24)²/3 = 0.6 % in a radius',
    });
  });

  it('gives a thin strip between planes: exact by conformal mapping (Cohn)', () => {
    const [w, b] = [0.7, 1];
    const plane = [6, w / 2 + 1, w / 2, -w / 2, -w / 2 - 1, -6].map((x): [number, number] => [x, b]);
    const charge = chargesPerLength({
      conductors: [
        {
          corners: [
            [-w / 2, b / 2],
            [w / 2, b / 2],
          ],
          voltage: 1,
          isSheet: true,
        },
        { corners: plane, voltage: 0, isSheet: true },
      ],
      interfaces: [],
      epsilonAt: () => 1,
      hasGround: true,
      panels: 64,
    })[0]!;
    expectClose(1 / (SPEED_OF_LIGHT_M_PER_S * charge), thinStriplineOhm(w, b), { rel: 1e-3, because: '64 panels' });
    // The same value from the book: W. Hilberg's approximation of K/K′, accurate to 3 ppm (from memory), not by the AGM.
    const k = Math.tanh((Math.PI * w) / (2 * b));
    const root = Math.sqrt(k);
    const ratio = Math.log((2 * (1 + root)) / (1 - root)) / Math.PI; // K(k)/K(k′), k > 0.707
    expectClose(thinStriplineOhm(w, b), ETA0_OHM / 4 / ratio, { rel: 1e-5, because: 'approximation good to 3 ppm' });
  });
});
