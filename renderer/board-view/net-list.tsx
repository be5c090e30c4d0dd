import { useVirtualizer } from '@tanstack/react-virtual';
import { type KeyboardEvent, type ReactElement, useEffect, useId, useRef } from 'react';
import type { Net } from '../../app/board/board.ts';
import { levelText, quantityText } from '../i18n/format.ts';
import { useSelectedPoint, useSelection } from '../state/hooks.ts';
import { hover, selectNet } from '../state/selection.ts';
import css from './board-view.module.css';
import { lengthOf } from './net-facts.ts';

const ROW_PX = 26;
const PAGE = 10;

export interface NetListProps {
  /** Those that pass the search. */
  readonly nets: readonly Net[];
  readonly onShow: (net: string) => void;
}

/** The nets as a list: arrow keys choose, Enter goes there. The keyboard's way to what a click on the board does. */
export function NetList({ nets, onShow }: NetListProps): ReactElement {
  const scroll = useRef<HTMLDivElement>(null);
  const id = useId();
  const { net: chosen } = useSelection();
  const point = useSelectedPoint();
  const at = nets.findIndex(({ name }) => name === chosen);
  const virtual = useVirtualizer({
    count: nets.length,
    getScrollElement: () => scroll.current,
    estimateSize: () => ROW_PX,
    overscan: 8,
  });
  useEffect(() => {
    if (at >= 0) virtual.scrollToIndex(at);
  }, [virtual, at]);
  const levels = new Map(
    point?.contributors.filter(({ kind }) => kind === 'net').map(({ name, levelDbuvPerM }) => [name, levelDbuvPerM]),
  );
  const onKeyDown = (event: KeyboardEvent) => {
    const next = movedTo(event.key, at, nets.length);
    if (event.key === 'Enter' && at >= 0) onShow(nets[at]!.name);
    else if (next !== null) selectNet(nets[next]!.name);
    else return;
    event.preventDefault();
  };
  return (
    <div
      ref={scroll}
      className={css.nets}
      role="listbox"
      aria-label="Nets"
      aria-activedescendant={at < 0 ? undefined : `${id}-${at}`}
      tabIndex={0}
      onKeyDown={onKeyDown}
      onPointerLeave={() => hover({ net: null })}
    >
      <div role="presentation" style={{ height: virtual.getTotalSize(), position: 'relative' }}>
        {virtual.getVirtualItems().map(({ index, start }) => {
          const net = nets[index]!;
          const level = levels.get(net.name);
          return (
            // biome-ignore lint/a11y/useKeyWithClickEvents: the list has the keys
            // biome-ignore lint/a11y/useFocusableInteractive: the list has the focus and names the active row
            <div
              key={net.name}
              id={`${id}-${index}`}
              role="option"
              aria-selected={index === at}
              aria-posinset={index + 1}
              aria-setsize={nets.length}
              className={css.net}
              style={{ height: ROW_PX, transform: `translateY(${start}px)` }}
              onClick={() => selectNet(net.name)}
              onDoubleClick={() => onShow(net.name)}
              onPointerEnter={() => hover({ net: net.name })}
            >
              <span className={css.netName}>{net.name}</span>
              <span className={css.netNote}>
                {level === undefined ? quantityText(lengthOf(net), 'm') : `${levelText(level)} dB`}
              </span>
            </div>
          );
        })}
      </div>
    </div>
  );
}

function movedTo(key: string, at: number, count: number): number | null {
  const goals: Readonly<Record<string, number>> = {
    ArrowDown: at + 1,
    ArrowUp: at < 0 ? count - 1 : at - 1,
    PageDown: at + PAGE,
    PageUp: at - PAGE,
    Home: 0,
    End: count - 1,
  };
  const goal = goals[key];
  return goal === undefined || count === 0 ? null : Math.min(count - 1, Math.max(0, goal));
}
