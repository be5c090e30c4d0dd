import { mToMm } from '../../app/units/convert.ts';
import type { Palette } from '../theme/palette.ts';
import { overlap } from './boxes.ts';
import type { DotBatch, TraceBatch } from './copper-batches.ts';
import { dotWidthM, isRound, isSeen, levelOfDetail, strokeWidthM } from './detail-levels.ts';
import { drawCables, drawCells, drawPieces } from './draw-overlays.ts';
import { toBoardAxes } from './paths.ts';
import type { StillScene } from './scene.ts';
import { type Size, seenBox, type View } from './view.ts';

/**
 * Draws the board. After every batch it yields how many pieces that was, so that the caller can spread a large board over
 * several frames; run to the end it is one picture.
 */
export function* drawStill(
  context: CanvasRenderingContext2D,
  scene: StillScene,
  view: View,
  size: Size,
  density: number,
): Generator<number, void> {
  const { copper, layerOrder, sight, palette } = scene;
  const seen = seenBox(view, size);
  const px = mToMm(1 / view.pxPerM);
  toBoardAxes(context, view, size, density);
  const outline = copper.outline();
  context.fillStyle = palette.color('paper-panel');
  context.fill(outline, 'evenodd');
  const { activeLayer } = sight;
  const below = layerOrder.filter((layer) => layer !== activeLayer);
  const isActiveShown = layerOrder.includes(activeLayer);
  yield* drawPlanes(context, scene, below, seen, px);
  if (scene.colouring === 'current') {
    if (isActiveShown) yield* drawPlanes(context, scene, [activeLayer], seen, px);
    if (scene.currentMap !== null) yield drawCells(context, scene.currentMap, palette);
  }
  for (const layer of below) yield* drawTraces(context, scene, layer, view, seen);
  if (isActiveShown) {
    // What lies under the active layer's planes shines through them.
    context.globalAlpha = 0.72;
    if (scene.colouring !== 'current') yield* drawPlanes(context, scene, [activeLayer], seen, px);
    context.globalAlpha = 1;
    yield* drawTraces(context, scene, activeLayer, view, seen);
  }
  yield* drawDriven(context, scene, view);
  for (const batch of copper.dots) yield drawDots(context, scene, batch, view, seen);
  context.strokeStyle = palette.color('edge');
  context.lineWidth = 1.2 * px;
  context.stroke(outline);
  yield drawCables(context, scene, px);
  if (scene.colouring === 'shares') yield drawPieces(context, scene, px);
}

function* drawPlanes(
  context: CanvasRenderingContext2D,
  { copper, palette }: StillScene,
  layers: readonly number[],
  seen: ReturnType<typeof seenBox>,
  px: number,
): Generator<number, void> {
  context.fillStyle = palette.color('plane');
  context.strokeStyle = palette.color('hair');
  context.lineWidth = px;
  context.lineJoin = 'bevel';
  for (const layer of layers) {
    for (const { layerIndex, box, corners, path } of copper.planes) {
      if (layerIndex !== layer || !overlap(box, seen)) continue;
      context.fill(path(), 'evenodd');
      context.stroke(path());
      yield corners;
    }
  }
}

/** The active layer's copper is darker. */
const traceColour = (palette: Palette, isActive: boolean): string => palette.color(isActive ? 'ghost' : 'copper');

function* drawTraces(
  context: CanvasRenderingContext2D,
  { copper, sight, palette }: StillScene,
  layer: number,
  { pxPerM }: View,
  seen: ReturnType<typeof seenBox>,
): Generator<number, void> {
  const level = levelOfDetail(pxPerM);
  context.strokeStyle = traceColour(palette, layer === sight.activeLayer);
  const isWanted = ({ layerIndex, box }: TraceBatch) => layerIndex === layer && overlap(box, seen);
  for (const { widthM, pieces, path } of copper.traces.filter(isWanted)) {
    styleStroke(context, widthM, pxPerM);
    context.stroke(path(level));
    yield pieces;
  }
}

export function styleStroke(context: CanvasRenderingContext2D, widthM: number, pxPerM: number): void {
  const round = isRound(widthM, pxPerM);
  context.lineWidth = mToMm(strokeWidthM(widthM, pxPerM));
  context.lineCap = round ? 'round' : 'butt';
  context.lineJoin = round ? 'round' : 'bevel';
}

function* drawDriven(
  context: CanvasRenderingContext2D,
  { driven, sight, palette }: StillScene,
  { pxPerM }: View,
): Generator<number, void> {
  context.strokeStyle = palette.color('bar');
  for (const { strokes, pieces } of driven) {
    for (const { layerIndex, widthM, path } of strokes) {
      if (!sight.isShown(layerIndex)) continue;
      styleStroke(context, widthM, pxPerM);
      context.stroke(path);
    }
    yield pieces;
  }
}

function drawDots(
  context: CanvasRenderingContext2D,
  { sight, palette }: StillScene,
  batch: DotBatch,
  { pxPerM }: View,
  seen: ReturnType<typeof seenBox>,
): number {
  const { kind, firstLayer, lastLayer, radiusM, holeRadiusM, box, pieces, path } = batch;
  if (!overlap(box, seen) || !isSeen(radiusM, pxPerM)) return 0;
  let isShown = false;
  for (let layer = firstLayer; layer <= lastLayer; layer++) isShown ||= sight.isShown(layer);
  if (!isShown) return 0;
  context.lineCap = 'round';
  context.strokeStyle = palette.color(kind === 'via' ? 'bar-path' : 'edge');
  context.lineWidth = mToMm(dotWidthM(radiusM, pxPerM));
  context.stroke(path());
  if (isSeen(holeRadiusM, pxPerM)) {
    context.strokeStyle = palette.color('paper');
    context.lineWidth = mToMm(2 * holeRadiusM);
    context.stroke(path());
  }
  return pieces;
}
