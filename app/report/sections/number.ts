import { type Markup, markup } from '../markup.ts';

/** A number for print: true minus sign. */
export const printed = (text: string): string => text.replace('-', '−');

/** A right-aligned number cell. */
export const numberCell = (text: string): Markup => markup`<td class="n">${printed(text)}</td>`;
