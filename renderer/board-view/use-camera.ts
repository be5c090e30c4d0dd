import { useEffect, useMemo, useRef, useSyncExternalStore } from 'react';
import type { Board } from '../../app/board/board.ts';
import { useSelection } from '../state/hooks.ts';
import { useRemembered } from '../state/remembered.ts';
import { prefersReducedMotion } from '../theme/motion.ts';
import { BoardCamera } from './board-camera.ts';
import { showNet } from './board-menu.ts';
import { boardBox, boxOf, netBox, overlap } from './boxes.ts';
import { cameraSchema, FIRST_CAMERA } from './remembered-view.ts';
import { useFindings, useReadyDetail } from './use-scene.ts';
import { seenBox } from './view.ts';

const REMEMBER_AFTER_MS = 400;
/** What is shown about a finding, each way. */
const ABOUT_FINDING_M = 12e-3;

/** The camera of a board: where it was left, fitted to another board. */
export function useCamera(board: Board): BoardCamera {
  const [remembered, remember] = useRemembered('board-view.camera', cameraSchema, FIRST_CAMERA);
  const boxes = useMemo(() => (fit: 'board' | 'cables') => boardBox(board, fit === 'cables'), [board]);
  const first = useRef({ remembered, boxes });
  const camera = useMemo(() => {
    const made = new BoardCamera(first.current.boxes);
    const { fit, ...view } = first.current.remembered;
    made.restore(view, fit);
    return made;
  }, []);
  useEffect(() => camera.setBoxes(boxes), [camera, boxes]);
  useEffect(() => {
    const { view, fit, size } = camera.state();
    // The remembered view is of another layout: nothing of this one would be seen.
    if (fit === null && size.widthPx > 0 && !overlap(seenBox(view, size), boxes('cables'))) camera.fit('board');
  }, [camera, boxes]);
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const deaf = camera.listen(() => {
      clearTimeout(timer);
      timer = setTimeout(() => {
        const { view, fit } = camera.state();
        remember({ ...view, fit });
      }, REMEMBER_AFTER_MS);
    });
    return () => {
      deaf();
      clearTimeout(timer);
    };
  }, [camera, remember]);
  useEffect(() => () => camera.end(), [camera]);
  return camera;
}

export const useIsFromBottom = (camera: BoardCamera): boolean =>
  useSyncExternalStore(camera.listen, () => camera.state().view.isFromBottom);

/** What is chosen elsewhere comes into sight; what is in sight stays where it is. */
export function useFollowing(board: Board, camera: BoardCamera): void {
  const { net, finding, piece } = useSelection();
  const findings = useFindings();
  const pieces = useReadyDetail()?.pieces;
  const state = useRef({ board, findings, pieces });
  state.current = { board, findings, pieces };
  const seen = () => seenBox(camera.state().view, camera.state().size);

  useChange(net, (name) => {
    const { nets } = state.current.board;
    const chosen = nets.find((candidate) => candidate.name === name);
    const box = chosen && netBox(state.current.board, chosen);
    if (box && !overlap(box, seen())) showNet(state.current.board, camera, name);
  });
  useChange(finding, (number) => {
    const atM = state.current.findings[number]?.atM;
    if (atM === undefined) return;
    const [xM, yM] = atM;
    const about = {
      lowXM: xM - ABOUT_FINDING_M,
      lowYM: yM - ABOUT_FINDING_M,
      highXM: xM + ABOUT_FINDING_M,
      highYM: yM + ABOUT_FINDING_M,
    };
    camera.show(about, prefersReducedMotion());
  });
  useChange(piece, (number) => {
    const chosen = state.current.pieces?.[number];
    const box = chosen && boxOf([chosen.fromM, chosen.toM]);
    if (box && !overlap(box, seen())) camera.show(box, prefersReducedMotion(), camera.state().view.pxPerM);
  });
}

/** Runs when a choice changes to something, not for what is chosen already at the start. */
function useChange<T>(value: T | null, onChange: (value: T) => void): void {
  const before = useRef(value);
  useEffect(() => {
    if (value === before.current) return;
    before.current = value;
    if (value !== null) onChange(value);
  });
}
