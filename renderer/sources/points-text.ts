/** Pairs of numbers as text, one pair a line. */

export const pointsText = (points: readonly (readonly [number, number])[]): string =>
  points.map(([timeNs, value]) => `${timeNs} ${value}`).join('\n');

const LEAST = 2;

/** The pairs, or what must be typed instead. Numbers are parted by spaces, tabs, semicolons or commas. */
export function parsePoints(text: string): [number, number][] | string {
  const rows = text.split('\n').filter((row) => row.trim() !== '');
  const points: [number, number][] = [];
  for (const [i, row] of rows.entries()) {
    const cells = row.trim().split(/[\s;,]+/);
    const [time, value] = cells.map(Number);
    if (cells.length !== 2 || !Number.isFinite(time) || !Number.isFinite(value)) {
      return `Line ${i + 1} must be two numbers, for example "5 12"; it is "${row.trim().slice(0, 40)}"`;
    }
    points.push([time!, value!]);
  }
  return points.length < LEAST ? `Must be at least ${LEAST} lines` : points;
}
