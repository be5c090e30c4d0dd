import type { Block, Column, Fact, Section, ShareGroup, ShareRow, Text } from '../blocks.ts';
import { levelBar } from '../figures/bars.ts';
import { levelText } from '../format.ts';
import { type Markup, markup } from '../markup.ts';
import { printed } from '../number.ts';
import { textMarkup } from './text-markup.ts';

/** A section of the page for a screen; nothing for one without blocks. */
export function sectionMarkup({ title, blocks, isKept, className }: Section): Markup {
  if (blocks.length === 0) return markup``;
  const classes = isKept ? 'keep' : className;
  const open = classes === undefined ? markup`<section>` : markup`<section class="${classes}">`;
  return markup`${open}<h2>${title}</h2>
${blocksMarkup(blocks)}</section>`;
}

export const blocksMarkup = (blocks: readonly Block[]): Markup => markup`${blocks.map(blockMarkup)}`;

function blockMarkup(block: Block): Markup {
  switch (block.kind) {
    case 'heading':
      return markup`<h3>${textMarkup(block.text)}</h3>`;
    case 'paragraph':
      return paragraphMarkup(block.text, block.style);
    case 'facts':
      return factsMarkup(block.facts);
    case 'table':
      return tableMarkup(block.columns, block.rows, block.table);
    case 'list': {
      const items = block.items.map((item) => markup`<li>${textMarkup(item)}</li>`);
      return block.isNumbered ? markup`<ol>${items}</ol>` : markup`<ul>${items}</ul>`;
    }
    case 'figure':
      return markup`<figure>${block.pictures}${
        block.captions.length > 0 &&
        markup`<figcaption>${block.captions.map((caption) => markup`<span>${textMarkup(caption)}</span>`)}</figcaption>`
      }</figure>`;
    case 'shares':
      return markup`<div class="shares">${block.groups.map(shareMarkup)}</div>`;
    case 'together':
      return markup`<div class="keep">${blocksMarkup(block.blocks)}</div>`;
    case 'side by side':
      return markup`<div class="columns">${block.columns.map((column) => markup`<div>${blocksMarkup(column)}</div>`)}</div>`;
  }
}

function paragraphMarkup(text: Text, style: 'note' | 'lead' | undefined): Markup {
  if (style === undefined) return markup`<p>${textMarkup(text)}</p>`;
  return markup`<p class="${style === 'lead' ? 'note lead' : style}">${textMarkup(text)}</p>`;
}

export const factsMarkup = (facts: readonly Fact[]): Markup =>
  markup`<dl class="facts">${facts.map(
    ({ term, value, isWide }) =>
      markup`<div class="${isWide ? 'wide' : 'half'}"><dt>${term}</dt><dd>${textMarkup(value)}</dd></div>`,
  )}</dl>`;

function tableMarkup(columns: readonly Column[], rows: readonly (readonly Text[])[], kind: string): Markup {
  const open = kind === 'plain' ? markup`<table>` : markup`<table class="${kind}">`;
  return markup`${open}<thead><tr>${columns.map(({ head, isNumber }) => cell('th', isNumber ? 'n' : '', head))}</tr></thead>
<tbody>${rows.map((row) => markup`<tr>${row.map((text, i) => cell('td', classOf(columns[i]!), text))}</tr>`)}</tbody></table>`;
}

const classOf = ({ isNumber, isWhole, isStrong }: Column): string =>
  [isNumber && 'n', isWhole && 'whole', isStrong && 'strong'].filter((part) => part).join(' ');

function cell(element: 'th' | 'td', className: string, text: Text): Markup {
  const inside = textMarkup(text);
  if (element === 'th')
    return className === '' ? markup`<th>${inside}</th>` : markup`<th class="${className}">${inside}</th>`;
  return className === '' ? markup`<td>${inside}</td>` : markup`<td class="${className}">${inside}</td>`;
}

function shareMarkup({ title, remark, levelDbuvPerM, topDbuvPerM, rows, left }: ShareGroup): Markup {
  return markup`<table class="share"><thead><tr><th>${title} <span class="quiet">${remark}</span></th><th class="n">${printed(levelText(levelDbuvPerM))}</th><th class="quiet">dBµV/m</th></tr></thead>
<tbody>${rows.map((row) => shareRow(row, topDbuvPerM))}${
    left > 0 && markup`<tr class="path"><td colspan="3">${left} weaker in the JSON result</td></tr>`
  }</tbody></table>`;
}

function shareRow({ text, levelDbuvPerM, isPath }: ShareRow, topDb: number): Markup {
  const cells = markup`<td>${textMarkup(text)}</td><td class="n">${printed(levelText(levelDbuvPerM))}</td><td class="bars">${levelBar(levelDbuvPerM, topDb, isPath ? 'bar-path' : 'bar-whole')}</td>`;
  return isPath ? markup`<tr class="path">${cells}</tr>` : markup`<tr>${cells}</tr>`;
}
