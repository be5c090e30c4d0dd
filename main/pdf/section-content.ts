import type { Content } from 'pdfmake/interfaces.js';
import type { Block, Section, Text } from '../../app/report/blocks.ts';
import type { Markup } from '../../app/report/markup.ts';
import { factsContent } from './facts-content.ts';
import { printableText } from './fonts.ts';
import { INK, NOTE_PT, type PageRoom, QUIET, RULE_PT, TEXT_PT } from './page.ts';
import { printFigure } from './print-figure.ts';
import { shareRows } from './shares-content.ts';
import { type TableTitle, tableContent } from './table-content.ts';
import { hasPicture, plainRuns, textContent } from './text-content.ts';

const TITLE_PT = 11.5;
const HEADING_PT = 9;
const BEFORE_SECTION_PT = 9;
/** Room that a figure leaves for its title and key on a page of its own. */
const FIGURE_SPARE_PT = 90;
const KEY_PT = 7;
const KEPT_ITEMS = 2;
const SHORT_TABLE_ROWS = 12;
const SHORT_TABLE_CHARACTERS = 1200;

/** A heading that waits for what it belongs to. */
type Pending = (isInTable: boolean) => Content;

/** Contents in order; a heading never stands alone at the foot of a page. */
export function sectionContent({ title, blocks }: Section, room: PageRoom): Content[] {
  if (blocks.length === 0) return [];
  return new Flow(room, title).add(blocks).contents();
}

/** Content of its own kind under a section's title, on one page. */
export const titledContent = (title: string, content: Content, room: PageRoom): Content =>
  together([titleContent(title, room, true), content]);

class Flow {
  readonly #room: PageRoom;
  readonly #out: Content[] = [];
  #pending: Pending[] = [];
  #bookmark: string | undefined;

  constructor(room: PageRoom, title?: string) {
    this.#room = room;
    if (title === undefined) return;
    this.#bookmark = printableText(title);
    this.#pending.push((isInTable) => titleContent(title, room, !isInTable));
  }

  add(blocks: readonly Block[]): this {
    for (let i = 0; i < blocks.length; i++) {
      const block = blocks[i]!;
      const next = blocks[i + 1];
      const isShort = block.kind === 'table' && isShortTable(block);
      if (isShort && next?.kind === 'paragraph' && next.style === 'note') {
        this.#out.push(together([this.#tableOf(block), paragraphContent(next.text, next.style)]));
        i++;
      } else if (isShort) this.#out.push(together([this.#tableOf(block)]));
      else if (block.kind === 'paragraph' && next && staysWhole(next)) {
        this.#pending.push(() => paragraphContent(block.text, block.style));
      } else this.#addBlock(block);
    }
    return this;
  }

  contents(): Content[] {
    return this.#pending.length > 0 ? [...this.#out, ...this.#take()] : this.#out;
  }

  #addBlock(block: Block): void {
    const room = this.#room;
    switch (block.kind) {
      case 'heading':
        this.#pending.push(() => headingContent(block.text));
        return;
      case 'paragraph': {
        const content = () => paragraphContent(block.text, block.style);
        if (block.style === 'lead') this.#pending.push(content);
        else this.#kept([content()]);
        return;
      }
      case 'facts':
        this.#kept([factsContent(block.facts, room)]);
        return;
      case 'table':
        this.#out.push(this.#tableOf(block));
        return;
      case 'list':
        this.#addList(block.items, block.isNumbered === true);
        return;
      case 'figure':
        this.#kept([...block.pictures.map((picture) => pictureContent(picture, room)), ...keyContent(block.captions)]);
        return;
      case 'shares': {
        const [first, ...others] = shareRows(block.groups, room);
        if (first) this.#kept([first]);
        this.#out.push(...others.map((content) => together([content])));
        return;
      }
      case 'together':
        this.#kept(new Flow(room).add(block.blocks).contents());
        return;
      case 'side by side': {
        const count = block.columns.length;
        const gapPt = 20;
        const inner = { ...room, widthPt: (room.widthPt - gapPt * (count - 1)) / count };
        const columns = block.columns.map((blocks) => ({ stack: new Flow(inner).add(blocks).contents() }));
        this.#kept([{ columns, columnGap: gapPt }]);
      }
    }
  }

  #tableOf({ columns, rows, table }: Block & { kind: 'table' }): Content {
    return tableContent(columns, rows, table, this.#room, this.#takeTitle());
  }

  /** The first items stay with the heading, the others may go to the next page. */
  #addList(items: readonly Text[], isNumbered: boolean): void {
    const listOf = (from: number, to?: number): Content => {
      const contents = items
        .slice(from, to)
        .map((item) => ({ text: plainRuns(item), margin: [0, 0.8, 0, 0.8] }) as Content);
      const style = { fontSize: TEXT_PT - 0.4, markerColor: QUIET };
      return isNumbered ? { ol: contents, start: from + 1, ...style } : { ul: contents, ...style };
    };
    if (items.length === 0) return;
    this.#kept([listOf(0, KEPT_ITEMS)]);
    if (items.length > KEPT_ITEMS) this.#out.push(listOf(KEPT_ITEMS));
  }

  /** Puts contents down together with the headings that wait for them. */
  #kept(contents: readonly Content[]): void {
    this.#out.push(together([...this.#take(), ...contents]));
  }

  #take(): Content[] {
    const contents = this.#pending.map((make) => make(false));
    this.#pending = [];
    this.#bookmark = undefined;
    return contents;
  }

  #takeTitle(): TableTitle {
    const title = {
      contents: this.#pending.map((make) => make(true)),
      ...(this.#bookmark !== undefined && { bookmark: this.#bookmark }),
    };
    this.#pending = [];
    this.#bookmark = undefined;
    return title;
  }
}

