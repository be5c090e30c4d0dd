import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../app/fields/quadrature.ts';
import {
  type Filament,
  meanInverseOfFilaments,
  meanInverseOfSquareAndFilament,
  meanInverseToFilament,
} from '../../app/structure/filament-kernel.ts';
import { retardedIm, retardedRe } from '../../app/structure/retarded.ts';
import { meanInverseOfSquares, meanInverseToSquare } from '../../app/structure/square-kernel.ts';
import { expectClose } from '../support/expect-close.ts';

const RULE = gaussLegendre(12);

/** Mean over the unit interval, by Gauss–Legendre on `parts` equal parts. */
function meanOver(parts: number, f: (t: number) => number): number {
  let sum = 0;
  for (let p = 0; p < parts; p++) {
    for (const [i, node] of RULE.nodes.entries()) sum += (RULE.weights[i]! / parts) * f((p + node) / parts);
  }
  return sum;
}

const meanOverSquare = (a: number, parts: number, f: (x: number, y: number) => number): number =>
  meanOver(parts, (s) => meanOver(parts, (t) => f((s - 0.5) * a, (t - 0.5) * a)));

describe('squares', () => {
  it('a square with itself: 4[ln(1 + √2) − (√2 − 1)/3]/a', () => {
    // Mean inverse distance of a unit square, known in closed form (R. F. Harrington, Field Computation by Moment Methods,
    // section 2.4, from memory; the same integral).
    const a = 0.0043;
    const expected = (4 * (Math.log(1 + Math.SQRT2) - (Math.SQRT2 - 1) / 3)) / a;
    expectClose(meanInverseOfSquares(0, 0, 0, a), expected, { rel: 1e-11, because: 'closed form' });
  });

  it.each([
    [1, 0, 0],
    [1, 1, 0],
    [-2, 1, 0],
    [0.3, 0.4, 0.6],
    [3, -2, 1.5],
    [0, 0, 0.37],
    [11.9, 2, 0],
    [12.1, 3, 0],
    [0, 9, 320],
  ])('two squares (%f, %f, %f) sides apart: the mean of the point-to-square form', (dx, dy, dz) => {
    const a = 0.0061;
    const mean = meanOverSquare(a, 3, (x, y) => meanInverseToSquare(x + dx * a, y + dy * a, dz * a, a));
    // The point form has logarithmic kinks where the squares touch; 36 points a side leave 1e-4 there.
    expectClose(meanInverseOfSquares(dx * a, dy * a, dz * a, a), mean, { rel: 2e-4, because: 'quadrature over kinks' });
  });

  it('a point near a square: the plain double integral', () => {
    const a = 0.005;
    for (const [x, y, z] of [
      [0.001, 0.002, 0.003],
      [0.006, -0.004, 0.0005],
      [0, 0.02, 0],
    ] as const) {
      const mean = meanOverSquare(a, 8, (u, v) => 1 / Math.hypot(x - u, y - v, z));
      expectClose(meanInverseToSquare(x, y, z, a), mean, {
        rel: 1e-4,
        because: '96 points a side, z at least a tenth of a',
      });
    }
  });
});

const along = ({ from, to }: Filament, t: number) =>
  [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1]), from[2] + t * (to[2] - from[2])] as const;

