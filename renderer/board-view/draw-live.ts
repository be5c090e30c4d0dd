import { shortName } from '../../app/report/markup.ts';
import { mToMm } from '../../app/units/convert.ts';
import { isUpright } from './draw-overlays.ts';
import { styleStroke } from './draw-still.ts';
import { FLAG } from './flags.ts';
import type { NetShape } from './net-shape.ts';
import { addDot, addLine, toBoardAxes, toScreenAxes } from './paths.ts';
import type { LiveScene } from './scene.ts';
import { type Size, toScreen, type View } from './view.ts';

/** Draws what follows pointer and choice: outlines about nets, cables and pieces, and the findings' flags. */
export function drawLive(
  context: CanvasRenderingContext2D,
  scene: LiveScene,
  view: View,
  size: Size,
  density: number,
): void {
  const { palette } = scene;
  const px = mToMm(1 / view.pxPerM);
  toBoardAxes(context, view, size, density);
  if (scene.hovered !== null) outlineNet(context, scene.hovered, scene, view, palette.color('ink-quiet'), 1.3);
  if (scene.selected !== null) outlineNet(context, scene.selected, scene, view, palette.color('ink'), 2);
  outlineCable(context, scene, scene.hoveredCable, palette.color('ink-quiet'), px);
  outlineCable(context, scene, scene.selectedCable, palette.color('ink'), px);
  if (scene.piece !== null) outlinePiece(context, scene, px);
  toScreenAxes(context, density);
  nameCables(context, scene, view, size);
  drawFlags(context, scene, view, size);
}

/** A rim about the net's copper; the copper itself stays as it is seen below. */
function outlineNet(
  context: CanvasRenderingContext2D,
  net: NetShape,
  { sight }: LiveScene,
  { pxPerM }: View,
  colour: string,
  rimPx: number,
): void {
  const shown = net.strokes.filter(({ layerIndex }) => sight.isShown(layerIndex));
  const pins = net.pins.filter(({ layerIndex }) => sight.isShown(layerIndex));
  const pass = (growPx: number): void => {
    const growMm = mToMm(growPx / pxPerM);
    for (const { widthM, path } of shown) {
      styleStroke(context, widthM, pxPerM);
      context.lineCap = 'round';
      context.lineWidth += growMm;
      context.stroke(path);
    }
    context.lineWidth = Math.max(growMm, 1e-6);
    for (const path of [net.vias, ...pins.map((pin) => pin.path)]) {
      context.fill(path);
      context.stroke(path);
    }
  };
  context.save();
  context.strokeStyle = colour;
  context.fillStyle = colour;
  pass(2 * rimPx + 2);
  context.globalCompositeOperation = 'destination-out';
  pass(2);
  context.restore();
  context.save();
  context.strokeStyle = colour;
  context.lineWidth = mToMm(rimPx / pxPerM);
  for (const { layerIndex, path } of net.planes) if (sight.isShown(layerIndex)) context.stroke(path);
  context.restore();
}

function rim(context: CanvasRenderingContext2D, path: Path2D, colour: string, widthPx: number, px: number): void {
  context.save();
  context.lineCap = 'round';
  context.lineJoin = 'round';
  context.strokeStyle = colour;
  context.lineWidth = (widthPx + 4) * px;
  context.stroke(path);
  context.globalCompositeOperation = 'destination-out';
  context.lineWidth = widthPx * px;
  context.stroke(path);
  context.restore();
}

function outlineCable(
  context: CanvasRenderingContext2D,
  { cables }: LiveScene,
  name: string | null,
  colour: string,
  px: number,
): void {
  const cable = cables.find((candidate) => candidate.name === name);
  if (cable === undefined) return;
  const path = new Path2D();
  addLine(path, cable.pointsM);
  rim(context, path, colour, 6, px);
}

function outlinePiece(context: CanvasRenderingContext2D, { piece, palette }: LiveScene, px: number): void {
  const path = new Path2D();
  if (isUpright(piece!)) addDot(path, piece!.fromM, (4 * px) / mToMm(1));
  else addLine(path, [piece!.fromM, piece!.toM]);
  rim(context, path, palette.color('accent'), 8, px);
}

const NAME_APART_PX = 8;

/** Every cable's name over its first stretch, beside the joint. */
function nameCables(context: CanvasRenderingContext2D, { cables, palette }: LiveScene, view: View, size: Size): void {
  context.font = `11px ${palette.font}`;
  context.textBaseline = 'bottom';
  context.lineWidth = 3;
  context.lineJoin = 'round';
  context.strokeStyle = palette.color('paper');
  context.fillStyle = palette.color('ink');
  for (const { name, pointsM } of cables) {
    if (pointsM.length < 2) continue;
    const joint = toScreen(view, size, [pointsM[0]![0], pointsM[0]![1]]);
    const next = toScreen(view, size, [pointsM[1]![0], pointsM[1]![1]]);
    const side = next.x < joint.x ? -1 : 1;
    context.textAlign = side < 0 ? 'right' : 'left';
    const text = shortName(name);
    context.strokeText(text, joint.x + side * NAME_APART_PX, joint.y - NAME_APART_PX / 2);
    context.fillText(text, joint.x + side * NAME_APART_PX, joint.y - NAME_APART_PX / 2);
  }
}

/** Middle of a flag's field above its tip. */
const FIELD_UP = FLAG.tip + FLAG.height / 2;

function drawFlags(context: CanvasRenderingContext2D, scene: LiveScene, view: View, size: Size): void {
  const { findings, selectedFinding, palette } = scene;
  // The chosen one last, so that it lies on top.
  const order = findings.map((_, i) => i).sort((a, b) => Number(a === selectedFinding) - Number(b === selectedFinding));
  context.font = `600 11px ${palette.font}`;
  context.textAlign = 'center';
  context.textBaseline = 'middle';
  for (const i of order) {
    const { x, y } = toScreen(view, size, findings[i]!.atM);
    if (x < -20 || y < -4 || x > size.widthPx + 20 || y > size.heightPx + 30) continue;
    const isSelected = i === selectedFinding;
    const { halfWidth, height, tip } = FLAG;
    context.beginPath();
    context.moveTo(x, y);
    context.lineTo(x - 4, y - tip);
    context.lineTo(x - halfWidth, y - tip);
    context.lineTo(x - halfWidth, y - tip - height);
    context.lineTo(x + halfWidth, y - tip - height);
    context.lineTo(x + halfWidth, y - tip);
    context.lineTo(x + 4, y - tip);
    context.closePath();
    context.fillStyle = palette.color(isSelected ? 'ink' : 'paper');
    context.strokeStyle = palette.color(isSelected ? 'paper' : 'ink');
    context.lineWidth = 1.2;
    context.fill();
    context.stroke();
    context.fillStyle = palette.color(isSelected ? 'paper' : 'ink');
    context.fillText(String(i + 1), x, y - FIELD_UP + 0.5);
  }
}
