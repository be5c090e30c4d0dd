import type { BoardCamera } from './board-camera.ts';
import type { Painter } from './painter.ts';

/** The board that is seen, for commands; there is at most one in a window. */
export interface BoardHandle {
  readonly camera: BoardCamera;
  readonly painter: Painter;
  /** Puts the cursor into the search for nets. */
  readonly search: () => void;
}

let current: BoardHandle | null = null;

export const boardHandle = (): BoardHandle | null => current;

/** Makes a board the one that commands act on, until the returned function is called. */
export function offerHandle(handle: BoardHandle): () => void {
  current = handle;
  return () => {
    if (current === handle) current = null;
  };
}
