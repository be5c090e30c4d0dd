import type { ResultPoint } from '../../app/estimate/result.ts';
import { hzToMhz } from '../../app/units/convert.ts';
import type { Palette } from '../theme/palette.ts';

/** Puts a canvas on the clipboard as a picture, on paper of the theme. */
export async function copyPicture(canvas: HTMLCanvasElement, palette: Palette): Promise<void> {
  const copy = document.createElement('canvas');
  copy.width = canvas.width;
  copy.height = canvas.height;
  const context = copy.getContext('2d')!;
  context.fillStyle = palette.color('paper');
  context.fillRect(0, 0, copy.width, copy.height);
  context.drawImage(canvas, 0, 0);
  const blob = await new Promise<Blob | null>((resolve) => copy.toBlob(resolve, 'image/png'));
  await navigator.clipboard.write([new ClipboardItem({ 'image/png': blob! })]);
}

const HEADS = [
  'MHz',
  'detector',
  'dBµV/m',
  'limit dBµV/m',
  'margin dB',
  'polarisation',
  'height m',
  'angle °',
  'mainly',
];

/** Lines as a table for a spreadsheet: tabs between the cells, and no name that would be taken for a formula. */
export const pointsTable = (points: readonly ResultPoint[]): string =>
  [
    HEADS,
    ...points.map((point) => [
      hzToMhz(point.frequencyHz),
      point.detector,
      point.levelDbuvPerM,
      point.limitDbuvPerM,
      point.marginDb,
      point.polarization,
      point.antennaHeightM,
      point.turntableDeg,
      plainCell(point.contributors[0]?.name ?? ''),
    ]),
  ]
    .map((row) => row.join('\t'))
    .join('\n');

const plainCell = (text: string): string => {
  const flat = text.replaceAll(/\s+/g, ' ');
  return /^[=+\-@]/.test(flat) ? `'${flat}` : flat;
};

export const copyPoints = (points: readonly ResultPoint[]): Promise<void> =>
  navigator.clipboard.writeText(pointsTable(points));
