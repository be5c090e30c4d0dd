import { describe, expect, it } from 'vitest';
import { ETA0_OHM, SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { closedLoop, fieldOf, radiatedPowerW, shapedWire, shortWire } from '../../app/validate/radiator.ts';
import {
  along,
  cross,
  distance,
  hertzianDipole,
  imaginary,
  plus,
  size,
  smallLoop,
  times,
  unit,
  type Vector,
  wave,
} from './fields.ts';

const frequencyHz = 137e6;
const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
const Z: Vector = [0, 0, 1];
/** Directions that mix all axes; distances from kr = 0.06 (quasi-static) over 2 to 130 (radiation). */
const directions: readonly Vector[] = [unit([0.3, 0.5, 0.8]), unit([-0.7, 0.2, -0.4]), unit([0.9, -0.4, 0.05])];
const distancesM = [0.02, 0.3, 0.7, 45];

describe('field of short sources against closed forms, near and far', () => {
  it.each(distancesM)('Hertzian dipole at %f m', (rM) => {
    for (const n of directions) {
      const lengthM = 1e-4;
      const { electric, magnetic } = fieldOf([shortWire([0, 0, 0], lengthM, 0.37)], frequencyHz, scale(n, rM));
      const thetaRad = Math.acos(n[2]);
      const phi = unit(cross(Z, n));
      const theta = cross(phi, n);
      const expected = hertzianDipole(0.37 * lengthM, kPerM, rM, thetaRad);
      // A finite length of 1e-4 m against r ≥ 0.02 m: (l/r)² = 2.5e-5.
      expect(distance(along(electric, n), expected.eR)).toBeLessThan(1e-4 * size(expected.eR));
      expect(distance(along(electric, theta), expected.eTheta)).toBeLessThan(1e-4 * size(expected.eTheta));
      expect(distance(along(magnetic, phi), expected.hPhi)).toBeLessThan(1e-4 * size(expected.hPhi));
      // Nothing across: no E_φ, no H_r.
      expect(size(along(electric, phi))).toBeLessThan(1e-9 * size(expected.eTheta));
      expect(size(along(magnetic, n))).toBeLessThan(1e-9 * size(expected.hPhi));
    }
  });

  it.each(distancesM)('small loop at %f m', (rM) => {
    const [a, b] = [4e-4, 7e-4];
    const loop = closedLoop(
      [
        [-a, -b, 0],
        [a, -b, 0],
        [a, b, 0],
        [-a, b, 0],
      ],
      2.3,
    );
    for (const n of directions) {
      const { electric, magnetic } = fieldOf(loop, frequencyHz, scale(n, rM));
      const phi = unit(cross(Z, n));
      const theta = cross(phi, n);
      const expected = smallLoop(2.3, 4 * a * b, kPerM, rM, Math.acos(n[2]));
      // The sides are b/r = 3.5 % of the least distance: squared, 1.2e-3 times a geometry factor below 4.
      const allowed = 5 * (b / rM) ** 2 + 1e-4;
      expect(distance(along(electric, phi), expected.ePhi)).toBeLessThan(allowed * size(expected.ePhi));
      const magneticSize = Math.hypot(size(expected.hR), size(expected.hTheta));
      expect(distance(along(magnetic, n), expected.hR)).toBeLessThan(allowed * magneticSize);
      expect(distance(along(magnetic, theta), expected.hTheta)).toBeLessThan(allowed * magneticSize);
    }
  });

  it('sinusoidal dipole: E_z of its ends and middle, exact at any distance', () => {
    // Balanis, Antenna Theory, 3rd ed., eq. 8-57 (induced-e.m.f. method, from memory):
    // E_z = −j(η0/4π) I_m [ e^(−jkR1)/R1 + e^(−jkR2)/R2 − 2 cos(kl/2) e^(−jkr)/r ].
    const lengthM = 1.3; // 0.6 λ
    const dipole = shapedWire(lengthM, 400, (zM) => Math.sin(kPerM * (lengthM / 2 - Math.abs(zM))));
    for (const observerM of [
      [0.04, 0.03, 0.2],
      [0.5, -0.2, 0.8],
      [7, 3, -2],
    ] as const) {
      const { electric } = fieldOf(dipole, frequencyHz, observerM);
      const distanceTo = (zM: number) => Math.hypot(observerM[0], observerM[1], observerM[2] - zM);
      const [r1, r2, r] = [distanceTo(lengthM / 2), distanceTo(-lengthM / 2), distanceTo(0)];
      const bracket = plus(
        wave(kPerM * r1, r1),
        wave(kPerM * r2, r2),
        times(wave(kPerM * r, r), { re: -2 * Math.cos((kPerM * lengthM) / 2), im: 0 }),
      );
      const expected = times(imaginary(-ETA0_OHM / (4 * Math.PI)), bracket);
      // 400 chords for the sine: (kl/400)²/8 = 1e-5, times the cancellation of the near charges (below 50).
      expect(distance(along(electric, Z), expected)).toBeLessThan(5e-4 * size(expected));
    }
  });

  it('radiation resistances of a loop and a dipole that are small: 320π⁴(A/λ²)² and 80π²(l/λ)²', () => {
    const wavelengthM = SPEED_OF_LIGHT_M_PER_S / frequencyHz;
    const [a, b] = [0.004 * wavelengthM, 0.0025 * wavelengthM];
    const loop = closedLoop(
      [
        [-a, -b, 0],
        [a, -b, 0],
        [a, b, 0],
        [-a, b, 0],
      ],
      1,
    );
    const loopOhm = 2 * radiatedPowerW(loop, frequencyHz, wavelengthM);
    const areaRatio = (4 * a * b) / wavelengthM ** 2;
    expect(Math.abs(loopOhm / (320 * Math.PI ** 4 * areaRatio ** 2) - 1)).toBeLessThan(1e-3); // (ka)²/3 = 2e-4; 120π for η0: 7e-4
    const dipoleOhm = 2 * radiatedPowerW([shortWire([0, 0, 0], 0.01 * wavelengthM, 1)], frequencyHz, wavelengthM);
    expect(Math.abs(dipoleOhm / (80 * Math.PI ** 2 * 1e-4) - 1)).toBeLessThan(1.2e-3); // 120π for η0, (kl)²/20·…
  });
});

const scale = (a: Vector, factor: number): Vector => [a[0] * factor, a[1] * factor, a[2] * factor];