describe('filaments', () => {
  const piece: Filament = { from: [0.001, 0.002, 0.003], to: [0.021, -0.003, 0.008] };

  it('a point: the plain integral', () => {
    const mean = meanOver(20, (t) => {
      const [x, y, z] = along(piece, t);
      return 1 / Math.sqrt((x - 0.01) ** 2 + (y - 0.004) ** 2 + (z - 0.001) ** 2 + 1e-6);
    });
    expectClose(meanInverseToFilament(0.01, 0.004, 0.001, piece, 1e-6), mean, {
      rel: 1e-9,
      because: 'smooth integrand',
    });
  });

  it('one piece with itself: 2/l · [asinh(l/a) − √(1 + (a/l)²) + a/l]', () => {
    // Self inductance of a thin wire, F. W. Grover, Inductance Calculations, chapter 5 (filament and its parallel at the radius).
    const straight: Filament = { from: [0.1, 0.2, 0.3], to: [0.1, 0.2, 0.32] };
    const [l, a] = [0.02, 0.0015];
    const expected = (2 / l) * (Math.asinh(l / a) - Math.sqrt(1 + (a / l) ** 2) + a / l);
    expectClose(meanInverseOfFilaments(straight, straight, a * a), expected, { rel: 1e-12, because: 'closed form' });
  });

  it.each<[string, Filament, Filament]>([
    ['in line', { from: [0, 0, 0], to: [0.01, 0, 0] }, { from: [0.01, 0, 0], to: [0.03, 0, 0] }],
    [
      'side by side, opposite',
      { from: [0, 0, 0], to: [0.01, 0, 0] },
      { from: [0.02, 0.004, 0.001], to: [-0.005, 0.004, 0.001] },
    ],
    ['at a corner', { from: [0, 0, 0], to: [0.02, 0, 0] }, { from: [0.02, 0, 0], to: [0.02, 0, -0.02] }],
    ['skew', piece, { from: [0, 0.01, 0], to: [0.004, 0.05, 0.03] }],
  ])('%s: the plain double integral', (_, one, other) => {
    const radius2 = 1e-6;
    const mean = meanOver(40, (t) => {
      const [x, y, z] = along(other, t);
      return meanInverseToFilament(x, y, z, one, radius2);
    });
    expectClose(meanInverseOfFilaments(one, other, radius2), mean, {
      rel: 2e-3,
      because: 'eight points over a corner',
    });
    // Only corners are integrated numerically; what is in closed form holds to rounding.
    if (_ !== 'at a corner' && _ !== 'skew') {
      expectClose(meanInverseOfFilaments(one, other, radius2), mean, { rel: 1e-6, because: 'closed form' });
    }
    expectClose(meanInverseOfFilaments(other, one, radius2), mean, { rel: 2e-3, because: 'symmetric' });
  });

  it.each<[string, Filament]>([
    ['over it', { from: [-0.004, 0.001, 0.002], to: [0.006, 0.002, 0.002] }],
    ['leaving its edge', { from: [0.0025, 0, 0], to: [0.0225, 0, 0] }],
    ['standing on it', { from: [0.001, 0.001, 0], to: [0.001, 0.001, -0.02] }],
    ['far away', { from: [0.1, 0.3, -0.2], to: [0.1, 0.3, -0.24] }],
  ])('a square and a piece %s: the plain integral', (_, one) => {
    const a = 0.005;
    const radius2 = 1e-6;
    const mean = meanOver(60, (t) => {
      const [x, y, z] = along(one, t);
      return meanInverseToSquare(x - 0.0002, y - 0.0001, Math.hypot(z - 0.0003, 1e-3), a);
    });
    const actual = meanInverseOfSquareAndFilament([0.0002, 0.0001, 0.0003], a, one, radius2);
    expectClose(actual, mean, { rel: 1e-3, because: 'eight points per three quarters of a cell over kinks' });
  });
});

describe('retarded part', () => {
  it('is (e^(−jkR) − 1)/R, −jk at R = 0 and without cancellation near it', () => {
    for (const [k, r] of [
      [0.6, 3],
      [20.9, 0.4],
    ] as const) {
      expectClose(retardedRe(k, r), (Math.cos(k * r) - 1) / r, { rel: 1e-12, because: 'definition' });
      expectClose(retardedIm(k, r), -Math.sin(k * r) / r, { rel: 1e-12, because: 'definition' });
    }
    expect(retardedIm(0.63, 0)).toBe(-0.63);
    expect(retardedRe(0.63, 0)).toBe(0);
    // Series −k²R/2: the plain difference would have lost six digits here.
    expectClose(retardedRe(0.63, 1e-5), (-0.63 * 0.63 * 1e-5) / 2, { rel: 1e-9, because: 'next term (kR)²/12' });
  });
});
