import type { TDocumentDefinitions } from 'pdfmake/interfaces.js';

/** Reads a document definition as plain data, without laying it out. */

type Node = Readonly<Record<string, unknown>>;

const isNode = (value: unknown): value is Node => typeof value === 'object' && value !== null && !Array.isArray(value);

/** Every node of the content, in order, outer before inner. */
export function nodesOf({ content }: TDocumentDefinitions): Node[] {
  const nodes: Node[] = [];
  const visit = (value: unknown): void => {
    if (Array.isArray(value)) for (const each of value) visit(each);
    else if (isNode(value)) {
      nodes.push(value);
      for (const inner of Object.values(value)) if (typeof inner === 'object') visit(inner);
    }
  };
  visit(content);
  return nodes;
}

/** All text that is set as text, in order; runs joined, white space collapsed. */
export function textOf(definition: TDocumentDefinitions): string {
  const texts: string[] = [];
  const visit = (value: unknown): void => {
    if (typeof value === 'string') texts.push(value);
    else if (Array.isArray(value)) for (const each of value) visit(each);
    else if (isNode(value)) {
      if (Array.isArray(value.text)) {
        texts.push(value.text.map((run) => (typeof run === 'string' ? run : (run as { text: string }).text)).join(''));
      } else if (typeof value.text === 'string') texts.push(value.text);
      for (const key of ['stack', 'columns', 'ul', 'ol']) visit(value[key]);
      if (isNode(value.table)) visit(value.table.body);
    }
  };
  visit(definition.content);
  return texts.join(' ').replace(/[\s\u00a0]+/g, ' ');
}

/** The pictures, as sources. */
export const picturesOf = (definition: TDocumentDefinitions): string[] =>
  nodesOf(definition).flatMap(({ svg }) => (typeof svg === 'string' ? [svg] : []));

/** Texts of the bookmarks, in order. */
export const bookmarksOf = (definition: TDocumentDefinitions): string[] =>
  nodesOf(definition).flatMap(({ outline, outlineText }) => (outline === true ? [String(outlineText)] : []));
