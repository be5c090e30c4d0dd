import type { BoardFileInput } from '../../app/board/board-file.ts';
import { orchardBoard } from '../board/example-board.ts';

/** A net's name that a spreadsheet would run. */
export const FORMULA_NET = '=HYPERLINK("http://x.invalid","y")';
/** Clears a terminal and names its window. */
export const HOSTILE_BOARD = 'Orchard\u001b[2J\u001b]0;owned\u0007 <b>valve</b>';

/** One clock of 50 MHz on one short trace: four lines up to 400 MHz (odd harmonics), estimated in a moment. */
export function clockBoard(revision: string, highV: number): BoardFileInput {
  const board = orchardBoard();
  board.revision = revision;
  board.waveforms = [{ name: 'clk', kind: 'trapezoid', frequencyMhz: 50, lowV: 0, highV, riseNs: 1, fallNs: 1 }];
  board.loops = [];
  board.cables = [];
  board.structure = { planes: 'pair-only' };
  return board;
}

/** The same with names that attack whatever shows them. */
export function hostileClockBoard(revision: string, highV: number): BoardFileInput {
  const board = clockBoard(revision, highV);
  const renamed = (name: string) => (name === 'CLK' ? FORMULA_NET : name);
  return {
    ...board,
    name: HOSTILE_BOARD,
    nets: board.nets?.map((net) => ({ ...net, name: renamed(net.name) })),
    drives: board.drives?.map((drive) => ({ ...drive, net: renamed(drive.net) })),
    loads: board.loads?.map((load) => ({ ...load, net: renamed(load.net) })),
  } as BoardFileInput;
}

/** Options that keep an estimate short. */
export const SHORT = ['--max-mhz', '400'];

/** Columns of the widest line. */
export const widthOf = (text: string): number => Math.max(...text.split('\n').map((line) => Array.from(line).length));

/** Whether nothing in a text moves a terminal's cursor or the direction of writing: no control or format character. */
export const isPlain = (text: string): boolean => !/[\p{Cc}\p{Cf}]/u.test(text.replaceAll('\n', ''));
