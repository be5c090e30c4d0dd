import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ElementCollector, type Radiator } from '../../app/fields/element-set.ts';
import { boxOf } from '../../app/site/moment-grid.ts';
import type { Component } from '../../app/site/power-map.ts';
import { fieldAtAntenna, type ScanRequest, scanMaxima } from '../../app/site/scan.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';

/** Trace-like pairs (current and its opposite 0.2–1.6 mm below), pins and a few unpaired pieces, from a seed. */
function randomDomains(seed: number, halfXM: number, halfYM: number, domainCount: number): Radiator[][] {
  let state = seed >>> 0 || 1;
  const random = () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 32;
  };
  return Array.from({ length: domainCount }, () => {
    const collector = new ElementCollector();
    const currents: number[] = [];
    const pieces = 60 + Math.floor(200 * random());
    for (let i = 0; i < pieces; i++) {
      const x = (2 * random() - 1) * halfXM;
      const y = (2 * random() - 1) * halfYM;
      const angle = 2 * Math.PI * random();
      const length = 1e-3 + 4e-3 * random();
      const height = 0.2e-3 + 1.4e-3 * random();
      const v: [number, number, number] = [length * Math.cos(angle), length * Math.sin(angle), 0];
      const re = 2 * random() - 1;
      const im = 2 * random() - 1;
      collector.add([x, y, 0.8 + height], v);
      collector.add([x, y, 0.8], v);
      collector.add([x, y, 0.8 + height / 2], [0, 0, height]);
      currents.push(re, im, -re, -im, im, re);
    }
    return [{ elements: collector.finish(), currentsA: Float64Array.from(currents) }];
  });
}

function directPower(domains: Radiator[][], component: Component, angle: number, height: number, request: ScanRequest) {
  let power = 0;
  for (const radiators of domains) {
    const [re, im] = fieldAtAntenna(radiators, component, angle, height, request);
    power += re * re + im * im;
  }
  return power;
}

describe('band-limited scan against the plain sum over every element', () => {
  it('finds the maximum of the full direct scan within 0.02 dB, 30 MHz to 6 GHz, 3 m and 10 m', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 2 ** 31 - 1 }),
        fc.double({ min: Math.log(30e6), max: Math.log(6e9), noNaN: true }),
        fc.double({ min: 0.01, max: 0.12, noNaN: true }),
        fc.double({ min: 0.01, max: 0.1, noNaN: true }),
        fc.constantFrom(3, 10),
        fc.constantFrom('ground-plane' as const, 'free-space' as const),
        (seed, logHz, halfX, halfY, distanceM, site) => {
          const domains = randomDomains(seed, halfX, halfY, 2);
          const request: ScanRequest = {
            kPerM: (2 * Math.PI * Math.exp(logHz)) / SPEED_OF_LIGHT_M_PER_S,
            scanRadiusM: distanceM + Math.hypot(halfX, halfY),
            site,
            box: boxOf(domains.flat()),
          };
          const maxima = scanMaxima(domains, request);
          for (const component of ['horizontal', 'vertical'] as const) {
            const found = maxima[component];
            const exact = directPower(domains, component, found.angleRad, found.heightM, request);
            expect(Math.abs(10 * Math.log10(found.power / exact)), `${component} at the maximum`).toBeLessThan(0.02);
            let highest = 0;
            for (let a = 0; a < 36; a++) {
              for (let h = 0; h < 7; h++) {
                // offsets that are no multiple of the scan's own grid
                const angle = ((a + 0.137 * h) * 2 * Math.PI) / 36;
                highest = Math.max(highest, directPower(domains, component, angle, 1 + (3 * h) / 6, request));
              }
            }
            expect(10 * Math.log10(highest / found.power), `${component} elsewhere`).toBeLessThan(0.02);
          }
        },
      ),
      { numRuns: 25, seed: 20261201 },
    );
  });
});
