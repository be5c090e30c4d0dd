import type { Board } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { BREAK, type Column, joined, name, note, type Section, type Text, table } from '../blocks.ts';
import { type Emitter, emittersOf } from '../causes.ts';
import { isItself, KIND_REMARK, pathsOf, pathText } from '../contributor-text.ts';
import { frequencyText, levelText, marginText } from '../format.ts';
import { printed } from '../number.ts';

const MOST_ROWS = 12;
const MOST_LAYERS = 4;
const MOST_FINDINGS = 6;

const COLUMNS: readonly Column[] = [
  { head: 'No.', width: 4.5, isNumber: true },
  { head: 'Net, loop or cable', width: 27, isStrong: true },
  { head: 'Layers', width: 15 },
  { head: 'Strongest at', width: 13, isWhole: true },
  { head: ['By itself', BREAK, 'dBµV/m'], width: 10, isNumber: true },
  { head: ['Margin', BREAK, 'dB'], width: 8, isNumber: true },
  { head: ['Radiates', BREAK, 'mainly from'], width: 17 },
  { head: 'Findings', width: 9 },
];

/** Who emits, in the order of what each does by itself against the limit. */
export function emittersSection(board: Board, result: EstimateResult): Section {
  const title = 'Contributors';
  const emitters = emittersOf(result);
  if (emitters.length === 0) return { title, blocks: [] };
  const left = emitters.length - MOST_ROWS;
  return {
    title,
    blocks: [
      table(
        COLUMNS,
        emitters.slice(0, MOST_ROWS).map((emitter, i) => row(emitter, i, board, result)),
      ),
      note(
        `Each at the line where it comes nearest to the limit, or farthest over it, by itself.${left > 0 ? ` And ${left} more, weaker ones.` : ''}`,
      ),
    ],
  };
}

function row({ contributor, point, ownMarginDb }: Emitter, i: number, board: Board, result: EstimateResult): Text[] {
  const path = pathsOf(contributor)[0];
  const remark = KIND_REMARK[contributor.kind];
  return [
    String(i + 1),
    [name(contributor.name, 30), remark !== '' && ` (${remark})`],
    layersText(contributor.kind === 'net' ? contributor.name : undefined, board),
    frequencyText(point.frequencyHz),
    printed(levelText(contributor.levelDbuvPerM)),
    printed(marginText(ownMarginDb)),
    path && (isItself(contributor, path) ? 'itself' : name(pathText(path.name), 24)),
    contributor.kind === 'net' && findingsText(contributor.name, result),
  ];
}

function layersText(netName: string | undefined, board: Board): Text {
  const net = board.nets.find((one) => one.name === netName);
  if (!net) return '';
  const indices = [...new Set(net.traces.map(({ layerIndex }) => layerIndex))].sort((one, other) => one - other);
  const names = indices.slice(0, MOST_LAYERS).map((index) => name(board.stackup[index]?.name ?? '', 16));
  return [joined(names, ', '), indices.length > MOST_LAYERS && ' …'];
}

function findingsText(netName: string, { findings }: EstimateResult): string {
  const numbers = findings.flatMap(({ net }, i) => (net === netName ? [String(i + 1)] : []));
  return `${numbers.slice(0, MOST_FINDINGS).join(', ')}${numbers.length > MOST_FINDINGS ? ' …' : ''}`;
}
