import { type BoxM, between, fitted, panned, type ScreenPoint, type Size, type View, zoomedAt } from './view.ts';

/** What stays fitted while the picture changes its size; null: a view of the user's own. */
export type Fit = 'board' | 'cables' | null;

export interface CameraState {
  readonly view: View;
  readonly fit: Fit;
  readonly size: Size;
}

const START: View = { centerXM: 0, centerYM: 0, pxPerM: 1000, isFromBottom: false };
const GLIDE_MS = 220;

/** Where the picture looks. Outside React: it changes with every frame. */
export class BoardCamera {
  #state: CameraState = { view: START, fit: 'board', size: { widthPx: 0, heightPx: 0 } };
  #boxes: (fit: 'board' | 'cables') => BoxM;
  readonly #listeners = new Set<() => void>();
  #glide = 0;

  constructor(boxes: (fit: 'board' | 'cables') => BoxM) {
    this.#boxes = boxes;
  }

  readonly listen = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  readonly state = (): CameraState => this.#state;

  /** Other boxes to fit: another board, other cables. */
  setBoxes(boxes: (fit: 'board' | 'cables') => BoxM): void {
    this.#boxes = boxes;
    this.#refit();
  }

  setSize(size: Size): void {
    this.#change({ size });
    this.#refit();
  }

  /** Takes a remembered view. */
  restore(view: View, fit: Fit): void {
    this.#change({ view, fit });
    this.#refit();
  }

  fit(fit: 'board' | 'cables'): void {
    this.#stop();
    this.#change({ fit });
    this.#refit();
  }

  turn(): void {
    const { view } = this.#state;
    this.#change({ view: { ...view, isFromBottom: !view.isFromBottom } });
  }

  pan(dxPx: number, dyPx: number): void {
    this.#stop();
    this.#change({ view: panned(this.#state.view, dxPx, dyPx), fit: null });
  }

  zoom(factor: number, at?: ScreenPoint): void {
    this.#stop();
    const { view, size } = this.#state;
    const middle = { x: size.widthPx / 2, y: size.heightPx / 2 };
    this.#change({ view: zoomedAt(view, size, at ?? middle, factor), fit: null });
  }

  /** Shows a box, gliding there unless the system asks for less motion; not nearer than `mostPxPerM`. */
  show(box: BoxM, isStill: boolean, mostPxPerM = Infinity): void {
    const { size, view } = this.#state;
    if (size.widthPx === 0) return;
    const goal = fitted(box, size, view.isFromBottom);
    this.#glideTo({ ...goal, pxPerM: Math.min(goal.pxPerM, mostPxPerM) }, isStill);
  }

  end(): void {
    this.#stop();
    this.#listeners.clear();
  }

  #glideTo(goal: View, isStill: boolean): void {
    this.#stop();
    const from = this.#state.view;
    if (isStill) {
      this.#change({ view: goal, fit: null });
      return;
    }
    const startedAt = performance.now();
    const step = () => {
      const share = Math.min(1, (performance.now() - startedAt) / GLIDE_MS);
      this.#change({ view: between(from, goal, share * share * (3 - 2 * share)), fit: null });
      this.#glide = share < 1 ? requestAnimationFrame(step) : 0;
    };
    this.#glide = requestAnimationFrame(step);
  }

  #stop(): void {
    cancelAnimationFrame(this.#glide);
    this.#glide = 0;
  }

  #refit(): void {
    const { fit, size, view } = this.#state;
    if (fit !== null && size.widthPx > 0 && size.heightPx > 0) {
      this.#change({ view: fitted(this.#boxes(fit), size, view.isFromBottom) });
    }
  }

  #change(change: Partial<CameraState>): void {
    this.#state = { ...this.#state, ...change };
    for (const listener of this.#listeners) listener();
  }
}
