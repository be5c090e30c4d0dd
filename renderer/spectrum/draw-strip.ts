import type { ResultPoint } from '../../app/estimate/result.ts';
import { frequencyTicks, linearScale, logScale } from '../../app/report/figures/axis.ts';
import { standingOf } from '../../app/report/verdict.ts';
import { drawMark } from '../components/marks/draw-mark.ts';
import { frequencyText, marginText } from '../i18n/format.ts';
import type { Palette } from '../theme/palette.ts';
import type { StripTick } from './strip-ticks.ts';
import { vertical } from './strokes.ts';
import type { Zoom } from './zoom.ts';

export interface StripScene {
  readonly ticks: readonly StripTick[];
  /** Of the kept state; drawn as a ghost behind. */
  readonly ghosts: readonly StripTick[];
  readonly range: readonly [number, number];
  readonly requiredMarginDb: number;
  readonly zoom: Zoom;
  /** Both ends of a range being dragged, pixels. */
  readonly drag: readonly [number, number] | null;
  readonly chosen: ResultPoint | null;
  readonly hoveredHz: number | null;
}

export interface StripSize {
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Room beside the axis. */
const SIDE_PX = 12;
const FOOT_PX = 16;
const HEAD_PX = 8;
/** Margins beyond are drawn at the edge. */
const DEEPEST_DB = 50;
const LEAST_TOP_DB = 10;

export const stripScale = ([fromHz, toHz]: readonly [number, number], { widthPx }: StripSize) =>
  logScale(fromHz, toHz, SIDE_PX, widthPx - SIDE_PX);

/** Frequency at a place of the strip, held within the range. */
export function frequencyAt(range: readonly [number, number], size: StripSize, xPx: number): number {
  const part = (xPx - SIDE_PX) / (size.widthPx - 2 * SIDE_PX);
  return range[0] * (range[1] / range[0]) ** Math.min(1, Math.max(0, part));
}

/** The whole range at a glance: every line a tick from the limit, up when over, down when under. */
export function drawStrip(
  context: CanvasRenderingContext2D,
  size: StripSize,
  scene: StripScene,
  palette: Palette,
): void {
  const { widthPx, heightPx } = size;
  const x = stripScale(scene.range, size);
  const over = Math.max(0, ...scene.ticks.map(({ point }) => -point.marginDb));
  const top = Math.max(LEAST_TOP_DB, over);
  const y = linearScale(-top, DEEPEST_DB, HEAD_PX, heightPx - FOOT_PX);
  const yAt = (marginDb: number) => y.at(Math.min(DEEPEST_DB, Math.max(-top, marginDb)));
  context.clearRect(0, 0, widthPx, heightPx);
  context.font = `10px ${palette.font}`;
  context.textBaseline = 'alphabetic';

  if (scene.requiredMarginDb > 0) {
    context.globalAlpha = 0.3;
    context.fillStyle = palette.color('short-fill');
    context.fillRect(SIDE_PX, yAt(0), widthPx - 2 * SIDE_PX, yAt(scene.requiredMarginDb) - yAt(0));
    context.globalAlpha = 1;
  }
  drawGrid(context, size, scene.range, palette);
  drawZoom(context, size, scene, palette);
  for (const { xPx, point } of scene.ghosts) {
    vertical(context, palette.color('ghost'), 1, xPx + 1.5, yAt(0), yAt(point.marginDb));
  }
  for (const { xPx, point } of scene.ticks) {
    const standing = standingOf(point, scene.requiredMarginDb);
    vertical(
      context,
      palette.color(point.marginDb > DEEPEST_DB ? 'hair' : standing === 'fine' ? 'bar' : standing),
      standing === 'fine' ? 1 : 2,
      xPx,
      yAt(0),
      yAt(point.marginDb),
    );
  }
  horizontal(context, palette.color('ink'), SIDE_PX, widthPx - SIDE_PX, yAt(0));
  for (const { xPx, point } of scene.ticks) {
    const standing = standingOf(point, scene.requiredMarginDb);
    if (standing !== 'fine') drawMark(context, standing, { x: xPx, y: yAt(point.marginDb) }, palette, 0.7);
  }
  context.fillStyle = palette.color('ink-quiet');
  context.fillText('limit', SIDE_PX + 2, yAt(0) - 2);

  const shown = scene.ticks.find(({ point }) => point.frequencyHz === scene.hoveredHz)?.point ?? scene.chosen;
  if (shown !== null && shown.frequencyHz >= scene.range[0] && shown.frequencyHz <= scene.range[1]) {
    drawShown(context, size, x.at(shown.frequencyHz), yAt(shown.marginDb), shown, palette);
  }
}

function drawGrid(
  context: CanvasRenderingContext2D,
  { widthPx, heightPx }: StripSize,
  range: readonly [number, number],
  palette: Palette,
): void {
  const x = stripScale(range, { widthPx, heightPx });
  context.textAlign = 'center';
  for (const { frequencyHz, label } of frequencyTicks(...range)) {
    const at = x.at(frequencyHz);
    vertical(context, palette.color('grid'), 1, at, HEAD_PX, heightPx - FOOT_PX);
    if (label === undefined) continue;
    context.fillStyle = palette.color('ink-quiet');
    const half = context.measureText(label).width / 2;
    context.fillText(frequencyText(frequencyHz), Math.min(widthPx - half, Math.max(half, at)), heightPx - 4);
  }
  context.textAlign = 'left';
}

function drawZoom(
  context: CanvasRenderingContext2D,
  size: StripSize,
  { zoom, drag, range }: StripScene,
  palette: Palette,
): void {
  const x = stripScale(range, size);
  const [from, to] = drag ?? (zoom === null ? [null, null] : [x.at(zoom[0]), x.at(zoom[1])]);
  if (from === null || to === null) return;
  context.globalAlpha = 0.14;
  context.fillStyle = palette.color('accent');
  context.fillRect(Math.min(from, to), 0, Math.abs(to - from), size.heightPx - FOOT_PX);
  context.globalAlpha = 1;
  for (const edge of [from, to]) vertical(context, palette.color('accent'), 1, edge, 0, size.heightPx - FOOT_PX);
}

function drawShown(
  context: CanvasRenderingContext2D,
  { widthPx, heightPx }: StripSize,
  x: number,
  y: number,
  point: ResultPoint,
  palette: Palette,
): void {
  vertical(context, palette.color('focus'), 2, x, HEAD_PX, heightPx - FOOT_PX);
  context.strokeStyle = palette.color('focus');
  context.lineWidth = 1.5;
  context.beginPath();
  context.arc(x, y, 5, 0, 2 * Math.PI);
  context.stroke();
  const text = `${frequencyText(point.frequencyHz)}  ${marginText(point.marginDb)} dB`;
  const { width } = context.measureText(text);
  const isLeft = x + width + 12 > widthPx;
  context.fillStyle = palette.color('paper');
  context.fillRect(isLeft ? x - width - 10 : x + 6, 0, width + 4, 13);
  context.fillStyle = palette.color('ink');
  context.fillText(text, isLeft ? x - width - 8 : x + 8, 10);
}

function horizontal(context: CanvasRenderingContext2D, color: string, x1: number, x2: number, y: number): void {
  context.strokeStyle = color;
  context.lineWidth = 1;
  context.beginPath();
  context.moveTo(x1, Math.round(y) + 0.5);
  context.lineTo(x2, Math.round(y) + 0.5);
  context.stroke();
}
