import type { Board, Net } from '../../app/board/board.ts';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { frequencyText, levelText, quantityText } from '../i18n/format.ts';

/** What one wants to know of a net at a glance, as short phrases. */
export function netFacts(board: Board, net: Net, point: ResultPoint | null): string[] {
  const facts: string[] = [];
  const layers = layersOf(board, net);
  if (net.traces.length > 0) facts.push(`${quantityText(lengthOf(net), 'm')} on ${layers.join(', ')}`);
  const planes = board.planes.filter((plane) => plane.net === net.name);
  if (planes.length > 0) facts.push(`plane on ${namesOf(board, planes).join(', ')}`);
  facts.push(drivenText(board, net.name));
  const share = point?.contributors.find(({ kind, name }) => kind === 'net' && name === net.name);
  if (point !== null && share !== undefined) {
    facts.push(`${levelText(share.levelDbuvPerM)} dBµV/m of the ${frequencyText(point.frequencyHz)} line`);
  }
  return facts;
}

export const lengthOf = ({ traces }: Net): number =>
  traces.reduce(
    (sum, { pointsM }) =>
      sum +
      pointsM.reduce(
        (length, [xM, yM], i) => (i === 0 ? 0 : length + Math.hypot(xM - pointsM[i - 1]![0], yM - pointsM[i - 1]![1])),
        0,
      ),
    0,
  );

const layersOf = (board: Board, net: Net): string[] => namesOf(board, net.traces);

const namesOf = (board: Board, items: readonly { readonly layerIndex: number }[]): string[] =>
  [...new Set(items.map(({ layerIndex }) => layerIndex))]
    .sort((a, b) => a - b)
    .map((index) => board.stackup[index]?.name ?? '');

function drivenText(board: Board, net: string): string {
  const drives = board.drives.filter((drive) => drive.net === net);
  if (drives.length === 0) return 'not driven';
  return drives.map(({ pin, waveform }) => `driven at ${pin} by ${waveform}`).join(', ');
}
