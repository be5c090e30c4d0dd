import type { StructureMaximum } from './structure-cases.ts';

/**
 * Maxima over height (1-4 m) and angle at 3 m of the cases in structure-cases.ts over a perfect ground, and the largest current
 * of each cable. Written by `npm run references` (test/nec/generate.mjs) with nec2c 1.3 (Debian), the plane as a wire grid.
 * Largest change with another division of the grid:
 * - plane-100x60: strips of 2.22 instead of 3.33 mm: 0.10 dB at 100 and 1000 MHz
 * - plane-80x50-50ohm: strips of 1.67 instead of 2.50 mm: 0.08 dB at 100 and 1000 MHz
 * - plane-80x50-220ohm: strips of 1.67 instead of 2.50 mm: 0.10 dB at 100 and 1000 MHz
 * - plane-80x50-2kohm: strips of 1.67 instead of 2.50 mm: 0.02 dB at 100 and 1000 MHz
 * - plane-60x40: strips of 1.67 instead of 2.50 mm: 0.07 dB at 100 and 1000 MHz
 * - plane-160x100: strips of 4.00 instead of 3.33 mm: 0.42 dB at 100 and 1000 MHz
 * - slot-100x60: strips of 1.67 instead of 2.50 mm: 0.53 dB at 100 and 1000 MHz
 * - upright-100x60: strips of 2.22 instead of 3.33 mm: 0.07 dB at 100 and 1000 MHz
 * - cable-open: strips of 2.22 instead of 3.33 mm: 0.49 dB at 60 and 400 MHz
 * - cable-grounded: strips of 2.22 instead of 3.33 mm: 0.55 dB at 60 and 400 MHz
 * - cable-two: strips of 2.22 instead of 3.33 mm: 0.59 dB at 60 and 400 MHz
 * - cable-bend: strips of 2.22 instead of 3.33 mm: 0.48 dB at 60 and 400 MHz
 * - cable-upright-grounded: strips of 2.22 instead of 3.33 mm: 0.62 dB at 60 and 400 MHz
 * - cable-open-resonance: strips of 2.22 instead of 3.33 mm: resonance -0.24 %, -0.40 dB
 * Not to be edited by hand.
 */
type Row = readonly [
  caseId: string,
  frequencyHz: number,
  horizontalVPerM: number,
  verticalVPerM: number,
  cableCurrentsA: readonly number[],
];

