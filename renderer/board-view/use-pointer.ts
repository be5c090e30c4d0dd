import { type MouseEvent, type PointerEvent, type RefObject, useEffect, useRef } from 'react';
import type { BoardCamera } from './board-camera.ts';
import type { ScreenPoint } from './view.ts';

/** A pointer that moved less has clicked. */
const CLICK_PX = 4;
const ZOOM_PER_PX = 0.0016;
const LINE_PX = 32;

export interface PointerActions {
  /** The pointer rests on a place; null: it left, or moves the board. */
  readonly onHover: (at: ScreenPoint | null) => void;
  readonly onClick: (at: ScreenPoint) => void;
  readonly onDoubleClick: () => void;
}

/** Drag moves the board, the wheel enlarges it at the pointer. Positions are CSS pixels of the element. */
export function usePointer(
  element: RefObject<HTMLElement | null>,
  camera: BoardCamera,
  { onHover, onClick, onDoubleClick }: PointerActions,
) {
  const pressed = useRef<{ at: ScreenPoint; last: ScreenPoint; isDrag: boolean; button: number } | null>(null);

  useEffect(() => {
    const target = element.current!;
    const onWheel = (event: WheelEvent) => {
      event.preventDefault();
      const px = event.deltaMode === WheelEvent.DOM_DELTA_PIXEL ? event.deltaY : event.deltaY * LINE_PX;
      camera.zoom(Math.exp(-px * ZOOM_PER_PX), placeOf(target, event));
    };
    // React listens passively: the page would scroll as well.
    target.addEventListener('wheel', onWheel, { passive: false });
    return () => target.removeEventListener('wheel', onWheel);
  }, [element, camera]);

  return {
    onPointerDown: (event: PointerEvent<HTMLElement>) => {
      if (event.button > 1) return;
      event.currentTarget.setPointerCapture(event.pointerId);
      const at = placeOf(event.currentTarget, event);
      pressed.current = { at, last: at, isDrag: false, button: event.button };
    },
    onPointerMove: (event: PointerEvent<HTMLElement>) => {
      const at = placeOf(event.currentTarget, event);
      const press = pressed.current;
      if (press === null) {
        onHover(at);
        return;
      }
      press.isDrag ||= Math.hypot(at.x - press.at.x, at.y - press.at.y) > CLICK_PX;
      if (!press.isDrag) return;
      onHover(null);
      camera.pan(at.x - press.last.x, at.y - press.last.y);
      press.last = at;
    },
    onPointerUp: (event: PointerEvent<HTMLElement>) => {
      const press = pressed.current;
      pressed.current = null;
      if (press !== null && !press.isDrag && press.button === 0) onClick(placeOf(event.currentTarget, event));
    },
    onPointerCancel: () => {
      pressed.current = null;
    },
    onPointerLeave: () => onHover(null),
    onDoubleClick,
  };
}

export function placeOf(element: Element, event: Pick<MouseEvent | WheelEvent, 'clientX' | 'clientY'>): ScreenPoint {
  const { left, top } = element.getBoundingClientRect();
  return { x: event.clientX - left, y: event.clientY - top };
}
