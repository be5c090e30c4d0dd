import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { StructureCurrentMap } from '../../app/estimate/result.ts';
import { cableFigure, distancesAlong } from '../../app/report/figures/cable-figure.ts';
import { cellRuns } from '../../app/report/figures/cell-runs.ts';
import { colourStep, currentFigure } from '../../app/report/figures/current-figure.ts';
import { LEVEL_COLOURS } from '../../app/report/figures/level-colours.ts';
import { sectionMarkup } from '../../app/report/html/section-markup.ts';
import { currentsSection } from '../../app/report/sections/currents-section.ts';
import { sampleCurrentMap } from '../support/sample-current-map.ts';
import { resultWith, sampleResult } from '../support/sample-result.ts';
import { sampleResultBoard } from '../support/sample-result-board.ts';
import { plainText, readPage } from './html-reader.ts';

const board = sampleResultBoard();
const map = sampleCurrentMap(125e6);
const clock = { name: 'CLK_25M', net: board.nets.find(({ name }) => name === 'CLK_25M') };

/** CIE 1976 L*a*b* of an sRGB colour, IEC 61966-2-1 and CIE 15, D65; constants from memory. */
function cieLab(hex: string): [number, number, number] {
  const [r, g, b] = [1, 3, 5]
    .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((value) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4)) as [number, number, number];
  const f = (t: number) => (t > (6 / 29) ** 3 ? Math.cbrt(t) : t / (3 * (6 / 29) ** 2) + 4 / 29);
  const x = f((0.4124564 * r + 0.3575761 * g + 0.1804375 * b) / 0.95047);
  const y = f(0.2126729 * r + 0.7151522 * g + 0.072175 * b);
  const z = f((0.0193339 * r + 0.119192 * g + 0.9503041 * b) / 1.08883);
  return [116 * y - 16, 500 * (x - y), 200 * (y - z)];
}

describe('colours of a map', () => {
  it('are evenly apart and ordered by lightness alone', () => {
    const labs = LEVEL_COLOURS.map(cieLab);
    const steps = labs.slice(1).map((lab, i) => Math.hypot(...lab.map((value, axis) => value - labs[i]![axis]!)));
    const mean = steps.reduce((sum, step) => sum + step, 0) / steps.length;
    // Rounding to 8 bits moves a colour by up to ΔE 0.5 or so.
    for (const step of steps) expect(Math.abs(step - mean)).toBeLessThan(0.12 * mean);
    const drops = labs.slice(1).map(([lightness], i) => labs[i]![0] - lightness);
    for (const drop of drops) expect(drop).toBeCloseTo((96 - 18) / 15, 0);
  });

  it('go to levels from the top of the scale down, the last one to all that is weaker', () => {
    expect([70, 67.6, 67.5, 67.4, 32.6, 30, 0, -Infinity].map((db) => colourStep(db, 70))).toEqual([
      15, 15, 14, 14, 1, 0, 0, 0,
    ]);
  });
});

describe('runs of cells', () => {
  it('cover every cell once with its own colour, whatever the pattern', () => {
    const patterns = fc.array(
      fc.record({
        column: fc.integer({ min: 0, max: 9 }),
        row: fc.integer({ min: 0, max: 7 }),
        step: fc.integer({ min: 0, max: 2 }),
      }),
      { maxLength: 90 },
    );
    fc.assert(
      fc.property(patterns, (cells) => {
        const wanted = new Map(cells.map(({ column, row, step }) => [`${column},${row}`, step]));
        const painted = new Map<string, number>();
        for (const [step, runs] of cellRuns(cells)) {
          for (const { column, row, width, height } of runs) {
            for (let c = column; c < column + width; c++) {
              for (let r = row; r < row + height; r++) {
                expect(painted.has(`${c},${r}`)).toBe(false);
                painted.set(`${c},${r}`, step);
              }
            }
          }
        }
        expect(painted).toEqual(new Map([...painted.keys()].map((key) => [key, wanted.get(key)])));
        expect(painted.size).toBe(wanted.size);
      }),
      { seed: 83 },
    );
  });

  it('make one rectangle of a plain board and five of one with a hole', () => {
    const cells = Array.from({ length: 640 }, (_, i) => ({ column: i % 32, row: Math.floor(i / 32), step: 4 }));
    expect([...cellRuns(cells).values()].flat()).toEqual([{ column: 0, row: 0, width: 32, height: 20 }]);
    const holed = cells.filter(({ column, row }) => column !== 9 || row < 5 || row > 7);
    expect([...cellRuns(holed).values()].flat()).toHaveLength(4);
  });
});

