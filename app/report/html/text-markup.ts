import type { Text } from '../blocks.ts';
import { dashPicture, inlineMark } from '../figures/marks.ts';
import { type Markup, markup } from '../markup.ts';

/** A piece of text as HTML. */
export function textMarkup(text: Text): Markup | string | false {
  if (text === undefined || text === false) return false;
  if (typeof text === 'string') return text;
  if (!('kind' in text)) return markup`${text.map(textMarkup)}`;
  switch (text.kind) {
    case 'name':
      return markup`<bdi>${text.text}</bdi>`;
    case 'strong':
      return markup`<strong>${textMarkup(text.text)}</strong>`;
    case 'quiet':
      return markup`<span class="quiet">${textMarkup(text.text)}</span>`;
    case 'code':
      return markup`<span class="code">${textMarkup(text.text)}</span>`;
    case 'mark':
      return inlineMark(text.standing, text.label);
    case 'dash':
      return dashPicture(text.polarization);
    case 'break':
      return markup`<br/>`;
  }
}
