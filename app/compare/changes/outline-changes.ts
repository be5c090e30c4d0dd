import type { BoardFile } from '../../board/board-file.ts';
import { type Draft, wideDraft } from './draft.ts';
import { ringKey, sizeMm } from './rings.ts';
import { lengthMmText } from './words.ts';

/** Where all the copper is: the outline, or that it follows from the copper. */
export function outlineChanges(before: BoardFile, after: BoardFile): Draft[] {
  const [one, other] = [boxText(before), boxText(after)];
  const key = ({ outline }: BoardFile) =>
    JSON.stringify((outline ?? []).map(({ pointsMm }) => ringKey(pointsMm)).sort());
  if (key(before) === key(after)) return [];
  const text = one === other ? `outline: another shape, still ${other}` : `outline: ${shorter(one, other)} → ${other}`;
  return [wideDraft('outline', text)];
}

/** The unit once where both sides have it. */
const shorter = (one: string, other: string): string =>
  one.endsWith(' mm') && other.endsWith(' mm') ? one.slice(0, -' mm'.length) : one;

function boxText({ outline }: BoardFile): string {
  if (!outline) return 'around the copper';
  const [widthMm, heightMm] = sizeMm(outline.flatMap(({ pointsMm }) => pointsMm));
  return `${lengthMmText(widthMm)} × ${lengthMmText(heightMm)} mm`;
}
