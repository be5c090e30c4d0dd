import { drawLive } from './draw-live.ts';
import { drawStill } from './draw-still.ts';
import type { LiveScene, StillScene } from './scene.ts';
import { Sheet } from './sheet.ts';
import type { Size, View } from './view.ts';

/** Pieces drawn within one frame; a larger board is spread over several, and waits while the view moves. */
const PIECES_PER_FRAME = 3000;
/** The view counts as moving until nothing has changed for this long. */
const REST_MS = 90;

/**
 * Keeps the two canvases up to date: draws only when something has changed, at most once a frame. While the view moves, a
 * large board's picture is moved and drawn again when the view rests.
 */
export class Painter {
  readonly #still: Sheet;
  readonly #live: Sheet;
  #stillScene: StillScene | null = null;
  #liveScene: LiveScene | null = null;
  #view: View | null = null;
  #size: Size = { widthPx: 0, heightPx: 0 };
  #density = 1;
  #frame = 0;
  #movedAt = -Infinity;
  #timer: ReturnType<typeof setTimeout> | undefined;
  /** What the still picture lacks: a scene or size (soon), or only the view (may wait). */
  #stillNeeds: 'nothing' | 'view' | 'scene' = 'scene';
  #liveNeeds: 'nothing' | 'view' | 'scene' = 'scene';
  #work: { readonly steps: Generator<number, void>; readonly view: View } | null = null;
  /** Pieces of the last whole picture. */
  #cost = Infinity;
  #spent = 0;

  constructor(still: HTMLCanvasElement, live: HTMLCanvasElement) {
    this.#still = new Sheet(still);
    this.#live = new Sheet(live);
  }

  setSize(size: Size, density: number): void {
    this.#size = size;
    this.#density = density;
    this.#still.setSize(size, density);
    this.#live.setSize(size, density);
    this.#renew();
    this.#liveNeeds = 'scene';
  }

  setStill(scene: StillScene): void {
    this.#stillScene = scene;
    this.#renew();
  }

  setLive(scene: LiveScene): void {
    this.#liveScene = scene;
    this.#liveNeeds = 'scene';
    this.#request();
  }

  setView(view: View): void {
    const isTurned = this.#view?.isFromBottom !== view.isFromBottom;
    this.#view = view;
    this.#movedAt = performance.now();
    this.#work = null;
    if (isTurned) this.#renew();
    else if (this.#stillNeeds === 'nothing') this.#stillNeeds = 'view';
    if (isTurned) this.#liveNeeds = 'scene';
    else if (this.#liveNeeds === 'nothing') this.#liveNeeds = 'view';
    this.#request();
  }

  /** Both pictures as they are seen, on a background. */
  picture(background: string): HTMLCanvasElement {
    const canvas = document.createElement('canvas');
    canvas.width = Math.round(this.#size.widthPx * this.#density);
    canvas.height = Math.round(this.#size.heightPx * this.#density);
    const context = canvas.getContext('2d')!;
    context.fillStyle = background;
    context.fillRect(0, 0, canvas.width, canvas.height);
    for (const { canvas: source } of [this.#still, this.#live]) {
      context.drawImage(source, (canvas.width - source.width) / 2, (canvas.height - source.height) / 2);
    }
    return canvas;
  }

  end(): void {
    cancelAnimationFrame(this.#frame);
    clearTimeout(this.#timer);
  }

  #renew(): void {
    this.#stillNeeds = 'scene';
    this.#work = null;
    this.#request();
  }

  #request(): void {
    if (this.#frame === 0) this.#frame = requestAnimationFrame(() => this.#draw());
  }

  #draw(): void {
    this.#frame = 0;
    const view = this.#view;
    if (view === null || this.#size.widthPx === 0 || this.#size.heightPx === 0) return;
    const restsInMs = this.#movedAt + REST_MS - performance.now();
    if (this.#stillScene !== null) this.#drawStill(this.#stillScene, view, restsInMs <= 0);
    if (this.#liveScene !== null) this.#drawLive(this.#liveScene, view, restsInMs <= 0);
    this.#still.follow(view);
    this.#live.follow(view);
    if (this.#work !== null) this.#request();
    else if (this.#stillNeeds !== 'nothing' || this.#liveNeeds !== 'nothing') this.#requestIn(restsInMs);
  }

  #requestIn(delayMs: number): void {
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => this.#request(), Math.max(0, delayMs));
  }

  #drawStill(scene: StillScene, view: View, isAtRest: boolean): void {
    if (this.#work === null) {
      const waits = this.#stillNeeds === 'view' && !isAtRest && this.#cost > PIECES_PER_FRAME;
      if (this.#stillNeeds === 'nothing' || waits) return;
      const { size, density } = this.#still;
      this.#work = { view, steps: drawStill(this.#still.begin(), scene, view, size, density) };
      this.#spent = 0;
    }
    const until = this.#spent + PIECES_PER_FRAME;
    while (this.#spent < until) {
      const step = this.#work.steps.next();
      if (step.done) {
        this.#still.finish(this.#work.view);
        this.#work = null;
        this.#stillNeeds = 'nothing';
        this.#cost = this.#spent;
        return;
      }
      // A batch that drew next to nothing is a call all the same.
      this.#spent += step.value + 4;
    }
    this.#still.settle();
  }

  #drawLive(scene: LiveScene, view: View, isAtRest: boolean): void {
    const pieces = (scene.selected?.pieces ?? 0) + (scene.hovered?.pieces ?? 0);
    const waits = this.#liveNeeds === 'view' && !isAtRest && pieces > PIECES_PER_FRAME / 4;
    if (this.#liveNeeds === 'nothing' || waits) return;
    const { size, density } = this.#live;
    drawLive(this.#live.begin(), scene, view, size, density);
    this.#live.finish(view);
    this.#liveNeeds = 'nothing';
  }
}
