import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { radiatingParts } from '../../app/estimate/radiating-parts.ts';
import { buildScene } from '../../app/estimate/scene.ts';
import { spectrumTable } from '../../app/estimate/spectrum-table.ts';
import { fieldAtAntenna } from '../../app/site/scan.ts';
import { TABLE_HEIGHT_M, toSiteVector } from '../../app/site/site.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { driveFile, drivenBoard, linesVoltage, type Mm, netFile } from '../support/estimates.ts';
import { boardOf } from '../support/small-boards.ts';

type Mm3 = [number, number, number];

/** A board without losses, all lengths times `s`, frequency over `s`, the load's capacitance times `s`. */
function scaledBoard(s: number): BoardFileInput {
  const mm = (points: Mm[]): Mm[] => points.map(([x, y]) => [s * x, s * y]);
  const net = netFile(
    'A',
    mm([
      [9, 12],
      [48, 12],
      [48, 33],
    ]),
  );
  return drivenBoard(
    [{ ...net, traces: [{ ...net.traces![0]!, widthMm: 0.4 * s }] }],
    [driveFile('A', 'w')],
    [
      linesVoltage('w', [[400 / s, 1]]),
      { name: 'i', kind: 'lines', lines: [{ frequencyMhz: 400 / s, amplitudeA: 1e-3 }] },
    ],
    {
      outline: [
        {
          pointsMm: mm([
            [0, 0],
            [70, 0],
            [70, 44],
            [0, 44],
          ]),
        },
      ],
      stackup: [
        { name: 'TOP', kind: 'copper', thicknessMm: 0 },
        { name: 'D', kind: 'dielectric', thicknessMm: 1.2 * s, epsilonR: 4.1 },
        { name: 'BOT', kind: 'copper', thicknessMm: 0 },
      ],
      loads: [{ net: 'A', pin: 'U2.A', resistanceOhm: 75, capacitancePf: 4 * s }],
      loops: [
        {
          name: 'L',
          waveform: 'i',
          pointsMm: [
            [5, 30, 2],
            [13, 30, 2],
            [12, 36, 3],
          ].map((p) => p.map((c) => c * s) as Mm3),
        },
      ],
    },
  );
}

const SITE = { kind: 'free-space', distanceM: 3, measuredFrom: 'center', orientation: 'flat' } as const;

describe('scaling law of Maxwell’s equations in free space', () => {
  it.each([0.5, 2, 3.7])('all lengths × %f, frequency ÷ that: the same currents, the field ÷ that', (s) => {
    const fieldsOf = (scale: number) => {
      const board = boardOf(scaledBoard(scale));
      const frequencyHz = 400e6 / scale;
      const scene = buildScene(board, SITE, 1e9, 'pair-only');
      const [lines] = spectrumTable(board, 0.99 * frequencyHz, 1.01 * frequencyHz, []);
      const radiators = radiatingParts(scene, lines!).map(({ radiator }) => radiator);
      const request = {
        kPerM: (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S,
        scanRadiusM: 0.9 * scale,
        site: 'free-space',
        box: null,
      } as const;
      // Heights count from the board, which lies at the table's height whatever its size.
      return [0.2, 1.9, 4].flatMap((angleRad) =>
        (['horizontal', 'vertical'] as const).map((component) =>
          Math.hypot(...fieldAtAntenna(radiators, component, angleRad, TABLE_HEIGHT_M + 0.25 * scale, request)),
        ),
      );
    };
    const unit = fieldsOf(1);
    for (const [i, field] of fieldsOf(s).entries()) {
      // Quadrature is chosen for 1 GHz whatever the scale: 1e-5.
      expect(Math.abs((field * s) / unit[i]! - 1)).toBeLessThan(1e-4);
    }
  });
});

describe('orientation', () => {
  it('turns every element of a net as a whole and leaves its currents', () => {
    const board = boardOf(scaledBoard(1));
    const [lines] = spectrumTable(board, 399e6, 401e6, []);
    const partsOf = (orientation: 'flat' | 'upright') =>
      radiatingParts(buildScene(board, { ...SITE, orientation }, 1e9, 'pair-only'), lines!);
    const flat = partsOf('flat');
    for (const [i, { radiator }] of partsOf('upright').entries()) {
      const { elements, currentsA } = flat[i]!.radiator;
      expect(radiator.currentsA).toEqual(currentsA);
      for (let e = 0; e < elements.count; e++) {
        const at = (from: Float64Array): Mm3 => [from[3 * e]!, from[3 * e + 1]!, from[3 * e + 2]!];
        expect(at(radiator.elements.vectorsM)).toEqual(toSiteVector('upright', at(elements.vectorsM)));
        // Flat (x, y, 0.8 + z) and upright (x, c − z, 0.8 + half the height + y), c half the thickness.
        const [x, y, z] = at(elements.positionsM);
        const turned = [x, 0.6e-3 - (z - TABLE_HEIGHT_M), TABLE_HEIGHT_M + 0.022 + y];
        for (const [axis, value] of at(radiator.elements.positionsM).entries())
          expect(value).toBeCloseTo(turned[axis]!, 12);
      }
    }
  });
});
