import { SaxesParser, type SaxesTagPlain } from 'saxes';
import { FIGURE_STYLES } from '../../app/report/figures/figure-styles.ts';
import { HATCH } from '../../app/report/figures/hatch.ts';
import { type Markup, markup } from '../../app/report/markup.ts';
import { LIGHT } from '../../app/report/palette.ts';
import { fontRuns, SANS } from './fonts.ts';
import { type StyledElement, StyleSheet } from './style-sheet.ts';

const sheet = new StyleSheet(FIGURE_STYLES, LIGHT);

/** Properties that SVG knows as attributes, and the printing library draws. */
const PRINTED = new Set(
  'fill fill-rule fill-opacity stroke stroke-width stroke-dasharray stroke-linecap stroke-linejoin text-anchor font-size font-weight'.split(
    ' ',
  ),
);
/** For readers of a screen, not of paper. */
const DROPPED = new Set(['class', 'role', 'aria-label', 'aria-hidden']);

interface Open {
  readonly element: StyledElement;
  readonly attributes: string;
  readonly style: ReadonlyMap<string, string>;
}

/**
 * A figure of the report as SVG that stands alone on paper: every class and colour variable becomes an attribute of the
 * light palette, text with a halo is drawn twice, characters are those of the embedded fonts. `figure` must be one `svg` element.
 */
export function printFigure(figure: Markup): string {
  const open: Open[] = [];
  let text = '';
  let source = '';
  const parser = new SaxesParser();
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', (tag: SaxesTagPlain) => {
    const element = { name: tag.name, classes: new Set((tag.attributes.class ?? '').split(' ')) };
    const style = sheet.styleOf([...open.map((one) => one.element), element]);
    const attributes = attributesOf(tag, style);
    open.push({ element, attributes, style });
    if (tag.name !== 'text') source += `<${tag.name}${attributes}>${open.length === 1 ? ownHatch(figure) : ''}`;
  });
  parser.on('text', (piece) => {
    if (open.at(-1)?.element.name === 'text') text += piece;
  });
  parser.on('closetag', (tag) => {
    const { attributes, style } = open.pop()!;
    source += tag.name === 'text' ? textSource(text, attributes, style) : `</${tag.name}>`;
    text = '';
  });
  parser.write(figure.source).close();
  return source;
}

/** On a screen figures share the pattern of the first; on paper each stands alone. */
function ownHatch({ source }: Markup): string {
  if (!source.includes('url(#hatch)') || source.includes('id="hatch"')) return '';
  return printFigure(markup`<defs>${HATCH}</defs>`);
}

function attributesOf({ name, attributes }: SaxesTagPlain, style: ReadonlyMap<string, string>): string {
  const printed = new Map<string, string>();
  for (const [key, value] of Object.entries(attributes)) if (!DROPPED.has(key)) printed.set(key, value);
  for (const [key, value] of style) {
    if (PRINTED.has(key) && value !== 'inherit' && !(name === 'text' && key.startsWith('stroke'))) {
      printed.set(key, key === 'font-weight' ? 'bold' : value);
    }
  }
  return [...printed].map(([key, value]) => markup` ${key}="${value}"`.source).join('');
}

/** Paint order is unknown to the printing library: the halo is a text of its own below. */
function textSource(text: string, attributes: string, style: ReadonlyMap<string, string>): string {
  const spans = fontRuns(text).map(({ text: run, font }) =>
    font === SANS ? markup`${run}` : markup`<tspan font-family="${font}">${run}</tspan>`,
  );
  const inside = markup`${spans}`.source;
  const plain = `<text${attributes}>${inside}</text>`;
  if (style.get('paint-order') !== 'stroke') return plain;
  const stroke = ['stroke', 'stroke-width', 'stroke-linejoin'].map(
    (key) => markup` ${key}="${style.get(key) ?? 'none'}"`.source,
  );
  return `<text${attributes}${stroke.join('')}>${inside}</text>${plain}`;
}