describe('current on the plane', () => {
  const figure = currentFigure(map, board, clock)!.source;
  const numbers = (pattern: RegExp) => figure.match(pattern)!.slice(1).map(Number);

  it('lies where the board lies: the first cell begins at the outline’s corner, its side in the board’s scale', () => {
    const [x, y, scaleX, scaleY] = numbers(
      /class="cells" transform="translate\(([\d.]+) ([\d.]+)\) scale\(([\d.]+) (-[\d.]+)\)"/,
    );
    const [left, bottom, right] = numbers(/class="outline" d="M([\d.]+) ([\d.]+)L([\d.]+)/);
    // Outline from (0, 0) to 92 mm; cells of 4 mm from (0, 0).
    expect(x).toBeCloseTo(left!, 1);
    expect(y).toBeCloseTo(bottom!, 1);
    expect(scaleX).toBeCloseTo(((right! - left!) / 92) * 4, 2);
    expect(scaleY).toBe(-scaleX!);
  });

  it('gives the strongest cell the strongest colour and leaves the slot open', () => {
    const strongest = map.cells.reduce((one, other) => (other.densityRmsAPerM > one.densityRmsAPerM ? other : one));
    const [column, row] = strongest.atM.map((value) => Math.floor(value / 4e-3));
    const paths = [...figure.matchAll(/class="s(\d+)" d="([^"]+)"/g)].map(([, step, d]) => ({
      step: Number(step),
      runs: [...d!.matchAll(/M(\d+) (\d+)h(\d+)v(\d+)h-\d+z/g)].map((run) => run.slice(1).map(Number)),
    }));
    const stepAt = (c: number, r: number) =>
      paths.find(({ runs }) => runs.some(([x, y, w, h]) => c >= x! && c < x! + w! && r >= y! && r < y! + h!))?.step;
    // 20·log10(density / 1 µA/m); the scale ends at the next 5 dB, a colour is 2.5 dB.
    const db = 20 * Math.log10(strongest.densityRmsAPerM * 1e6);
    const topDb = Math.ceil(db / 5) * 5;
    expect(stepAt(column!, row!)).toBe(15 - Math.floor((topDb - db) / 2.5));
    expect(figure).toContain(`>${topDb} (`);
    expect(stepAt(14, 5)).toBeUndefined();
    expect(paths.flatMap(({ runs }) => runs).reduce((sum, [, , w, h]) => sum + w! * h!, 0)).toBe(map.cells.length);
  });

  it('says each level of its bar in amperes per metre too', () => {
    // 60 dBµA/m = 10³ µA/m.
    const [, text] = figure.match(/>60 \(([^)]*)\)</)!;
    expect(text).toBe('1 mA/m');
  });

  it('names the main contributor and the cables over the map', () => {
    for (const name of ['CLK_25M', 'damper cable', 'supply cable']) expect(figure).toContain(`>${name}</text>`);
    expect(figure.match(/class="over-line"/g)).toHaveLength(1);
    expect(currentFigure(map, board, undefined)!.source).not.toContain('over-line');
    const loop = board.loops[0]!;
    expect(currentFigure(map, board, { name: loop.name, loopM: loop.pointsM })!.source).toContain('class="over-line"');
  });

  it('draws no plane without current, and stays small with 5000 cells', () => {
    const silent = { ...map, cells: map.cells.map((cell) => ({ ...cell, densityRmsAPerM: 0 })) };
    expect(currentFigure(silent, board, clock)).toBeUndefined();
    expect(currentFigure({ ...map, cells: [] }, board, clock)).toBeUndefined();
    const smooth: StructureCurrentMap = {
      ...map,
      cellM: 1e-3,
      cells: Array.from({ length: 5000 }, (_, i) => {
        const [column, row] = [i % 92, Math.floor(i / 92)];
        return {
          atM: [1e-3 * (column + 0.5), 1e-3 * (row + 0.5)],
          densityRmsAPerM: 1e-3 / (1 + Math.hypot(column - 30, row - 20)),
        };
      }),
    };
    expect(currentFigure(smooth, board, clock)!.source.length).toBeLessThan(40_000);
    // No two neighbours alike: the worst there is.
    const rough = {
      ...smooth,
      cells: smooth.cells.map((cell, i) => ({ ...cell, densityRmsAPerM: 1e-6 * 10 ** (i % 3) })),
    };
    expect(currentFigure(rough, board, clock)!.source.length).toBeLessThan(110_000);
  });
});

