import { mToMm } from '../../app/units/convert.ts';
import type { Palette } from '../theme/palette.ts';
import { amplitudeStep, largestOf, levelStep } from './levels.ts';
import { addDot, addLine } from './paths.ts';
import type { CurrentMap, PieceDetail, StillScene } from './scene.ts';

/** What the chosen line is made of, over the board; colours from weak to strong, so that the strongest lies on top. */

const PIECE_PX = 2.6;
const STRONGEST_PX = 4.5;
const VIA_PX = 3.5;
const CABLE_PX = 1.4;
/** The cells overlap a little: without it the paper shines through between two colours. */
const SEAM = 0.02;

/** Pieces of traces by colour. Returns how many were drawn. */
export function drawPieces(context: CanvasRenderingContext2D, scene: StillScene, px: number): number {
  const { levels } = scene.palette;
  const layerIndex = new Map(scene.board.stackup.map(({ name }, i) => [name, i]));
  const isShown = ({ layer }: PieceDetail) => layer === '' || scene.sight.isShown(layerIndex.get(layer) ?? -1);
  const topDb = scene.pieces[0]?.levelDbuvPerM ?? 0;
  const paths = levels.map(() => ({ lines: new Path2D(), dots: new Path2D() }));
  let drawn = 0;
  for (const piece of scene.pieces) {
    const step = levelStep(piece.levelDbuvPerM, topDb, levels.length);
    if (step === null) break;
    if (!isShown(piece)) continue;
    if (isUpright(piece)) addDot(paths[step]!.dots, piece.fromM, (VIA_PX * px) / mToMm(1));
    else addLine(paths[step]!.lines, [piece.fromM, piece.toM]);
    drawn++;
  }
  context.lineCap = 'round';
  for (const [step, { lines, dots }] of paths.entries()) {
    context.strokeStyle = levels[step]!;
    context.fillStyle = levels[step]!;
    context.lineWidth = px * (PIECE_PX + ((STRONGEST_PX - PIECE_PX) * step) / (levels.length - 1));
    context.stroke(lines);
    context.fill(dots);
  }
  return drawn;
}

export const isUpright = ({ fromM, toM }: PieceDetail): boolean => fromM[0] === toM[0] && fromM[1] === toM[1];

/** The planes' sheet current as shaded cells. Returns how many were drawn. */
export function drawCells(context: CanvasRenderingContext2D, map: CurrentMap, palette: Palette): number {
  const top = largestOf(map.cells.map(({ densityRmsAPerM }) => densityRmsAPerM));
  const paths = palette.levels.map(() => new Path2D());
  const side = mToMm(map.cellM) * (1 + SEAM);
  for (const { atM, densityRmsAPerM } of map.cells) {
    const step = amplitudeStep(densityRmsAPerM, top, paths.length);
    if (step !== null) paths[step]!.rect(mToMm(atM[0]) - side / 2, mToMm(atM[1]) - side / 2, side, side);
  }
  for (const [step, path] of paths.entries()) {
    context.fillStyle = palette.levels[step]!;
    context.fill(path);
  }
  return map.cells.length;
}

/** Cables from their joint outwards; those whose current is known by colour and width, from point to point. */
export function drawCables(context: CanvasRenderingContext2D, scene: StillScene, px: number): number {
  const { palette, colouring } = scene;
  const solved = colouring === 'none' ? [] : (scene.currentMap?.cables ?? []);
  const isSolved = new Set(solved.map(({ name }) => name));
  context.lineCap = 'round';
  context.lineJoin = 'round';
  context.strokeStyle = palette.color('ink-quiet');
  context.lineWidth = CABLE_PX * px;
  for (const { name, pointsM } of scene.cables) {
    const path = new Path2D();
    addLine(path, pointsM);
    if (!isSolved.has(name)) context.stroke(path);
    drawJoint(context, pointsM[0], px, palette);
  }
  const top = largestOf(solved.flatMap(({ currentRmsA }) => currentRmsA));
  let drawn = scene.cables.length;
  for (const { pointsM, currentRmsA } of solved) {
    for (let i = 1; i < pointsM.length; i++) {
      const step = amplitudeStep((currentRmsA[i - 1]! + currentRmsA[i]!) / 2, top, palette.levels.length);
      context.strokeStyle = step === null ? palette.color('ink-quiet') : palette.levels[step]!;
      context.lineWidth = px * (step === null ? CABLE_PX : PIECE_PX + (3 * step) / palette.levels.length);
      const path = new Path2D();
      addLine(path, [pointsM[i - 1]!, pointsM[i]!]);
      context.stroke(path);
      drawn++;
    }
    drawJoint(context, pointsM[0], px, palette);
  }
  return drawn;
}

function drawJoint(
  context: CanvasRenderingContext2D,
  at: readonly number[] | undefined,
  px: number,
  palette: Palette,
): void {
  if (at === undefined) return;
  const path = new Path2D();
  addDot(path, at, (3.5 * px) / mToMm(1));
  context.save();
  context.fillStyle = palette.color('paper');
  context.strokeStyle = palette.color('ink');
  context.lineWidth = 1.3 * px;
  context.fill(path);
  context.stroke(path);
  context.restore();
}
