import type { Chart } from 'chart.js';
import type { Caveat } from '../../app/errors.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { clipLine, type ReportLimitLine } from '../../app/report/figures/limit-lines.ts';
import { standingOf } from '../../app/report/verdict.ts';
import { drawMark } from '../components/marks/draw-mark.ts';
import type { Measurement } from '../state/app-store.ts';
import type { Palette } from '../theme/palette.ts';
import { vertical } from './strokes.ts';

export interface SpectrumScene {
  readonly points: readonly ResultPoint[];
  /** The kept state. */
  readonly ghosts: readonly ResultPoint[];
  readonly limitLines: readonly ReportLimitLine[];
  readonly requiredMarginDb: number;
  readonly measurements: readonly Measurement[];
  readonly caveats: readonly Caveat[];
  readonly chosen: ResultPoint | null;
  readonly hoveredHz: number | null;
  /** Its share of every line is drawn. */
  readonly net: string | null;
  readonly range: readonly [number, number];
}

/** More marks than this would be a grey band: lines that are fine are then dots. */
const MOST_RINGS = 300;
const LIMIT_DASHES = { 'quasi-peak': [], average: [6, 3], peak: [2, 3] } as const;

/** Everything on the axes: limit lines, required margin, caveats, ghosts, lines with their standing, shares, measurements. */
export function drawSpectrum(chart: Chart, scene: SpectrumScene, palette: Palette): void {
  const { ctx, chartArea: area } = chart;
  const xScale = chart.scales.x!;
  const yScale = chart.scales.y!;
  const x = (frequencyHz: number) => xScale.getPixelForValue(frequencyHz);
  const y = (level: number) => yScale.getPixelForValue(level);
  const isSeen = ({ frequencyHz }: { readonly frequencyHz: number }) =>
    frequencyHz >= scene.range[0] && frequencyHz <= scene.range[1];
  const seen = scene.points.filter(isSeen);
  ctx.save();
  ctx.beginPath();
  ctx.rect(area.left, area.top, area.width, area.height);
  ctx.clip();
  ctx.font = `11px ${palette.font}`;

  drawCaveats(ctx, scene, x, area, palette);
  drawLimits(ctx, scene, x, y, palette);
  if (scene.chosen !== null)
    vertical(ctx, palette.color('focus'), 2, x(scene.chosen.frequencyHz), area.top, area.bottom);
  for (const ghost of scene.ghosts.filter(isSeen))
    dash(ctx, palette.color('ghost'), x(ghost.frequencyHz), y(ghost.levelDbuvPerM));
  for (const point of seen) {
    const isHovered = point.frequencyHz === scene.hoveredHz;
    const top = y(point.levelDbuvPerM);
    vertical(
      ctx,
      palette.color(isHovered ? 'focus' : 'bar-path'),
      isHovered ? 2 : 1,
      x(point.frequencyHz),
      top,
      area.bottom,
    );
  }
  if (scene.net !== null) drawShare(ctx, scene.net, seen, x, y, area.bottom, palette);
  for (const point of seen.toReversed()) {
    const at = { x: x(point.frequencyHz), y: y(point.levelDbuvPerM) };
    const standing = standingOf(point, scene.requiredMarginDb);
    if (standing === 'fine' && seen.length > MOST_RINGS) {
      ctx.fillStyle = palette.color('fine');
      ctx.fillRect(at.x - 1, at.y - 1, 2, 2);
    } else drawMark(ctx, standing, at, palette, 0.8);
  }
  for (const [i, { points }] of scene.measurements.entries()) {
    ctx.strokeStyle = palette.color(i % 2 === 0 ? 'category-4' : 'category-6');
    ctx.lineWidth = 1.5;
    for (const point of points.filter(isSeen)) cross(ctx, x(point.frequencyHz), y(point.levelDbuvPerM));
  }
  drawLimitLabels(ctx, scene, x, y, area, palette);
  ctx.restore();
}

type Area = Chart['chartArea'];
type To = (value: number) => number;

