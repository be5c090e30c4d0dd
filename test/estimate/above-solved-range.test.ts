import { expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { lineLevel } from '../../app/estimate/line-level.ts';
import { buildScene } from '../../app/estimate/scene.ts';
import { spectrumTable } from '../../app/estimate/spectrum-table.ts';
import { StructureResponder } from '../../app/estimate/structure-responder.ts';
import { boardOf, OUTLINE_MM } from '../support/small-boards.ts';

it('above 1 GHz, where planes are not solved, a trace over a slot radiates with its whole return, as pair-only', () => {
  const file: BoardFileInput = {
    format: 'quietboard-board',
    version: 1,
    name: 'slot',
    outline: [{ pointsMm: OUTLINE_MM }],
    stackup: [
      { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
      { name: 'D', kind: 'dielectric', thicknessMm: 0.5, epsilonR: 4.2 },
      { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
    ],
    planes: [
      {
        layer: 'BOT',
        net: 'GND',
        cutoutsMm: [
          [
            [29, 8],
            [31, 8],
            [31, 32],
            [29, 32],
          ],
        ],
      },
    ],
    nets: [
      {
        name: 'S',
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.3,
            pointsMm: [
              [9, 21],
              [52, 21],
            ],
          },
        ],
        pins: [
          { name: 'U1.1', atMm: [9, 21], layer: 'TOP' },
          { name: 'U2.1', atMm: [52, 21], layer: 'TOP' },
        ],
      },
    ],
    waveforms: [
      {
        name: 'w',
        kind: 'lines',
        lines: [
          { frequencyMhz: 990, amplitudeV: 1 },
          { frequencyMhz: 1010, amplitudeV: 1 },
        ],
      },
    ],
    drives: [{ net: 'S', pin: 'U1.1', waveform: 'w', sourceOhm: 25 }],
    loads: [{ net: 'S', pin: 'U2.1', resistanceOhm: 70 }],
  };
  const site = { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' } as const;
  const board = boardOf(file);
  const table = spectrumTable(board, 900e6, 1.1e9, []);
  const levelsOf = (mode: 'solved' | 'pair-only') => {
    const scene = buildScene(board, site, 1.1e9, mode);
    const hz = table.map(({ frequencyHz }) => frequencyHz);
    const responder = scene.structure ? new StructureResponder(scene, scene.structure, hz) : null;
    return table.map((lines) => lineLevel(scene, lines, responder)!.fieldVPerM);
  };
  const solved = levelsOf('solved');
  const alone = levelsOf('pair-only');
  expect(Math.abs(solved[1]! / alone[1]! - 1)).toBeLessThan(1e-3);
  // Below 1 GHz the slot's detour is solved and louder by far.
  expect(solved[0]!).toBeGreaterThan(2 * alone[0]!);
});
