import { describe, expect, it } from 'vitest';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { solveNetwork } from '../../app/network/solve-network.ts';
import { fieldAtAntenna } from '../../app/site/scan.ts';
import { ETA0_OHM, SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import { chargedWire } from '../support/charged-wire.ts';
import { boardOf, OUTLINE_MM, radiatorsAt, totalMoment } from '../support/small-boards.ts';

const drive = (frequencyMhz: number): Pick<BoardFileInput, 'waveforms' | 'drives'> => ({
  waveforms: [{ name: 'w', kind: 'lines', lines: [{ frequencyMhz, amplitudeV: 2 }] }],
  drives: [{ net: 'S', pin: 'U1.1', waveform: 'w', sourceOhm: 20 }],
});

/** Four layers; the trace goes from top to bottom in the middle and its reference from L2 to L3. */
function layerChange(epsilonR: number, hasStitch: boolean): BoardFileInput {
  return {
    format: 'quietboard-board',
    version: 1,
    name: 'layer change',
    outline: [{ pointsMm: OUTLINE_MM }],
    stackup: [
      { name: 'L1', kind: 'copper', thicknessMm: 0.035 },
      { name: 'D1', kind: 'dielectric', thicknessMm: 0.3, epsilonR },
      { name: 'L2', kind: 'copper', thicknessMm: 0.02 },
      { name: 'D2', kind: 'dielectric', thicknessMm: 0.9, epsilonR },
      { name: 'L3', kind: 'copper', thicknessMm: 0.02 },
      { name: 'D3', kind: 'dielectric', thicknessMm: 0.25, epsilonR },
      { name: 'L4', kind: 'copper', thicknessMm: 0.035 },
    ],
    planes: [
      { layer: 'L2', net: 'GND' },
      { layer: 'L3', net: 'GND' },
    ],
    nets: [
      {
        name: 'S',
        traces: [
          {
            layer: 'L1',
            widthMm: 0.2,
            pointsMm: [
              [10, 11],
              [10, 20],
              [31, 20],
            ],
          },
          {
            layer: 'L4',
            widthMm: 0.25,
            pointsMm: [
              [31, 20],
              [44, 20],
              [47, 26],
            ],
          },
          {
            layer: 'L4',
            widthMm: 0.25,
            pointsMm: [
              [39, 20],
              [39, 27],
            ],
          },
        ],
        vias: [{ atMm: [31, 20], fromLayer: 'L1', toLayer: 'L4', drillMm: 0.3 }],
        pins: [
          { name: 'U1.1', atMm: [10, 11], layer: 'L1' },
          { name: 'U2.1', atMm: [47, 26], layer: 'L4' },
          { name: 'U3.1', atMm: [39, 27], layer: 'L4' },
        ],
      },
      {
        name: 'GND',
        vias: hasStitch ? [{ atMm: [34, 16], fromLayer: 'L1', toLayer: 'L4', drillMm: 0.3 }] : [],
      },
    ],
    ...drive(0.01),
    loads: [
      { net: 'S', pin: 'U2.1', resistanceOhm: 33 },
      { net: 'S', pin: 'U3.1', resistanceOhm: 70 },
    ],
  };
}

describe('trace, return, pins and vias close every loop', () => {
  it.each([true, false])(
    'no moment Σ I·dl is left at 10 kHz through a layer change (stitching via: %s)',
    (hasStitch) => {
      // Kirchhoff: at a frequency without displacement current every current runs in closed loops, so Σ I·dl = 0.
      // 10 kHz: displacement over conduction current is ωRC ≈ 2π·1e4·50·5e-12 = 2e-5.
      const { radiators } = radiatorsAt(boardOf(layerChange(1, hasStitch)), 1e4);
      const { sum, size } = totalMoment(radiators);
      expect(size).toBeGreaterThan(1e-4);
      for (const part of sum) expect(Math.abs(part)).toBeLessThan(2e-4 * size);
    },
  );

  it('says where the return has no stitching via', () => {
    const site = radiatorsAt(boardOf(layerChange(1, false)), 1e4).scene;
    const codes = site.nets.get('S')!.findings.map(({ code }) => code);
    expect(codes).toEqual(['return-changes-plane']);
    expect(radiatorsAt(boardOf(layerChange(1, true)), 1e4).scene.nets.get('S')!.findings).toEqual([]);
  });
});

/** Another width, and a stated line. */
interface Stated {
  widthMm?: number;
  z0Ohm?: number;
  epsilonEff?: number;
}

/** One straight trace over a plane. */
function straight(
  options: Stated & {
    epsilonR: number;
    heightMm: number;
    lengthMm: number;
    frequencyMhz: number;
    loadOhm?: number;
  },
): BoardFileInput {
  const { epsilonR, heightMm, lengthMm, frequencyMhz, loadOhm, widthMm = 0.3, ...line } = options;
  const endMm: [number, number] = [10 + lengthMm, 20];
  return {
    format: 'quietboard-board',
    version: 1,
    name: 'straight',
    outline: [{ pointsMm: OUTLINE_MM }],
    stackup: [
      { name: 'TOP', kind: 'copper', thicknessMm: 0 },
      { name: 'D', kind: 'dielectric', thicknessMm: heightMm, epsilonR },
      { name: 'BOT', kind: 'copper', thicknessMm: 0.035 },
    ],
    planes: [{ layer: 'BOT', net: 'GND' }],
    nets: [
      {
        name: 'S',
        ...line,
        traces: [{ layer: 'TOP', widthMm, pointsMm: [[10, 20], endMm] }],
        pins: [
          { name: 'U1.1', atMm: [10, 20], layer: 'TOP' },
          { name: 'U2.1', atMm: endMm, layer: 'TOP' },
        ],
      },
    ],
    ...drive(frequencyMhz),
    loads: [{ net: 'S', pin: 'U2.1', ...(loadOhm !== undefined && { resistanceOhm: loadOhm }) }],
  };
}

describe('moments of a short trace over its plane', () => {
  const FREQUENCY_HZ = 40e6;
  /** jω·moment over jω·V of a trace with open load, m·F, and its Z0. */
  function electricMoment(epsilonR: number, heightMm: number, lengthMm: number, stated: Stated = {}) {
    const board = boardOf(straight({ epsilonR, heightMm, lengthMm, frequencyMhz: 40, ...stated }));
    const { scene, radiators } = radiatorsAt(board, FREQUENCY_HZ);
    const { sum } = totalMoment(radiators);
    const scale = 2 * Math.PI * FREQUENCY_HZ * 2;
    const { sections, network } = scene.nets.get('S')!;
    return { real: sum[4]! / scale, moment: sum[5]! / scale, z0Ohm: sections[0]!.z0Ohm, network };
  }

  it.each([1, 4.3])('open end, ε_r %f: 8 mm more of line hold C V h/ε_r more moment (physics 5.3)', (epsilonR) => {
    const heightMm = 0.5;
    const [short, long] = [8, 16].map((lengthMm) => electricMoment(epsilonR, heightMm, lengthMm));
    // Independent of the code's C': the capacitance per length of a line is ε_eff-free as C' = √ε_eff/(Z0 c), and ε_eff
    // follows from Z0 against the same trace in air: ε_eff = (Z0,air/Z0)².
    const airOhm = electricMoment(1, heightMm, 8).z0Ohm;
    const capacitanceF = (airOhm / short!.z0Ohm ** 2 / SPEED_OF_LIGHT_M_PER_S) * 8e-3;
    const expected = (capacitanceF * heightMm * 1e-3) / epsilonR;
    // V drops by ωRC = 2e-3 at most, square of it in size, and the line is λ/200 long: 2e-3.
    expect(Math.abs((long!.moment - short!.moment) / expected - 1)).toBeLessThan(3e-3);
    expect(Math.abs(long!.real)).toBeLessThan(0.02 * expected);
  });

  it('its two ends hold what a thin-wire solution gives them', () => {
    const heightMm = 1;
    // Round wire of radius h/15 in air; a strip of width 4a has the same field.
    const z0Ohm = (ETA0_OHM / (2 * Math.PI)) * Math.acosh(15);
    const stated = { widthMm: 4 / 15, z0Ohm, epsilonEff: 1 };
    const [short, long] = [8, 16].map((lengthMm) => electricMoment(1, heightMm, lengthMm, stated).moment);
    const endM = (2 * short! - long!) / 2 / (heightMm * 1e-3) / (1 / (z0Ohm * SPEED_OF_LIGHT_M_PER_S));
    // 0.06 h is the fit's own error.
    expect(Math.abs(endM / (heightMm * 1e-3) - chargedWire(15, 'terminal').endM)).toBeLessThan(0.06);
  });

  it.each([1, 4.3])('charge of line and ends is what the driver delivers, ε_r %f', (epsilonR) => {
    const heightMm = 1;
    const lengthMm = 8;
    const { moment, network } = electricMoment(epsilonR, heightMm, lengthMm);
    const { driveCurrents } = solveNetwork(network, FREQUENCY_HZ)[0]!;
    // Law: I = jω q, and a charge q over a plane has the moment q h/ε_r; V drops by 1e-3, the line's own wave adds as much.
    const charge = driveCurrents[1]! / (2 * Math.PI * FREQUENCY_HZ);
    expect(Math.abs((charge * heightMm * 1e-3) / epsilonR / moment - 1)).toBeLessThan(3e-3);
  });

  it('loaded end: the far field is that of the small loop I·h·L, E = η0 k² A I/(4π r)', () => {
    // Small loop: C. A. Balanis, Antenna Theory, 5.2 (far field of the small loop); here in the constant of H. W. Ott,
    // 131.6e-16 f² A I/r. A trace's loop stands upright: largest along the trace, vertically polarised.
    const frequencyHz = 30e6;
    const board = boardOf(straight({ epsilonR: 1, heightMm: 1.2, lengthMm: 10, frequencyMhz: 30, loadOhm: 30 }));
    const { radiators } = radiatorsAt(board, frequencyHz);
    const kPerM = (2 * Math.PI * frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
    const rM = 50;
    // The height of the trace's middle above z = 0; in its plane, along the trace.
    const request = { kPerM, scanRadiusM: rM, site: 'free-space', box: null, terms: 'all' } as const;
    const [forwardRe, forwardIm] = fieldAtAntenna(radiators, 'vertical', 0, 0.8006, request);
    const [backRe, backIm] = fieldAtAntenna(radiators, 'vertical', Math.PI, 0.8006, request);
    // The electric moment adds on one side and subtracts on the other; the loop is the odd part.
    const magnetic = Math.hypot(forwardRe - backRe, forwardIm - backIm) / 2;
    const currentA = 2 / (20 + 30);
    const expected = (ETA0_OHM * kPerM * kPerM * 1.2e-3 * 10e-3 * currentA) / (4 * Math.PI * rM);
    // Near terms at kR = 31: 1/(2 k²R²) = 5e-4; the line's own reactance moves I by (ωL/R)²/2 = 1e-3.
    expect(Math.abs(magnetic / expected - 1)).toBeLessThan(4e-3);
    const ott = (131.6e-16 * frequencyHz ** 2 * 1.2e-3 * 10e-3 * currentA) / rM;
    expect(Math.abs(magnetic / ott - 1)).toBeLessThan(5e-3);
  });
});
