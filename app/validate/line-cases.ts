import type { CrossSection } from '../lines/cross-section.ts';

/** A cross-section with the impedance that the field solver of the tests gives (2-D method of moments, 96 panels a side). */
interface FieldSolverCase {
  readonly id: string;
  readonly quantity: string;
  readonly section: CrossSection;
  readonly z0Ohm: number;
  /** What the formula behind it is stated to hold, as a part of Z0. */
  readonly tolerancePart: number;
}

export const fieldSolverCases: readonly FieldSolverCase[] = [
  {
    id: 'line-microstrip-thick',
    quantity: 'Z0 surface microstrip 0.35 mm, 35 µm, h 0.2 mm, ε 4.3',
    section: { kind: 'microstrip', widthM: 0.35e-3, thicknessM: 35e-6, heightM: 0.2e-3, epsilonR: 4.3, tanDelta: 0.02 },
    z0Ohm: 50.75,
    tolerancePart: 0.005,
  },
  {
    id: 'line-microstrip-solder-mask',
    quantity: 'Z0 microstrip 0.2 mm, 35 µm, h 0.12 mm, ε 4.3, under 25 µm of solder mask ε 3.5',
    section: {
      kind: 'microstrip',
      widthM: 0.2e-3,
      thicknessM: 35e-6,
      heightM: 0.12e-3,
      epsilonR: 4.3,
      tanDelta: 0.02,
      cover: { thicknessM: 25e-6, epsilonR: 3.5, tanDelta: 0.02 },
    },
    z0Ohm: 48.48,
    tolerancePart: 0.01,
  },
  {
    id: 'line-stripline-off-centre',
    quantity: 'Z0 stripline 0.15 mm, 18 µm, 0.1 mm and 0.36 mm to the planes, ε 4.3',
    section: {
      kind: 'stripline',
      widthM: 0.15e-3,
      thicknessM: 18e-6,
      heightAboveM: 0.1e-3,
      heightBelowM: 0.36e-3,
      epsilonR: 4.3,
      tanDelta: 0.02,
    },
    z0Ohm: 44.1,
    tolerancePart: 0.012,
  },
  {
    id: 'line-coplanar-strips',
    quantity: 'Z0 coplanar strips 0.3 mm, 35 µm, 1.3 mm apart on 1.5 mm, ε 4.3',
    section: {
      kind: 'coplanar-strips',
      widthM: 0.3e-3,
      thicknessM: 35e-6,
      centreDistanceM: 1.3e-3,
      substrateM: 1.5e-3,
      epsilonR: 4.3,
      tanDelta: 0.02,
    },
    z0Ohm: 201.98,
    tolerancePart: 0.012,
  },
];
