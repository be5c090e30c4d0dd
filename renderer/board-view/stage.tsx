import { type KeyboardEvent, type MouseEvent, type ReactElement, useEffect, useRef, useState } from 'react';
import type { Board } from '../../app/board/board.ts';
import { ContextMenu } from '../components/menu.tsx';
import type { BoardCamera } from './board-camera.ts';
import { offerHandle } from './board-handle.ts';
import { menuOf } from './board-menu.ts';
import css from './board-view.module.css';
import { choose, isSamePick, pointAt } from './choosing.ts';
import { HoverTip } from './hover-tip.tsx';
import { Painter } from './painter.ts';
import { type Pick, pickAt } from './pick.ts';
import { useCanvasSize } from './use-canvas-size.ts';
import { placeOf, usePointer } from './use-pointer.ts';
import { type Scenes, useLiveScene } from './use-scene.ts';
import type { ScreenPoint } from './view.ts';

const STEP_PX = 40;
const ZOOM_STEP = 1.25;

export interface StageProps {
  readonly board: Board;
  readonly camera: BoardCamera;
  readonly scenes: Scenes;
  /** What the picture shows, for those who do not see it. */
  readonly label: string;
  readonly onPlace: (at: ScreenPoint | null) => void;
  readonly onSearch: () => void;
}

interface Pointed {
  readonly pick: Pick;
  readonly at: ScreenPoint;
}

/** The two canvases: the board below, what follows pointer and choice above. */
export function Stage({ board, camera, scenes, label, onPlace, onSearch }: StageProps): ReactElement {
  const frame = useRef<HTMLDivElement>(null);
  const stillCanvas = useRef<HTMLCanvasElement>(null);
  const liveCanvas = useRef<HTMLCanvasElement>(null);
  const painter = useRef<Painter>(null);
  const search = useRef(onSearch);
  const { widthPx, heightPx, density } = useCanvasSize(frame);
  const [pointed, setPointed] = useState<Pointed | null>(null);
  const [menu, setMenu] = useState<{ x: number; y: number; pick: Pick | null } | null>(null);
  const live = useLiveScene(scenes.pick);
  search.current = onSearch;

  useEffect(() => {
    const made = new Painter(stillCanvas.current!, liveCanvas.current!);
    painter.current = made;
    const follow = () => made.setView(camera.state().view);
    follow();
    const deaf = camera.listen(follow);
    const withdraw = offerHandle({ camera, painter: made, search: () => search.current() });
    return () => {
      withdraw();
      deaf();
      made.end();
    };
  }, [camera]);

  useEffect(() => {
    painter.current!.setSize({ widthPx, heightPx }, density);
    camera.setSize({ widthPx, heightPx });
  }, [camera, widthPx, heightPx, density]);
  useEffect(() => painter.current!.setStill(scenes.still), [scenes.still]);
  useEffect(() => painter.current!.setLive(live), [live]);

  const pick = (at: ScreenPoint): Pick | null => {
    const { view, size } = camera.state();
    return pickAt(scenes.pick, view, size, at);
  };
  const onHover = (at: ScreenPoint | null) => {
    onPlace(at);
    const found = at === null ? null : pick(at);
    if (!isSamePick(found, pointed?.pick ?? null)) pointAt(found);
    setPointed(found === null || at === null ? null : { pick: found, at });
  };
  const pointer = usePointer(frame, camera, {
    onHover,
    onClick: (at) => choose(pick(at)),
    onDoubleClick: () => camera.fit('board'),
  });
  const onContextMenu = (event: MouseEvent<HTMLElement>) => {
    event.preventDefault();
    const net = live.selected?.name ?? null;
    // From the menu key: about what is chosen, in the middle of the picture.
    const isKey = event.button !== 2;
    const box = event.currentTarget.getBoundingClientRect();
    const at = isKey ? { x: box.width / 2, y: box.height / 2 } : placeOf(event.currentTarget, event);
    const found: Pick | null = isKey ? (net === null ? null : { kind: 'net', net, layerIndex: -1 }) : pick(at);
    setPointed(null);
    setMenu({ x: box.left + at.x, y: box.top + at.y, pick: found });
  };
  return (
    <>
      <div
        ref={frame}
        className={css.stage}
        role="application"
        aria-label={label}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: a picture that is moved by keys of its own
        tabIndex={0}
        data-own-arrows=""
        onKeyDown={(event) => onKey(event, camera)}
        onContextMenu={onContextMenu}
        {...pointer}
      >
        <canvas ref={stillCanvas} className={css.canvas} />
        <canvas ref={liveCanvas} className={css.canvas} />
      </div>
      {pointed !== null && <HoverTip board={board} {...pointed} room={{ widthPx, heightPx }} />}
      <ContextMenu
        at={menu}
        onClose={() => setMenu(null)}
        label="What to do on the board"
        groups={menu === null ? [] : menuOf(board, camera, menu.pick)}
      />
    </>
  );
}

/** Which way the picture moves: as if the eye went along the arrow. */
const MOVES: ReadonlyMap<string, readonly [x: number, y: number]> = new Map([
  ['ArrowLeft', [1, 0]],
  ['ArrowRight', [-1, 0]],
  ['ArrowUp', [0, 1]],
  ['ArrowDown', [0, -1]],
]);
const ZOOMS: ReadonlyMap<string, number> = new Map([
  ['+', ZOOM_STEP],
  ['=', ZOOM_STEP],
  ['-', 1 / ZOOM_STEP],
  ['−', 1 / ZOOM_STEP],
]);

function onKey(event: KeyboardEvent, camera: BoardCamera): void {
  if (event.ctrlKey || event.metaKey || event.altKey) return;
  const move = MOVES.get(event.key);
  const zoom = ZOOMS.get(event.key);
  const step = event.shiftKey ? 5 * STEP_PX : STEP_PX;
  if (move !== undefined) camera.pan(move[0] * step, move[1] * step);
  else if (zoom !== undefined) camera.zoom(zoom);
  else return;
  event.preventDefault();
}
