import { SaxesParser } from 'saxes';

/** What an XML reader finds in a page: the report is well-formed, so nothing depends on a browser's repairs. */
export interface PageContent {
  readonly elements: readonly { readonly name: string; readonly attributes: Readonly<Record<string, string>> }[];
  /** Text of every element by the element's name. */
  readonly texts: readonly { readonly element: string; readonly className: string; readonly text: string }[];
}

export function readPage(source: string): PageContent {
  const elements: { name: string; attributes: Record<string, string> }[] = [];
  const texts: { element: string; className: string; text: string }[] = [];
  const open: { name: string; className: string }[] = [];
  const parser = new SaxesParser();
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', ({ name, attributes }) => {
    elements.push({ name, attributes });
    open.push({ name, className: attributes.class ?? '' });
  });
  parser.on('closetag', () => {
    open.pop();
  });
  parser.on('text', (text) => {
    const parent = open.at(-1);
    if (parent && text.trim() !== '') texts.push({ element: parent.name, className: parent.className, text });
  });
  parser.on('cdata', () => {
    throw new Error('the report has no CDATA sections');
  });
  parser.on('comment', () => {
    throw new Error('the report has no comments');
  });
  parser.write(source).close();
  return { elements, texts };
}

/** All text of a page, in order, elements apart by a space, white space collapsed. */
export const plainText = ({ texts }: PageContent): string =>
  texts
    .map(({ text }) => text)
    .join(' ')
    .replace(/\s+/g, ' ');
