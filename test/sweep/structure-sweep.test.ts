import { expect, it } from 'vitest';
import { lineLevel } from '../../app/estimate/line-level.ts';
import { buildScene } from '../../app/estimate/scene.ts';
import { spectrumTable } from '../../app/estimate/spectrum-table.ts';
import { StructureResponder } from '../../app/estimate/structure-responder.ts';
import { boardOf, OUTLINE_MM } from '../support/small-boards.ts';

it('levels at 200 harmonics from interpolated currents agree with solved ones within 0.1 dB; contributors make the level', () => {
  const board = boardOf({
    format: 'quietboard-board',
    version: 1,
    name: 'sweep',
    outline: [{ pointsMm: OUTLINE_MM }],
    stackup: [
      { name: 'TOP', kind: 'copper', thicknessMm: 0.035 },
      { name: 'D', kind: 'dielectric', thicknessMm: 0.8, epsilonR: 4.2, lossTangent: 0.02 },
      { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
    ],
    planes: [{ layer: 'BOT', net: 'GND' }],
    nets: ['A', 'B'].map((name, i) => ({
      name,
      traces: [
        {
          layer: 'TOP',
          widthMm: 0.3,
          pointsMm: [
            [8, 9 + 13 * i],
            [31, 9 + 13 * i],
            [31, 17 + 13 * i],
            [52, 17 + 13 * i],
          ],
        },
      ],
      pins: [
        { name: `U${i}.1`, atMm: [8, 9 + 13 * i], layer: 'TOP' },
        { name: `V${i}.1`, atMm: [52, 17 + 13 * i], layer: 'TOP' },
      ],
    })),
    waveforms: [
      {
        name: 'w',
        kind: 'trapezoid',
        frequencyMhz: 4.9,
        lowV: 0,
        highV: 3.3,
        dutyPercent: 41,
        riseNs: 0.9,
        fallNs: 1.3,
      },
    ],
    drives: [
      { net: 'A', pin: 'U0.1', waveform: 'w', sourceOhm: 25 },
      { net: 'B', pin: 'U1.1', waveform: 'w', sourceOhm: 40, delayNs: 3 },
    ],
    loads: [
      { net: 'A', pin: 'V0.1', capacitancePf: 6 },
      { net: 'B', pin: 'V1.1', resistanceOhm: 120 },
    ],
    cables: [
      {
        name: 'lead',
        pointsMm: [
          [60, 20, 0],
          [360, 20, 0],
          [360, 20, -500],
        ],
        radiusMm: 1,
      },
    ],
  });
  const site = { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' } as const;
  const scene = buildScene(board, site, 1e9, 'solved');
  const table = spectrumTable(board, 30e6, 1e9, []);
  expect(table.length).toBeGreaterThan(190);
  const interpolated = new StructureResponder(
    scene,
    scene.structure!,
    table.map(({ frequencyHz }) => frequencyHz),
  );
  expect(interpolated.isConverged).toBe(true);
  const some = table.filter((_, i) => i % 9 === 4);
  const solved = new StructureResponder(
    scene,
    scene.structure!,
    some.map(({ frequencyHz }) => frequencyHz),
  );
  for (const lines of some) {
    const one = lineLevel(scene, lines, interpolated)!;
    const other = lineLevel(scene, lines, solved)!;
    expect(Math.abs(20 * Math.log10(one.fieldVPerM / other.fieldVPerM)), `${lines.frequencyHz / 1e6} MHz`).toBeLessThan(
      0.1,
    );
    // By reciprocity or by currents: the same contributors. A part 20 dB down may differ ten times as much.
    for (const [i, contributor] of one.contributors.entries()) {
      const twin = other.contributors.find(({ name }) => name === contributor.name)!;
      if (i === 0) expect(Math.abs(twin.levelDbuvPerM - contributor.levelDbuvPerM)).toBeLessThan(0.2);
    }
    // Both nets share one domain: the phasor sum lies between difference and sum of the two.
    const [a, b] = other.contributors.map(({ levelDbuvPerM }) => Math.SQRT2 * 1e-6 * 10 ** (levelDbuvPerM / 20)) as [
      number,
      number,
    ];
    expect(other.fieldVPerM).toBeLessThanOrEqual((a + b) * (1 + 1e-9));
    expect(other.fieldVPerM).toBeGreaterThanOrEqual(Math.abs(a - b) * (1 - 1e-9));
  }
});
