import { describe, expect, it } from 'vitest';
import type { Board } from '../../app/board/board.ts';
import { frequencyTicks, roundStep } from '../../app/report/figures/axis.ts';
import { boardFigure } from '../../app/report/figures/board-figure.ts';
import { layerFigure } from '../../app/report/figures/layer-figure.ts';
import { clipLine } from '../../app/report/figures/limit-lines.ts';
import { marginStrip } from '../../app/report/figures/margin-strip.ts';
import { placeLabels } from '../../app/report/figures/place-labels.ts';
import { siteFigure } from '../../app/report/figures/site-figure.ts';
import { spectrumFigure } from '../../app/report/figures/spectrum-figure.ts';
import { denseResult, resultWith, SAMPLE_LIMIT_LINES, sampleResult } from '../support/sample-result.ts';
import { sampleResultBoard } from '../support/sample-result-board.ts';
import { readPage } from './html-reader.ts';

const quasiPeak = SAMPLE_LIMIT_LINES.slice(0, 1);

/** First x and y of every subpath of the elements with this class. */
function startsOf(source: string, className: string): [x: number, y: number][] {
  return readPage(source)
    .elements.filter(({ attributes }) => attributes.class === className)
    .flatMap(({ attributes }) => [...(attributes.d ?? '').matchAll(/M(-?[\d.]+) (-?[\d.]+)/g)])
    .map(([, x, y]): [number, number] => [Number(x), Number(y)]);
}

/** Place of the text element that says exactly this. */
function placeOf(source: string, label: string): [x: number, y: number] {
  const found = source.match(new RegExp(`<text[^>]* x="(-?[\\d.]+)" y="(-?[\\d.]+)">${label}</text>`));
  if (!found) throw new Error(`no text "${label}"`);
  return [Number(found[1]), Number(found[2])];
}

describe('frequency axis', () => {
  it('is logarithmic and labelled at 30, 50, 100, 200, 300, 500 MHz and 1 GHz', () => {
    const labels = frequencyTicks(30e6, 1e9).flatMap(({ label }) => label ?? []);
    expect(labels).toEqual(['30 MHz', '50 MHz', '100 MHz', '200 MHz', '300 MHz', '500 MHz', '1 GHz']);
    const { source } = spectrumFigure(sampleResult(), quasiPeak);
    const x = (label: string) => placeOf(source, label)[0];
    // Equal ratios are equal lengths: 30 → 300 MHz is a decade like 100 MHz → 1 GHz, 50 → 500 too.
    expect(x('300 MHz') - x('30 MHz')).toBeCloseTo(x('1 GHz') - x('100 MHz'), 1);
    expect(x('500 MHz') - x('50 MHz')).toBeCloseTo(x('1 GHz') - x('100 MHz'), 1);
  });
});

