import { type ReactElement, useDeferredValue, useMemo, useRef, useState } from 'react';
import type { Board } from '../../app/board/board.ts';
import { countText } from '../../app/report/format.ts';
import { useBoard, useSelection } from '../state/hooks.ts';
import { useRemembered } from '../state/remembered.ts';
import { selectNet } from '../state/selection.ts';
import { showNet } from './board-menu.ts';
import css from './board-view.module.css';
import { FindingList } from './finding-list.tsx';
import { Footer } from './footer.tsx';
import { LayerList } from './layer-list.tsx';
import { copperLayers } from './layer-sight.ts';
import { Legend } from './legend.tsx';
import { NetList } from './net-list.tsx';
import { cycled, searchNets } from './net-search.ts';
import { PlaceUnderPointer } from './place-under-pointer.ts';
import { drawerSchema } from './remembered-view.ts';
import { Stage } from './stage.tsx';
import { Toolbar } from './toolbar.tsx';
import { useCamera, useFollowing, useIsFromBottom } from './use-camera.ts';
import { useScenes } from './use-scene.ts';

/** The board: copper in greys, and in colour what the chosen line is made of. */
export function BoardView(): ReactElement | null {
  const board = useBoard();
  return board && <View board={board} />;
}

function View({ board }: { readonly board: Board }): ReactElement {
  const camera = useCamera(board);
  const isFromBottom = useIsFromBottom(camera);
  const scenes = useScenes(board, isFromBottom);
  useFollowing(board, camera);
  const field = useRef<HTMLInputElement>(null);
  const [drawer, setDrawer] = useRemembered('board-view.drawer', drawerSchema, 'closed');
  const [query, setQuery] = useState('');
  const [place] = useState(() => new PlaceUnderPointer());
  const asked = useDeferredValue(query);
  const nets = useMemo(() => searchNets(board.nets, asked), [board.nets, asked]);
  const { net } = useSelection();
  const show = (name: string) => showNet(board, camera, name);
  const cycle = (by: 1 | -1) => {
    // What was just typed counts, even if the list is not yet drawn for it.
    const names = searchNets(board.nets, query).map(({ name }) => name);
    const next = cycled(names, net, by);
    if (next === undefined) return;
    selectNet(next);
    show(next);
  };
  const layers = copperLayers(board.stackup).length;
  const label = `${board.name || 'Board'}: ${countText(board.nets.length, 'net')} on ${countText(layers, 'copper layer')}, ${
    board.cables.length > 0 ? countText(board.cables.length, 'cable') : 'no cables'
  }. Arrow keys move it, plus and minus enlarge it, F fits it. The list of nets chooses nets.`;
  return (
    <div className={css.view}>
      <Toolbar
        field={field}
        query={query}
        onQuery={setQuery}
        found={nets.length}
        onCycle={cycle}
        isFromBottom={isFromBottom}
        drawer={drawer}
        onDrawer={setDrawer}
      />
      <div className={css.middle}>
        <div className={css.picture}>
          <Stage
            board={board}
            camera={camera}
            scenes={scenes}
            label={label}
            onPlace={place.set}
            onSearch={() => field.current?.select()}
          />
          <Legend />
        </div>
        {drawer !== 'closed' && (
          <div className={css.drawer}>
            {drawer === 'layers' && <LayerList board={board} isFromBottom={isFromBottom} />}
            {drawer === 'nets' && <NetList nets={nets} onShow={show} />}
            {drawer === 'findings' && <FindingList />}
          </div>
        )}
      </div>
      <Footer board={board} camera={camera} place={place} />
    </div>
  );
}
