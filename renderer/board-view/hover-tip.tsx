import type { ReactElement } from 'react';
import type { Board } from '../../app/board/board.ts';
import { levelText, quantityText } from '../i18n/format.ts';
import { useSelectedPoint } from '../state/hooks.ts';
import css from './board-view.module.css';
import { largestOf } from './levels.ts';
import { netFacts } from './net-facts.ts';
import type { Pick } from './pick.ts';
import { useFindings, useReadyDetail } from './use-scene.ts';
import type { ScreenPoint, Size } from './view.ts';

export interface HoverTipProps {
  readonly board: Board;
  readonly pick: Pick;
  readonly at: ScreenPoint;
  /** Of the picture, so that the tip stays in it. */
  readonly room: Size;
}

/** Name and facts of what the pointer is over. */
export function HoverTip({ board, pick, at, room }: HoverTipProps): ReactElement {
  const { title, facts } = useTipText(board, pick);
  const isRight = at.x > room.widthPx / 2;
  const isLow = at.y > room.heightPx / 2;
  return (
    <div
      className={css.tip}
      aria-hidden="true"
      style={{
        ...(isRight ? { right: room.widthPx - at.x + 12 } : { left: at.x + 14 }),
        ...(isLow ? { bottom: room.heightPx - at.y + 12 } : { top: at.y + 14 }),
      }}
    >
      <strong>{title}</strong>
      {facts.map((fact) => (
        <span key={fact}>{fact}</span>
      ))}
    </div>
  );
}

function useTipText(board: Board, pick: Pick): { title: string; facts: readonly string[] } {
  const point = useSelectedPoint();
  const detail = useReadyDetail();
  const findings = useFindings();
  if (pick.kind === 'finding') {
    const finding = findings[pick.finding];
    return { title: `Finding ${pick.finding + 1}: ${finding?.net ?? ''}`, facts: [finding?.message ?? ''] };
  }
  if (pick.kind === 'cable') {
    const solved = detail?.currentMap?.cables.find(({ name }) => name === pick.cable);
    const facts = solved === undefined ? [] : [`up to ${quantityText(largestOf(solved.currentRmsA), 'A')} rms`];
    return { title: pick.cable, facts: ['cable', ...facts] };
  }
  const net = board.nets.find(({ name }) => name === pick.net);
  const facts = net === undefined ? [] : netFacts(board, net, point);
  if (pick.kind === 'piece') {
    const piece = detail?.pieces[pick.piece];
    const here =
      piece === undefined
        ? []
        : [
            `this piece: ${levelText(piece.levelDbuvPerM)} dBµV/m, ${quantityText(piece.currentRmsA, 'A')} rms${piece.layer === '' ? '' : `, ${piece.layer}`}`,
          ];
    return { title: pick.net, facts: [...here, ...facts] };
  }
  const { piece } = pick;
  const layer = board.stackup[pick.layerIndex]?.name ?? '';
  const here = piece === undefined ? `plane, ${layer}` : piece.kind === 'pin' ? `pin ${piece.name}` : piece.kind;
  return { title: pick.net || 'no net', facts: [here, ...facts] };
}
