import { type Size, shiftBetween, type View } from './view.ts';

/** Share of the picture drawn beyond each edge, so that moving it does not bare an empty strip at once. */
const BEYOND = 0.2;

/**
 * A canvas that shows a picture drawn for one view and, until it is drawn anew, moves and enlarges it by the compositor.
 * New pictures are made beside the one that is seen and take its place when they are whole.
 */
export class Sheet {
  readonly #canvas: HTMLCanvasElement;
  readonly #back = document.createElement('canvas');
  #size: Size = { widthPx: 0, heightPx: 0 };
  #density = 1;
  #drawn: View | null = null;

  constructor(canvas: HTMLCanvasElement) {
    this.#canvas = canvas;
  }

  /** Size of the picture with what lies beyond its edges. */
  get size(): Size {
    return this.#size;
  }

  get density(): number {
    return this.#density;
  }

  get canvas(): HTMLCanvasElement {
    return this.#canvas;
  }

  setSize({ widthPx, heightPx }: Size, density: number): void {
    const beyondX = Math.round(widthPx * BEYOND);
    const beyondY = Math.round(heightPx * BEYOND);
    this.#size = { widthPx: widthPx + 2 * beyondX, heightPx: heightPx + 2 * beyondY };
    this.#density = density;
    this.#back.width = Math.round(this.#size.widthPx * density);
    this.#back.height = Math.round(this.#size.heightPx * density);
    const { style } = this.#canvas;
    style.left = `${-beyondX}px`;
    style.top = `${-beyondY}px`;
    style.width = `${this.#size.widthPx}px`;
    style.height = `${this.#size.heightPx}px`;
  }

  /** An empty picture to draw on. */
  begin(): CanvasRenderingContext2D {
    const context = this.#context();
    context.reset();
    return context;
  }

  /** What was drawn so far becomes pixels now: otherwise all of it would wait for `finish`, and hold up that one frame. */
  settle(): void {
    this.#context().getImageData(0, 0, 1, 1);
  }

  #context(): CanvasRenderingContext2D {
    return this.#back.getContext('2d', { willReadFrequently: true })!;
  }

  /** Shows what was drawn since `begin`, for this view. */
  finish(view: View): void {
    const { width, height } = this.#back;
    if (this.#canvas.width !== width || this.#canvas.height !== height) {
      this.#canvas.width = width;
      this.#canvas.height = height;
    }
    const context = this.#canvas.getContext('2d')!;
    context.globalCompositeOperation = 'copy';
    context.drawImage(this.#back, 0, 0);
    this.#drawn = view;
  }

  /** Moves the picture to where the view wants it; one of the other side, or of another size, waits for a new one. */
  follow(view: View): void {
    if (this.#drawn === null || this.#drawn.isFromBottom !== view.isFromBottom) return;
    const { dxPx, dyPx, scale } = shiftBetween(this.#drawn, view);
    const isStill = dxPx === 0 && dyPx === 0 && scale === 1;
    this.#canvas.style.transform = isStill ? '' : `translate(${dxPx}px, ${dyPx}px) scale(${scale})`;
  }
}
