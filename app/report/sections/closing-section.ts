import type { EstimateResult } from '../../estimate/result.ts';
import { CAUTIONS } from '../cautions.ts';
import { type Markup, markup, nameMarkup } from '../markup.ts';

/** Choices the program made, then the cautions in full: always, whatever the verdict. */
export function closingSection({ notes }: EstimateResult): Markup {
  return markup`${notes.length > 0 && markup`<section><h2>Notes</h2><ul>${notes.map((note) => markup`<li>${nameMarkup(note, 500)}</li>`)}</ul></section>`}
<section class="cautions"><h2>Cautions</h2><ol>${CAUTIONS.map((caution) => markup`<li>${caution}</li>`)}</ol></section>`;
}
