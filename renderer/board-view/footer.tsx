import { type ReactElement, useSyncExternalStore } from 'react';
import type { Board } from '../../app/board/board.ts';
import { roundStep } from '../../app/report/figures/axis.ts';
import { mToMm } from '../../app/units/convert.ts';
import { numberText } from '../i18n/format.ts';
import { useSelectedPoint, useSelection } from '../state/hooks.ts';
import type { BoardCamera } from './board-camera.ts';
import css from './board-view.module.css';
import { netFacts } from './net-facts.ts';
import type { PlaceUnderPointer } from './place-under-pointer.ts';
import { type ScreenPoint, toWorld } from './view.ts';

const MOST_BAR_PX = 110;

export interface FooterProps {
  readonly board: Board;
  readonly camera: BoardCamera;
  readonly place: PlaceUnderPointer;
}

/** Scale, place of the pointer, and facts of the chosen net. */
export const Footer = ({ board, camera, place }: FooterProps): ReactElement => (
  <div className={css.footer}>
    <ScaleBar camera={camera} />
    <Place camera={camera} place={place} />
    <ChosenFacts board={board} />
  </div>
);

function Place({ camera, place }: Omit<FooterProps, 'board'>): ReactElement {
  const at = useSyncExternalStore(place.listen, place.at);
  return <span className={css.place}>{at === null ? '' : placeText(camera, at)}</span>;
}

function placeText(camera: BoardCamera, place: ScreenPoint): string {
  const { view, size } = camera.state();
  const decimals = view.pxPerM > 20_000 ? 3 : 2;
  return toWorld(view, size, place)
    .map((valueM, i) => `${i === 0 ? 'x' : 'y'} ${numberText(Number(mToMm(valueM).toFixed(decimals)))}`)
    .join('  ')
    .concat(' mm');
}

function ScaleBar({ camera }: { readonly camera: BoardCamera }): ReactElement {
  const pxPerM = useSyncExternalStore(camera.listen, () => camera.state().view.pxPerM);
  const pxPerMm = pxPerM / mToMm(1);
  const lengthMm = roundStep(MOST_BAR_PX / pxPerMm, 1.999);
  return (
    <span className={css.scaleBar} role="img" aria-label={`Scale: ${numberText(lengthMm)} mm`}>
      <span className={css.bar} style={{ width: lengthMm * pxPerMm }} />
      {numberText(lengthMm)} mm
    </span>
  );
}

function ChosenFacts({ board }: { readonly board: Board }): ReactElement {
  const { net: name, cable } = useSelection();
  const point = useSelectedPoint();
  const net = board.nets.find((candidate) => candidate.name === name);
  const text = net === undefined ? (cable ?? '') : [net.name, ...netFacts(board, net, point)].join(' · ');
  return (
    <span className={css.facts} role="status" title={text}>
      {text}
    </span>
  );
}
