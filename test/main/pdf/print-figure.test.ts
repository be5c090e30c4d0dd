import { describe, expect, it } from 'vitest';
import { boardFigure } from '../../../app/report/figures/board-figure.ts';
import { cableFigure } from '../../../app/report/figures/cable-figure.ts';
import { currentFigure } from '../../../app/report/figures/current-figure.ts';
import { layerFigure } from '../../../app/report/figures/layer-figure.ts';
import { marginStrip } from '../../../app/report/figures/margin-strip.ts';
import { inlineMark } from '../../../app/report/figures/marks.ts';
import { siteFigure } from '../../../app/report/figures/site-figure.ts';
import { spectrumFigure } from '../../../app/report/figures/spectrum-figure.ts';
import { type Markup, markup } from '../../../app/report/markup.ts';
import { LIGHT } from '../../../app/report/palette.ts';
import { printFigure } from '../../../main/pdf/print-figure.ts';
import { StyleSheet } from '../../../main/pdf/style-sheet.ts';
import { readPage } from '../../report/html-reader.ts';
import { hostileBoard, hostileResult } from '../../support/hostile-names.ts';
import { SAMPLE_LIMIT_LINES, sampleResult } from '../../support/sample-result.ts';
import { sampleResultBoard } from '../../support/sample-result-board.ts';

const lines = SAMPLE_LIMIT_LINES.slice(0, 1);
const result = sampleResult();
const board = sampleResultBoard();
const map = result.currentMaps![0]!;
const figures: readonly Markup[] = [
  spectrumFigure(result, lines),
  marginStrip(result, lines),
  boardFigure(board, result),
  layerFigure(board, result)!,
  siteFigure(board, result),
  currentFigure(map, board, undefined)!,
  cableFigure(map, board)!,
  inlineMark('short', 'short'),
];

describe('style sheet', () => {
  const element = (name: string, ...classes: string[]) => ({ name, classes: new Set(classes) });
  const sheet = new StyleSheet(
    '.a,.b{fill:var(--ink);stroke:red} .a .c{fill:none}.a .c.d{stroke-width:2}text{fill:blue}path.c{stroke:green}',
    new Map([['ink', '#123456']]),
  );

  it('takes lists, descendants, tags and variables, the more specific and then the later', () => {
    const outer = element('g', 'a');
    expect(Object.fromEntries(sheet.styleOf([outer]))).toEqual({ fill: '#123456', stroke: 'red' });
    // Two classes are more than tag and class: `none` stays whatever the order.
    expect(Object.fromEntries(sheet.styleOf([outer, element('g'), element('path', 'c')]))).toEqual({
      fill: 'none',
      stroke: 'green',
    });
    expect(sheet.styleOf([outer, element('rect', 'c', 'd')]).get('stroke-width')).toBe('2');
    expect(sheet.styleOf([element('path', 'c')]).has('fill')).toBe(false);
    expect(sheet.styleOf([element('text', 'b')]).get('fill')).toBe('#123456');
    expect(sheet.styleOf([element('text')]).get('fill')).toBe('blue');
  });
});

describe('printed figures', () => {
  it('stand alone: no class, no variable, every reference within', () => {
    const colours = new Set([...LIGHT.values(), 'none']);
    for (const figure of figures) {
      const source = printFigure(figure);
      const { elements } = readPage(source);
      expect(elements[0]!.name).toBe('svg');
      expect(source.search(/class=|var\(|style=|href/)).toBe(-1);
      const ids = elements.flatMap(({ attributes }) => attributes.id ?? []);
      expect(new Set(ids).size).toBe(ids.length);
      for (const [, id] of source.matchAll(/url\(#([^)]+)\)/g)) expect(ids).toContain(id);
      for (const { attributes } of elements) {
        for (const paint of [attributes.fill, attributes.stroke]) {
          if (paint !== undefined && !paint.startsWith('url(#')) expect(colours).toContain(paint);
        }
      }
    }
  });

  it('keep every shape and every text', () => {
    for (const figure of figures) {
      const before = readPage(figure.source);
      const after = readPage(printFigure(figure));
      const shapes = (page: typeof before) =>
        page.elements.filter(({ name }) => ['path', 'rect', 'circle'].includes(name)).length;
      const hatch = printFigure(figure).includes('id="hatch"') && !figure.source.includes('id="hatch"') ? 1 : 0;
      expect(shapes(after)).toBe(shapes(before) + hatch);
      expect(new Set(after.texts.map(({ text }) => text))).toEqual(new Set(before.texts.map(({ text }) => text)));
    }
  });

  it('mark over, short and fine by shape and fill', () => {
    const painted = (standing: 'over' | 'short' | 'fine') =>
      readPage(printFigure(inlineMark(standing, standing)))
        .elements.filter(({ name }) => name === 'path')
        .map(({ attributes }) => attributes.fill);
    expect(painted('over')).toEqual([LIGHT.get('over')]);
    expect(painted('short')).toEqual([LIGHT.get('paper'), LIGHT.get('short-fill')]);
    expect(painted('fine')).toEqual([LIGHT.get('paper')]);
  });

  it('draw a halo below its text', () => {
    const source = printFigure(markup`<svg class="figure"><text class="label halo" x="1" y="2">A &amp; B</text></svg>`);
    const texts = [...source.matchAll(/<text([^>]*)>([^<]*)<\/text>/g)];
    expect(texts.map(([, , text]) => text)).toEqual(['A &amp; B', 'A &amp; B']);
    expect(texts[0]![1]).toContain(`stroke="${LIGHT.get('paper')}"`);
    expect(texts[1]![1]).not.toContain('stroke');
    expect(texts[1]![1]).toContain(`fill="${LIGHT.get('ink')}"`);
  });

  it('write out characters without a glyph and keep hostile names inside', () => {
    const source = printFigure(markup`<svg><text>${'中 → <b>'}</text></svg>`);
    expect(source).toBe('<svg><text>\\u{4e2d} <tspan font-family="Mono">→</tspan> &lt;b&gt;</text></svg>');
    const hostile = printFigure(boardFigure(hostileBoard(), hostileResult()));
    const names = new Set(readPage(hostile).elements.map(({ name }) => name));
    expect([...names].sort()).toEqual(
      ['circle', 'clipPath', 'defs', 'g', 'path', 'rect', 'svg', 'text', 'tspan'].filter((name) => names.has(name)),
    );
  });
});