describe('current along the cables', () => {
  const figure = cableFigure(map, board)!.source;

  it('draws the current over the length, to one ampere scale for all cables', () => {
    const curves = [...figure.matchAll(/class="cable-current" d="([^"]+)"/g)].map(([, d]) =>
      d!
        .slice(1)
        .split('L')
        .map((pair) => pair.split(' ').map(Number)),
    );
    expect(curves).toHaveLength(2);
    const labelY = (ua: number) => Number(figure.match(new RegExp(`<text[^>]* y="([\\d.]+)">${ua}</text>`))![1]) - 3.5;
    const yOf = (ua: number) => labelY(0) + ((labelY(20) - labelY(0)) / 20) * ua;
    for (const [i, cable] of map.cables.entries()) {
      const mostA = Math.max(...cable.currentRmsA);
      // The largest value is the highest point of its curve.
      expect(Math.min(...curves[i]!.map(([, y]) => y!))).toBeCloseTo(yOf(mostA * 1e6), 1);
      // Points every 20 mm are evenly spaced, bends included.
      const xs = curves[i]!.map(([x]) => x!);
      const spacing = (xs.at(-1)! - xs[0]!) / (cable.pointsM.length - 1);
      for (const [n, x] of xs.entries()) expect(Math.abs(x - xs[0]! - n * spacing)).toBeLessThan(0.02);
    }
    expect(plainText(readPage(figure))).toContain('largest 40 µA at 0.3');
  });

  it('measures along bends', () => {
    expect(
      distancesAlong([
        [0, 0, 0],
        [3, 0, 0],
        [3, 4, 0],
        [3, 4, -12],
      ]),
    ).toEqual([0, 3, 7, 19]);
  });

  it('leaves out what is no cable and keeps the six with the largest current', () => {
    expect(cableFigure({ ...map, cables: [] }, board)).toBeUndefined();
    expect(
      cableFigure({ ...map, cables: [{ name: 'x', pointsM: [[0, 0, 0]], currentRmsA: [1] }] }, board),
    ).toBeUndefined();
    const many = Array.from({ length: 9 }, (_, i) => ({
      ...map.cables[0]!,
      name: `C${i}`,
      currentRmsA: map.cables[0]!.currentRmsA.map((currentA) => currentA * (i + 1)),
    }));
    const names = plainText(readPage(cableFigure({ ...map, cables: many }, board)!.source)).match(/C\d/g);
    expect(names).toEqual(['C8', 'C7', 'C6', 'C5', 'C4', 'C3']);
  });

  it('draws a cable without any current', () => {
    const silent = map.cables.map((cable) => ({ ...cable, currentRmsA: cable.currentRmsA.map(() => 0) }));
    expect(cableFigure({ ...map, cables: silent }, board)!.source).not.toMatch(/NaN|Infinity/);
  });
});

describe('section', () => {
  it('has a figure with level, margin and main contributor for each map; three at most; nothing without', () => {
    const result = sampleResult();
    const text = plainText(readPage(`<div>${sectionMarkup(currentsSection(result, board)).source}</div>`));
    expect(text).toMatch(/125 MHz: 42\.3 dBµV\/m, margin −2\.3 dB; mainly CLK_25M via damper cable/);
    expect(sectionMarkup(currentsSection(resultWith(result.points), board)).source).toBe('');
    const more = { ...result, currentMaps: Array.from({ length: 5 }, (_, i) => sampleCurrentMap(100e6 + i)) };
    expect(sectionMarkup(currentsSection(more, board)).source.match(/<h3>/g)).toHaveLength(3);
  });
});
