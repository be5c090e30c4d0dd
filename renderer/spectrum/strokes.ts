/** A line straight up or down, CSS pixels. */
export function vertical(
  context: CanvasRenderingContext2D,
  color: string,
  width: number,
  x: number,
  y1: number,
  y2: number,
): void {
  context.strokeStyle = color;
  context.lineWidth = width;
  context.beginPath();
  context.moveTo(x, y1);
  context.lineTo(x, y2);
  context.stroke();
}
