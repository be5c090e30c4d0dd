import { type RefObject, useEffect, useState } from 'react';
import type { Size } from './view.ts';

export interface CanvasSize extends Size {
  /** Device pixels a CSS pixel. */
  readonly density: number;
}

/** Size of an element and the screen's density, followed when the window is zoomed or moved to another screen. */
export function useCanvasSize(element: RefObject<HTMLElement | null>): CanvasSize {
  const [size, setSize] = useState<CanvasSize>({ widthPx: 0, heightPx: 0, density: devicePixelRatio });
  useEffect(() => {
    const watched = element.current!;
    const measure = () =>
      setSize({ widthPx: watched.clientWidth, heightPx: watched.clientHeight, density: devicePixelRatio });
    const observer = new ResizeObserver(measure);
    observer.observe(watched);
    // Another density without another size comes as a resize of the window only.
    addEventListener('resize', measure);
    return () => {
      observer.disconnect();
      removeEventListener('resize', measure);
    };
  }, [element]);
  return size;
}
