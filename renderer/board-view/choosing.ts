import { hover, selectCable, selectFinding, selectNet, selectPiece } from '../state/selection.ts';
import type { Pick } from './pick.ts';

/** What pointing and clicking mean for the rest of the window. */

export function choose(pick: Pick | null): void {
  if (pick === null) selectNet(null);
  else if (pick.kind === 'finding') selectFinding(pick.finding);
  else if (pick.kind === 'cable') selectCable(pick.cable);
  else if (pick.kind === 'piece') selectPiece(pick.piece);
  else selectNet(pick.net);
}

export const pointAt = (pick: Pick | null): void =>
  hover({
    net: pick?.kind === 'net' || pick?.kind === 'piece' ? pick.net : null,
    cable: pick?.kind === 'cable' ? pick.cable : null,
    piece: pick?.kind === 'piece' ? pick.piece : null,
  });

export const isSamePick = (one: Pick | null, other: Pick | null): boolean =>
  one === other ||
  (one !== null &&
    other !== null &&
    one.kind === other.kind &&
    (one.kind === 'finding'
      ? one.finding === (other as typeof one).finding
      : one.kind === 'cable'
        ? one.cable === (other as typeof one).cable
        : one.kind === 'piece'
          ? one.piece === (other as typeof one).piece
          : one.net === (other as typeof one).net && one.piece === (other as typeof one).piece));
