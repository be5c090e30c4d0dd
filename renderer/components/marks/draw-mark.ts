import { markPath } from '../../../app/report/figures/marks.ts';
import type { Standing } from '../../../app/report/verdict.ts';
import type { Palette } from '../../theme/palette.ts';

/** The marks of `StandingMark` on a canvas; `scale` 1 makes them about 10 wide. */
export function drawMark(
  context: CanvasRenderingContext2D,
  standing: Standing,
  at: { readonly x: number; readonly y: number },
  palette: Palette,
  scale = 1,
): void {
  const { outline, half } = pathsOf(standing);
  context.save();
  context.translate(at.x, at.y);
  context.scale(scale, scale);
  context.lineWidth = standing === 'over' ? 0.7 : 1.1;
  context.fillStyle = standing === 'over' ? palette.color('over') : palette.color('paper');
  context.strokeStyle = palette.color(standing === 'over' ? 'paper' : standing);
  context.fill(outline);
  if (half !== null) {
    context.fillStyle = palette.color('short-fill');
    context.fill(half);
  }
  context.stroke(outline);
  context.restore();
}

interface MarkPaths {
  readonly outline: Path2D;
  readonly half: Path2D | null;
}

const cache = new Map<Standing, MarkPaths>();

function pathsOf(standing: Standing): MarkPaths {
  const known = cache.get(standing);
  if (known !== undefined) return known;
  const { outline, half } = markPath(standing, 0, 0);
  const made = { outline: new Path2D(outline), half: half === '' ? null : new Path2D(half) };
  cache.set(standing, made);
  return made;
}
