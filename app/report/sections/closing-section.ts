import type { EstimateResult } from '../../estimate/result.ts';
import { list, name, type Section } from '../blocks.ts';
import { CAUTIONS } from '../cautions.ts';

const MOST_NOTES = 300;

/** Choices the program made. */
export function notesSection({ notes }: EstimateResult, mostNotes = MOST_NOTES): Section {
  const left = notes.length - mostNotes;
  const items = notes.slice(0, mostNotes).map((text) => name(text, 500));
  return {
    title: 'Notes',
    blocks: notes.length === 0 ? [] : [list(left > 0 ? [...items, `${left} more in the JSON result.`] : items)],
  };
}

/** The cautions in full: always, whatever the verdict. */
export const cautionsSection = (): Section => ({
  title: 'Cautions',
  className: 'cautions',
  blocks: [{ kind: 'list', items: CAUTIONS, isNumbered: true }],
});