const ROWS: readonly Row[] = [
  ['plane-100x60', 30e6, 0.0000041701, 0.000016704, []],
  ['plane-100x60', 100e6, 0.000027037, 0.00016362, []],
  ['plane-100x60', 200e6, 0.00017872, 0.00038539, []],
  ['plane-100x60', 400e6, 0.00069768, 0.0026067, []],
  ['plane-100x60', 700e6, 0.0035332, 0.0071591, []],
  ['plane-100x60', 1000e6, 0.01222, 0.014752, []],
  ['plane-80x50-50ohm', 30e6, 0.0000073261, 0.000015139, []],
  ['plane-80x50-50ohm', 100e6, 0.000056075, 0.00013563, []],
  ['plane-80x50-50ohm', 200e6, 0.00029897, 0.00029513, []],
  ['plane-80x50-50ohm', 400e6, 0.00099662, 0.0017, []],
  ['plane-80x50-50ohm', 700e6, 0.002523, 0.0035568, []],
  ['plane-80x50-50ohm', 1000e6, 0.0059415, 0.0061884, []],
  ['plane-80x50-220ohm', 30e6, 0.0000027599, 0.0000090549, []],
  ['plane-80x50-220ohm', 100e6, 0.000040322, 0.000088838, []],
  ['plane-80x50-220ohm', 200e6, 0.00022335, 0.00021294, []],
  ['plane-80x50-220ohm', 400e6, 0.0008597, 0.0014079, []],
  ['plane-80x50-220ohm', 700e6, 0.0028802, 0.0039529, []],
  ['plane-80x50-220ohm', 1000e6, 0.0057853, 0.0084998, []],
  ['plane-80x50-2kohm', 30e6, 9.9657e-7, 0.0000060772, []],
  ['plane-80x50-2kohm', 100e6, 0.000034739, 0.000064801, []],
  ['plane-80x50-2kohm', 200e6, 0.00018782, 0.00016401, []],
  ['plane-80x50-2kohm', 400e6, 0.00075813, 0.0010981, []],
  ['plane-80x50-2kohm', 700e6, 0.0032034, 0.0040177, []],
  ['plane-80x50-2kohm', 1000e6, 0.010496, 0.012628, []],
  ['plane-60x40', 30e6, 0.0000055514, 0.000012922, []],
  ['plane-60x40', 100e6, 0.000033154, 0.00011748, []],
  ['plane-60x40', 200e6, 0.00021239, 0.00026743, []],
  ['plane-60x40', 400e6, 0.00064659, 0.0016428, []],
  ['plane-60x40', 700e6, 0.0021564, 0.003766, []],
  ['plane-60x40', 1000e6, 0.0040194, 0.0070827, []],
  ['plane-160x100', 30e6, 0.0000070812, 0.000027133, []],
  ['plane-160x100', 100e6, 0.000037528, 0.0002637, []],
  ['plane-160x100', 200e6, 0.00032274, 0.00060466, []],
  ['plane-160x100', 400e6, 0.0015634, 0.0041411, []],
  ['plane-160x100', 700e6, 0.0094685, 0.0097809, []],
  ['plane-160x100', 1000e6, 0.011251, 0.013103, []],
  ['slot-100x60', 30e6, 0.0000042444, 0.000016486, []],
  ['slot-100x60', 100e6, 0.000024405, 0.00015999, []],
  ['slot-100x60', 200e6, 0.00020926, 0.00036023, []],
  ['slot-100x60', 400e6, 0.0012096, 0.0026227, []],
  ['slot-100x60', 700e6, 0.0078575, 0.0077386, []],
  ['slot-100x60', 1000e6, 0.033477, 0.018498, []],
  ['upright-100x60', 30e6, 0.0000044, 0.0000025062, []],
  ['upright-100x60', 100e6, 0.00013859, 0.000040138, []],
  ['upright-100x60', 200e6, 0.00074553, 0.00016275, []],
  ['upright-100x60', 400e6, 0.0026429, 0.00069584, []],
  ['upright-100x60', 700e6, 0.0087072, 0.0021906, []],
  ['upright-100x60', 1000e6, 0.021507, 0.0054981, []],
  ['cable-open', 30e6, 0.000014989, 0.000025565, [0.00001179]],
  ['cable-open', 60e6, 0.00017574, 0.0001037, [0.000027042]],
  ['cable-open', 100e6, 0.0022163, 0.0011872, [0.00010156]],
  ['cable-open', 200e6, 0.0023463, 0.0013439, [0.000068951]],
  ['cable-open', 300e6, 0.0034515, 0.0015639, [0.000074134]],
  ['cable-open', 400e6, 0.0066449, 0.005773, [0.0001688]],
  ['cable-grounded', 30e6, 0.000013945, 0.00014051, [0.000016676]],
  ['cable-grounded', 60e6, 0.00042996, 0.0043417, [0.00030172]],
  ['cable-grounded', 100e6, 0.00012848, 0.00070316, [0.000041765]],
  ['cable-grounded', 200e6, 0.003094, 0.0018989, [0.00020857]],
  ['cable-grounded', 300e6, 0.0035879, 0.0027189, [0.00015054]],
  ['cable-grounded', 400e6, 0.00112, 0.0033617, [0.000090298]],
  ['cable-two', 30e6, 0.0000043884, 0.000015573, [0.0000080308, 0.000005805]],
  ['cable-two', 60e6, 0.00013868, 0.000075945, [0.000022336, 0.000012235]],
  ['cable-two', 100e6, 0.00064964, 0.00033142, [0.0000095184, 0.000046214]],
  ['cable-two', 200e6, 0.0026124, 0.0015801, [0.000064863, 0.000042363]],
  ['cable-two', 300e6, 0.0045616, 0.0019791, [0.000023985, 0.00013095]],
  ['cable-two', 400e6, 0.011596, 0.0090742, [0.00030242, 0.00026167]],
  ['cable-bend', 30e6, 0.000011203, 0.000030221, [0.000012055]],
  ['cable-bend', 60e6, 0.00012458, 0.00013517, [0.00002767]],
  ['cable-bend', 100e6, 0.0017035, 0.0011716, [0.00012223]],
  ['cable-bend', 200e6, 0.0017075, 0.0013832, [0.000085937]],
  ['cable-bend', 300e6, 0.0019499, 0.002061, [0.000075634]],
  ['cable-bend', 400e6, 0.0038557, 0.0036281, [0.00010007]],
  ['cable-upright-grounded', 30e6, 0.000015674, 0.00013085, [0.000016755]],
  ['cable-upright-grounded', 60e6, 0.00032264, 0.0033513, [0.0002279]],
  ['cable-upright-grounded', 100e6, 0.00021839, 0.00067083, [0.000039816]],
  ['cable-upright-grounded', 200e6, 0.0023454, 0.001538, [0.00014976]],
  ['cable-upright-grounded', 300e6, 0.0055252, 0.0033649, [0.00020366]],
  ['cable-upright-grounded', 400e6, 0.0027528, 0.0016898, [0.000096518]],
  ['cable-open-resonance', 110e6, 0.0044486, 0.002349, [0.00017683]],
  ['cable-open-resonance', 113e6, 0.0047467, 0.0024958, [0.00018211]],
  ['cable-open-resonance', 116e6, 0.0045732, 0.0023956, [0.00016995]],
  ['cable-open-resonance', 119e6, 0.0041584, 0.0021713, [0.00015015]],
  ['cable-open-resonance', 122e6, 0.0037184, 0.0019371, [0.0001309]],
  ['cable-open-resonance', 125e6, 0.0033422, 0.0017369, [0.00011491]],
  ['cable-open-resonance', 128e6, 0.0030385, 0.001576, [0.00010232]],
];

export const STRUCTURE_MAXIMA: readonly StructureMaximum[] = ROWS.map(
  ([caseId, frequencyHz, horizontalVPerM, verticalVPerM, cableCurrentsA]) => ({
    caseId,
    frequencyHz,
    horizontalVPerM,
    verticalVPerM,
    cableCurrentsA,
  }),
);
