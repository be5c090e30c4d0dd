/** Lines of the patterns as SVG paths. Levels below the span lie in the middle, or at the left edge. */

export interface PolarScale {
  readonly topDb: number;
  readonly spanDb: number;
  readonly radius: number;
}

const part = (level: number, topDb: number, spanDb: number): number =>
  Math.min(1, Math.max(0, 1 + (level - topDb) / spanDb));

const text = (number: number): string => number.toFixed(1);

/** Counter-clockwise from the right, as the board's axes are seen from above. */
export function polarPath(
  angleDeg: readonly number[],
  levels: readonly number[],
  { topDb, spanDb, radius }: PolarScale,
): string {
  const points = angleDeg.map((angle, i) => {
    const turn = (angle * Math.PI) / 180;
    const reach = radius * part(levels[i]!, topDb, spanDb);
    return `${text(reach * Math.cos(turn))} ${text(-reach * Math.sin(turn))}`;
  });
  return points.length === 0 ? '' : `M${points.join('L')}Z`;
}

const RING_DB = 10;

/** Rings at 0, 10, 20 dB below the top. */
export const ringLevels = ({ topDb, spanDb, radius }: PolarScale): { level: number; radius: number }[] =>
  Array.from({ length: Math.floor(spanDb / RING_DB) }, (_, i) => ({
    level: topDb - i * RING_DB,
    radius: radius * part(topDb - i * RING_DB, topDb, spanDb),
  }));

export interface HeightScale {
  readonly topDb: number;
  readonly spanDb: number;
  readonly lowM: number;
  readonly highM: number;
  readonly frame: { readonly left: number; readonly right: number; readonly top: number; readonly bottom: number };
}

export function heightPath(
  heightM: readonly number[],
  levels: readonly number[],
  { topDb, spanDb, lowM, highM, frame }: HeightScale,
): string {
  const points = heightM.map((height, i) => {
    const x = frame.left + part(levels[i]!, topDb, spanDb) * (frame.right - frame.left);
    const y = frame.bottom - ((height - lowM) / (highM - lowM)) * (frame.bottom - frame.top);
    return `${text(x)} ${text(y)}`;
  });
  return points.length === 0 ? '' : `M${points.join('L')}`;
}
