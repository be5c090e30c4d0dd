import { describe, expect, it } from 'vitest';
import { ringAreaMm2 } from '../../../main/files/ipc2581/build/frame.ts';
import { flattenPath } from '../../../main/files/ipc2581/path.ts';
import { primitivePath } from '../../../main/files/ipc2581/primitives.ts';

const area = (element: string, attributes: Record<string, string>, mmPerUnit = 1): number =>
  ringAreaMm2(flattenPath(primitivePath(element, attributes, mmPerUnit)!, 1e-6));

/** Areas by school geometry; chords of 1 nm sagitta lose less than 1e-5 of a 1 mm circle. */
describe('standard primitives', () => {
  it.each([
    ['Circle', { diameter: '1.2' }, Math.PI * 0.36],
    ['Donut', { shape: 'ROUND', outerDiameter: '1.2', innerDiameter: '0.5' }, Math.PI * 0.36],
    ['RectCenter', { width: '2', height: '3' }, 6],
    ['RectCorner', { lowerLeftX: '-1', lowerLeftY: '2', upperRightX: '4', upperRightY: '5' }, 15],
    ['RectRound', { width: '4', height: '3', radius: '0.5' }, 12 - (4 - Math.PI) * 0.25],
    [
      'RectRound',
      { width: '4', height: '3', radius: '0.5', upperLeft: 'false', lowerRight: '0' },
      12 - (2 - Math.PI / 2) * 0.25,
    ],
    ['RectCham', { width: '4', height: '3', chamfer: '0.5' }, 12 - 4 * 0.125],
    ['Oval', { width: '5', height: '2' }, 6 + Math.PI],
    ['Oval', { width: '2', height: '5' }, 6 + Math.PI],
    ['Diamond', { width: '4', height: '3' }, 6],
    ['Triangle', { base: '4', height: '3' }, 6],
    // Regular polygon of n corners on a circle of radius r: n r² sin(2π/n) / 2.
    ['Hexagon', { length: '2' }, 3 * Math.sin(Math.PI / 3)],
    ['Octagon', { length: '2' }, 4 * Math.sin(Math.PI / 4)],
    ['Ellipse', { width: '4', height: '2' }, 36 * 2 * Math.sin(Math.PI / 36)],
  ])('%s has the area of its formula', (element, attributes, expectedMm2) => {
    expect(Math.abs(area(element, attributes) / expectedMm2 - 1)).toBeLessThan(1e-5);
  });

  it('are in the units of their dictionary', () => {
    expect(area('RectCenter', { width: '2', height: '3' }, 25.4)).toBeCloseTo(6 * 25.4 ** 2, 9);
  });

  it('are nothing else', () => {
    expect(primitivePath('Text', {}, 1)).toBeUndefined();
    expect(() => primitivePath('Circle', { diameter: '-1' }, 1)).toThrow('Circle diameter must not be negative');
    expect(() => primitivePath('Circle', {}, 1)).toThrow('Circle diameter must be a number; it is missing');
  });
});
