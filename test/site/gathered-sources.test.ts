import { describe, expect, it } from 'vitest';
import { ElementCollector, type Radiator } from '../../app/fields/element-set.ts';
import { addSample, antennaAt, SAMPLE_STRIDE } from '../../app/site/antenna-sample.ts';
import { centreDistanceM, cylinderPlan, fieldOnCylinder } from '../../app/site/cylinder-field.ts';
import { boxOf } from '../../app/site/moment-grid.ts';
import { angleTable, resample } from '../../app/site/resample.ts';
import { groupByElements } from '../../app/site/source-groups.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';

/** Reproducible numbers in −1…1. */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return state / 1_073_741_824 - 1;
  };
}

/** `count` elements at places of a parameter −1…1, unrelated currents. */
function radiator(count: number, placeM: (t: number) => [number, number, number], next: () => number): Radiator {
  const collector = new ElementCollector();
  for (let i = 0; i < count; i++) {
    collector.add(placeM((2 * i) / (count - 1) - 1), [0.01 * next(), 0.01 * next(), 0.01 * next()]);
  }
  return { elements: collector.finish(), currentsA: Float64Array.from({ length: 2 * count }, next) };
}

describe('sources gathered on grids', () => {
  // A board 0.2 m wide (gathered in its box, few angles) with cables: along an axis, oblique, one bent (left as it is).
  it.each([
    [60e6, 'ground-plane'],
    [400e6, 'ground-plane'],
    [1e9, 'ground-plane'],
    [1e9, 'free-space'],
  ] as const)('see the antenna like every element for itself, %f Hz, %s', (frequencyHz, site) => {
    const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
    const next = generator(7);
    const board = radiator(600, () => [0.1 * next(), 0.07 * next(), 0.8 + 0.0005 * next()], next);
    const straight = radiator(60, (t) => [0.6 + 0.5 * t, 0.01, 0.8], next);
    const oblique = radiator(60, (t) => [-0.5 + 0.35 * t, 0.3 - 0.3 * t, 0.6 + 0.15 * t], next);
    const bent = radiator(40, (t) => [0.2 * t * t, -0.3 - 0.2 * t, 0.8], next);
    const domains = [[board, straight, oblique], [straight, bent], [board]];
    const antennaM = 4.2;
    const plan = cylinderPlan(kPerM, antennaM, domains.flat(), site);
    const gathered = fieldOnCylinder(domains, plan, boxOf([board]));
    const direct = domains.map(() => new Float64Array(SAMPLE_STRIDE));
    const groups = groupByElements(domains);
    const angleCount = 2 * plan.order + 1;
    let worst = 0;
    let largest = 0;
    for (let part = 0; part < plan.partCount; part++) {
      for (let a = 0; a < angleCount; a += 5) {
        for (let h = 0; h < plan.heightsM.length; h += 2) {
          for (const own of direct) own.fill(0);
          const zM = part === 0 ? plan.heightsM[h]! : -plan.heightsM[h]!;
          const r0M = centreDistanceM(plan, zM);
          const place = { ...antennaAt(plan, (2 * Math.PI * a) / angleCount, zM, 'all'), referenceM: r0M, factor: r0M };
          for (const group of groups) addSample(group, place, direct, 0);
          const at = ((part * angleCount + a) * plan.heightsM.length + h) * SAMPLE_STRIDE;
          for (const [d, own] of direct.entries()) {
            for (let i = 0; i < SAMPLE_STRIDE; i++) {
              worst = Math.max(worst, Math.abs(gathered[d]![at + i]! - own[i]!));
              largest = Math.max(largest, Math.abs(own[i]!));
            }
          }
        }
      }
    }
    // 1e-5 is asked of each interpolation: places in the box and on lines, angles, heights. 0.001 dB is 1.2e-4.
    expect(worst / largest).toBeLessThan(1.2e-4);
  });
});

describe('resampling', () => {
  it('is exact for a trigonometric polynomial times a polynomial', () => {
    const value = (angle: number, x: number) => (1 + 0.3 * Math.cos(2 * angle) - Math.sin(3 * angle)) * (x ** 4 - x);
    const onGrid = (angleCount: number, heightCount: number) =>
      Float64Array.from({ length: 2 * angleCount * heightCount }, (_, i) => {
        const h = (i >> 1) % heightCount;
        const angle = (2 * Math.PI * Math.floor(i / 2 / heightCount)) / angleCount;
        return (i % 2 === 0 ? 1 : -2) * value(angle, -Math.cos((Math.PI * (h + 0.5)) / heightCount));
      });
    const samples = onGrid(7, 5);
    const shifted = Float64Array.of(99, 99, ...samples);
    const fine = resample(shifted, 2, 2, { angleCount: 7, heightCount: 5 }, { angleCount: 16, heightCount: 11 });
    const expected = onGrid(16, 11);
    for (let i = 0; i < expected.length; i++) expect(fine[i]!).toBeCloseTo(expected[i]!, 12);
  });

  it('to the same angles changes nothing', () => {
    const table = angleTable(9, 9);
    for (let i = 0; i < 81; i++) expect(table[i]!).toBeCloseTo(i % 10 === 0 ? 1 : 0, 14);
  });
});
