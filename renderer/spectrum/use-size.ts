import { type RefObject, useEffect, useState } from 'react';
import type { StripSize } from './draw-strip.ts';

/** Size of an element in CSS pixels; zero until it is known. */
export function useSize(element: RefObject<HTMLElement | null>): StripSize {
  const [size, setSize] = useState<StripSize>({ widthPx: 0, heightPx: 0 });
  useEffect(() => {
    const watched = element.current!;
    const observer = new ResizeObserver(() =>
      setSize({ widthPx: watched.clientWidth, heightPx: watched.clientHeight }),
    );
    observer.observe(watched);
    return () => observer.disconnect();
  }, [element]);
  return size;
}