function drawLimits(ctx: CanvasRenderingContext2D, scene: SpectrumScene, x: To, y: To, palette: Palette): void {
  for (const { detector, points } of scene.limitLines) {
    const corners = clipLine(points, ...scene.range);
    if (corners.length === 0) continue;
    const trace = (dropDb: number) => {
      for (const [i, [frequencyHz, level]] of corners.entries()) {
        if (i === 0) ctx.moveTo(x(frequencyHz), y(level - dropDb));
        else ctx.lineTo(x(frequencyHz), y(level - dropDb));
      }
    };
    if (scene.requiredMarginDb > 0) {
      ctx.globalAlpha = 0.25;
      ctx.fillStyle = palette.color('short-fill');
      ctx.beginPath();
      trace(0);
      for (const [frequencyHz, level] of corners.toReversed())
        ctx.lineTo(x(frequencyHz), y(level - scene.requiredMarginDb));
      ctx.fill();
      ctx.globalAlpha = 1;
    }
    ctx.strokeStyle = palette.color('ink');
    ctx.lineWidth = 1.5;
    ctx.setLineDash([...LIMIT_DASHES[detector]]);
    ctx.beginPath();
    trace(0);
    ctx.stroke();
    ctx.setLineDash([]);
  }
}

const TEXT_PX = 12;

/** At the end of each limit line, above it, or below where there is no room; over the lines, on paper of their own. */
function drawLimitLabels(
  ctx: CanvasRenderingContext2D,
  { limitLines, range }: SpectrumScene,
  x: To,
  y: To,
  area: Area,
  palette: Palette,
): void {
  const taken: number[] = [];
  ctx.textAlign = 'right';
  ctx.lineJoin = 'round';
  for (const { points, label } of limitLines) {
    const end = clipLine(points, ...range).at(-1);
    if (end === undefined) continue;
    const lineY = y(end[1]);
    const isRoomAbove = lineY - TEXT_PX - 4 > area.top;
    let textY = isRoomAbove ? lineY - 4 : lineY + TEXT_PX;
    while (taken.some((other) => Math.abs(other - textY) < TEXT_PX)) textY += isRoomAbove ? -TEXT_PX : TEXT_PX;
    taken.push(textY);
    const textX = Math.min(x(end[0]), area.right) - 3;
    ctx.strokeStyle = palette.color('paper');
    ctx.lineWidth = 4;
    ctx.strokeText(label, textX, textY);
    ctx.fillStyle = palette.color('ink');
    ctx.fillText(label, textX, textY);
  }
  ctx.textAlign = 'left';
}

/** Where the model has its limits: a hatched bar at the top. */
function drawCaveats(ctx: CanvasRenderingContext2D, scene: SpectrumScene, x: To, area: Area, palette: Palette): void {
  for (const { fromHz, toHz } of scene.caveats) {
    if (toHz === 0) continue;
    const from = Math.max(area.left, x(Math.max(fromHz, scene.range[0])));
    const to = Math.min(area.right, x(Math.min(toHz, scene.range[1])));
    if (!(to > from)) continue;
    ctx.strokeStyle = palette.color('edge');
    ctx.lineWidth = 1;
    ctx.beginPath();
    for (let at = from; at < to; at += 5) {
      ctx.moveTo(at, area.top + 5);
      ctx.lineTo(Math.min(at + 5, to), area.top);
    }
    ctx.stroke();
  }
}

/** What one net makes of every line by itself. */
function drawShare(
  ctx: CanvasRenderingContext2D,
  net: string,
  points: readonly ResultPoint[],
  x: To,
  y: To,
  bottom: number,
  palette: Palette,
): void {
  ctx.fillStyle = palette.color('category-1');
  for (const point of points) {
    const share = point.contributors.find(({ name }) => name === net);
    if (share === undefined) continue;
    const top = y(share.levelDbuvPerM);
    vertical(ctx, palette.color('category-1'), 2, x(point.frequencyHz), Math.min(top, bottom), bottom);
    ctx.fillRect(x(point.frequencyHz) - 3, top - 1, 6, 2);
  }
}

function dash(ctx: CanvasRenderingContext2D, color: string, x: number, y: number): void {
  ctx.fillStyle = color;
  ctx.fillRect(x - 4, y - 1, 8, 2);
}

function cross(ctx: CanvasRenderingContext2D, x: number, y: number): void {
  ctx.beginPath();
  ctx.moveTo(x - 4, y - 4);
  ctx.lineTo(x + 4, y + 4);
  ctx.moveTo(x - 4, y + 4);
  ctx.lineTo(x + 4, y - 4);
  ctx.stroke();
}