/** A text before it stays with it: no page breaks within. */
const staysWhole = (block: Block): boolean =>
  block.kind === 'figure' || (block.kind === 'table' && isShortTable(block));

/** Short enough to stay on one page, whatever its names are. */
const isShortTable = ({ rows }: Block & { kind: 'table' }): boolean =>
  rows.length <= SHORT_TABLE_ROWS &&
  rows.flat().reduce<number>((sum, text) => sum + lengthOf(text), 0) < SHORT_TABLE_CHARACTERS;

const lengthOf = (text: Text): number => plainRuns(text).reduce((sum, run) => sum + run.text.length, 0);

const together = (contents: readonly Content[]): Content => ({ stack: [...contents], unbreakable: true });

function titleContent(title: string, room: PageRoom, isBookmarked: boolean): Content {
  return {
    stack: [
      { canvas: [{ type: 'line', x1: 0, y1: 0, x2: room.widthPt, y2: 0, lineWidth: RULE_PT, lineColor: INK }] },
      {
        text: plainRuns(title),
        bold: true,
        fontSize: TITLE_PT,
        margin: [0, 2.5, 0, 3.5],
        ...(isBookmarked && { outline: true, outlineText: printableText(title) }),
      } as Content,
    ],
    margin: [0, BEFORE_SECTION_PT, 0, 0],
  };
}

const headingContent = (text: Text): Content =>
  ({ text: plainRuns(text), bold: true, fontSize: HEADING_PT, margin: [0, 6, 0, 2] }) as Content;

function paragraphContent(text: Text, style: 'note' | 'lead' | undefined): Content {
  const isNote = style !== undefined;
  return textContent(text, {
    fontSize: isNote ? NOTE_PT : TEXT_PT,
    ...(isNote && { color: QUIET }),
    margin: [0, 2, 0, 3],
  });
}

const pictureContent = (picture: Markup, room: PageRoom): Content => ({
  svg: printFigure(picture),
  fit: [room.widthPt, room.heightPt - FIGURE_SPARE_PT],
  margin: [0, 2, 0, 2],
});

/** The key of a figure: one row of marks, then what needs no mark as one paragraph. */
function keyContent(captions: readonly Text[]): Content[] {
  const marked = captions.filter(hasPicture);
  const plain = captions.filter((caption) => !hasPicture(caption));
  const style = { fontSize: NOTE_PT, color: QUIET };
  return [
    ...(marked.length > 0 ? [textContent(marked, { ...style, margin: [0, 1, 0, 0] }, KEY_PT)] : []),
    ...(plain.length > 0
      ? [
          {
            text: plain.flatMap((caption, i) => [...(i > 0 ? [{ text: '  ' }] : []), ...plainRuns(caption)]),
            ...style,
            margin: [0, 1, 0, 2],
          } as Content,
        ]
      : []),
  ];
}