describe('spectrum', () => {
  it('puts a mark of its own kind at every reading', () => {
    const { source } = spectrumFigure(sampleResult(), quasiPeak);
    const rims = readPage(source).elements.filter(({ attributes }) => attributes.class === 'rim');
    const counts = rims.map(({ attributes }) => attributes.d!.match(/M/g)!.length);
    expect(counts).toEqual([35, 3, 1]);
    expect(readPage(source).elements.filter(({ attributes }) => attributes.class === 'half')).toHaveLength(1);
  });

  it('places levels by the dB grid: the reading at 125 MHz lies where its number says', () => {
    const result = sampleResult();
    const { source } = spectrumFigure(result, quasiPeak);
    const at40 = placeOf(source, '40')[1];
    const at20 = placeOf(source, '20')[1];
    expect(at40).toBeLessThan(at20);
    const worst = result.points[0]!;
    const expectedY = at40 + ((40 - worst.levelDbuvPerM) / 20) * (at20 - at40);
    // Numbers sit 3.5 px under their line; the triangle starts at its tip, 5 px above the level.
    const tip = source.match(/class="mark over"><path class="rim" d="M([\d.]+) ([\d.]+)/)!;
    expect(Number(tip[2]) + 5 + 3.5).toBeCloseTo(expectedY, 1);
    const decade = placeOf(source, '1 GHz')[0] - placeOf(source, '100 MHz')[0];
    expect(Number(tip[1])).toBeCloseTo(placeOf(source, '100 MHz')[0] + decade * Math.log10(1.25), 1);
  });

  it('draws horizontal readings as lying and vertical ones as standing dashes', () => {
    const { source } = spectrumFigure(sampleResult(), quasiPeak);
    const dash = (className: string) =>
      source.match(new RegExp(`class="${className}" d="M([\\d.]+) ([\\d.]+)L([\\d.]+) ([\\d.]+)`))!;
    const lying = dash('pol-h');
    const standing = dash('pol-v');
    expect(lying[2]).toBe(lying[4]);
    expect(Number(lying[3])).toBeGreaterThan(Number(lying[1]));
    expect(standing[1]).toBe(standing[3]);
    expect(Number(standing[4])).toBeGreaterThan(Number(standing[2]));
  });

  it('names the limit at its end and cuts it at the judged range', () => {
    const { source } = spectrumFigure(sampleResult(), SAMPLE_LIMIT_LINES);
    expect(source).toContain('>47 dBµV/m</text>');
    expect(source).not.toContain('70 dBµV/m');
    expect(clipLine(SAMPLE_LIMIT_LINES[1]!.points, 30e6, 2e9)).toEqual([
      [1e9, 50],
      [2e9, 50],
    ]);
    expect(clipLine(SAMPLE_LIMIT_LINES[1]!.points, 30e6, 900e6)).toEqual([]);
    // The average line begins where the range ends: nothing of it is judged.
    expect(clipLine(SAMPLE_LIMIT_LINES[1]!.points, 30e6, 1e9)).toEqual([]);
    // A slope over log f: half-way in log between 30 and 230 MHz the 42 → 35 line is at 38.5.
    const middleHz = Math.sqrt(30e6 * 230e6);
    const sloped = clipLine(
      [
        [30e6, 42],
        [230e6, 35],
      ],
      30e6,
      middleHz,
    );
    expect(sloped.at(-1)![1]).toBeCloseTo(38.5, 9);
  });

  it('keeps the worst reading when thousands share the columns', () => {
    const dense = denseResult(5000);
    const peak = dense.points[0]!;
    // Over the limit by lines that add up in the bandwidth: neither polarisation by itself stands out.
    const spike = {
      ...peak,
      frequencyHz: 612.345e6,
      levelDbuvPerM: 52,
      limitDbuvPerM: 47,
      marginDb: -5,
      horizontalDbuvPerM: 1,
      verticalDbuvPerM: 2,
    };
    const { source } = spectrumFigure(resultWith([...dense.points, spike]), SAMPLE_LIMIT_LINES);
    expect(source).toMatch(/class="mark over"/);
    expect(source).toContain('612.345 MHz, −5.0 dB');
    expect(source.length).toBeLessThan(120_000);
  });

  it('hangs ticks by their margin from one limit line', () => {
    const result = sampleResult();
    const { source } = marginStrip(result, quasiPeak);
    const zeroY = placeOf(source, '0')[1] - 3.5;
    const tenY = placeOf(source, '−10')[1] - 3.5;
    const over = source.match(/class="tick over" d="M[\d.]+ ([\d.]+)V([\d.]+)/)!;
    expect(Number(over[1])).toBeCloseTo(zeroY, 1);
    expect(zeroY - Number(over[2])).toBeCloseTo((-result.points[0]!.marginDb / 10) * (tenY - zeroY), 1);
  });
});

describe('board', () => {
  const board = sampleResultBoard();
  const { source } = boardFigure(board, sampleResult());

  it('draws one scale on both axes, y up, and a bar as long as it says', () => {
    const [corner] = startsOf(source, 'outline');
    const outline = source.match(/class="outline" d="(M[^Z]+)Z/)![1]!;
    const points = outline
      .split(/[ML]/)
      .slice(1)
      .map((pair) => pair.split(' ').map(Number));
    // Outline: (0,0) (92,0) (92,50) (84,58) (0,58) mm.
    const pxPerMm = (points[1]![0]! - corner![0]) / 92;
    expect(corner![1] - points[4]![1]!).toBeCloseTo(58 * pxPerMm, 1);
    expect(points[2]![1]!).toBeGreaterThan(points[3]![1]!);
    const bar = source.match(/class="ruler scale-bar" d="M([\d.]+) [\d.]+v6M[\d.]+ [\d.]+H([\d.]+)/)!;
    const length = Number(source.match(/>(\d+) mm<\/text>/)![1]);
    expect((Number(bar[2]) - Number(bar[1])) / pxPerMm).toBeCloseTo(length, 1);
  });

  it('numbers the rulers in board millimetres', () => {
    const outline = startsOf(source, 'outline')[0]!;
    const [x40] = placeOf(source, '40');
    const [x80] = placeOf(source, '80');
    const pxPerMm = (x80 - x40) / 40;
    expect(x40 - 40 * pxPerMm).toBeCloseTo(outline[0], 1);
  });

  it('names driven nets, loops, cables and their pins', () => {
    const { texts } = readPage(source);
    const names = texts.filter(({ element }) => element === 'text').map(({ text }) => text);
    for (const name of [
      'CLK_25M',
      'SPI_SCK',
      'DATA0',
      'DATA1',
      'converter loop',
      'damper cable',
      'sensor cable',
      'U4.11',
    ]) {
      expect(names).toContain(name);
    }
    expect(names).not.toContain('N$1');
    expect(startsOf(source, 'pin drive')).toHaveLength(4);
    expect(startsOf(source, 'pin load')).toHaveLength(4);
  });

  it('draws the top copper solid also under a solder mask, deeper copper dashed', () => {
    const mask = { ...board.stackup[1]!, name: 'mask' };
    const down = <Item extends { readonly layerIndex: number }>(items: readonly Item[]) =>
      items.map((item) => ({ ...item, layerIndex: item.layerIndex + 1 }));
    const masked: Board = {
      ...board,
      stackup: [mask, ...board.stackup],
      planes: down(board.planes),
      nets: board.nets.map((net) => ({ ...net, traces: down(net.traces), pins: down(net.pins) })),
    };
    const groups = (figure: string) =>
      ['driven below', 'driven'].map((name) => figure.split(`<g class="${name}">`)[1]!.split('</g>')[0]);
    expect(groups(boardFigure(masked, sampleResult()).source)).toEqual(groups(source));
    const [below, top] = groups(source);
    expect(below!.match(/M/g)).toHaveLength(1);
    expect(top!.match(/M/g)).toHaveLength(5);
  });

  it('shows every used layer, and no second picture for a single one', () => {
    const layers = layerFigure(board, sampleResult())!;
    for (const name of ['L1 TOP', 'L2 GND', 'L3 PWR', 'L4 BOT']) expect(layers.source).toContain(`>${name}</text>`);
    const single: Board = {
      ...board,
      planes: [],
      nets: [{ name: 'A', traces: board.nets[1]!.traces, vias: [], pins: [] }],
    };
    expect(layerFigure(single, sampleResult())).toBeUndefined();
  });
});

describe('set-up', () => {
  it('keeps the proportions of table, distance and antenna travel', () => {
    const { source } = siteFigure(sampleResultBoard(), sampleResult());
    const [highX, highY] = placeOf(source, '4 m');
    const [, lowY] = placeOf(source, '1 m');
    const pxPerM = (lowY - highY) / 3;
    const groundY = Number(source.match(/class="ground" d="M[\d.]+ ([\d.]+)/)![1]);
    const tableY = Number(source.match(/class="table" d="M[\d.]+ ([\d.]+)/)![1]);
    expect((groundY - tableY) / pxPerM).toBeCloseTo(0.8, 2);
    const dimension = source.match(/class="ruler" d="M([\d.]+) [\d.]+H([\d.]+)M/)!;
    expect((Number(dimension[2]) - Number(dimension[1])) / pxPerM).toBeCloseTo(3, 2);
    // 3 m from the boundary puts the antenna at 3 m plus the boundary's radius from the axis.
    const axisX = Number(source.match(/class="axis" d="M([\d.]+)/)![1]);
    expect((highX - 9 - axisX) / pxPerM).toBeCloseTo(3 + 0.2593, 2);
  });

  it('fits at 3 m, 10 m and 30 m: from the top number to the text under the ground, clear of the plan view', () => {
    for (const distanceM of [3, 10, 30]) {
      const base = sampleResult();
      const { source } = siteFigure(sampleResultBoard(), { ...base, site: { ...base.site, distanceM } });
      const [x, y] = placeOf(source, '4 m');
      expect(y).toBeGreaterThan(16);
      expect(x).toBeLessThan(440);
      const height = Number(source.match(/viewBox="0 0 760 (\d+)"/)![1]);
      for (const [, textY] of source.matchAll(/<text[^>]* y="([\d.]+)"/g))
        expect(Number(textY)).toBeLessThan(height - 2);
    }
  });

  it('turns to the worst line: the arrow points along its azimuth', () => {
    const result = sampleResult();
    const { source } = siteFigure(sampleResultBoard(), result);
    const arrow = source
      .match(/class="arrow" d="M([\d.]+) ([\d.]+)L([\d.]+) ([\d.]+)/)!
      .slice(1)
      .map(Number);
    const deg = (Math.atan2(arrow[1]! - arrow[3]!, arrow[2]! - arrow[0]!) * 180) / Math.PI;
    expect((deg + 360) % 360).toBeCloseTo(result.points[0]!.turntableDeg, 0);
  });
});

describe('labels', () => {
  it('never overlap one another or an obstacle, and stay inside', () => {
    const bounds = { left: 0, top: 0, right: 300, bottom: 120 };
    const obstacles = [{ left: 100, top: 40, right: 160, bottom: 80 }];
    const requests = Array.from({ length: 40 }, (_, i) => ({
      text: `label ${i}`,
      anchor: [(i * 37) % 300, (i * 23) % 120] as const,
    }));
    const placed = placeLabels(requests, { bounds, fontPx: 10, obstacles });
    expect(placed.length).toBeGreaterThan(8);
    const boxes = placed.map(({ at, text }) => ({
      left: at[0],
      top: at[1] - 7.5,
      right: at[0] + text.length * 5.8,
      bottom: at[1] + 2.5,
    }));
    const meet = (a: (typeof boxes)[number], b: (typeof boxes)[number]) =>
      a.left < b.right - 1e-6 && b.left < a.right - 1e-6 && a.top < b.bottom - 1e-6 && b.top < a.bottom - 1e-6;
    for (const [i, box] of boxes.entries()) {
      for (const other of [...boxes.slice(0, i), ...obstacles]) expect(meet(box, other)).toBe(false);
      expect(box.left).toBeGreaterThanOrEqual(0);
      expect(box.right).toBeLessThanOrEqual(300 + 1e-6);
    }
  });

  it('round steps are 1, 2 or 5 times a power of ten', () => {
    expect(roundStep(92, 10)).toBe(10);
    expect(roundStep(101, 10)).toBe(20);
    expect(roundStep(201, 10)).toBe(50);
    expect(roundStep(0.05, 10)).toBeCloseTo(0.005, 12);
  });
});
