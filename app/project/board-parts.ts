import type { BoardFile } from '../board/board-file.ts';

/** The board's document in two parts that change at different times: the copper, and what switches on it. */
export type LayoutPart = Omit<BoardFile, 'waveforms' | 'drives' | 'loads' | 'loops' | 'cables'>;
export type SourcesPart = Pick<BoardFile, 'waveforms' | 'drives' | 'loads' | 'loops' | 'cables'>;

/** Splits a board's document; `joinParts` is the inverse up to the order of keys. */
export function splitParts(board: BoardFile): { layout: LayoutPart; sources: SourcesPart } {
  const { waveforms, drives, loads, loops, cables, ...layout } = board;
  const sources: SourcesPart = {
    ...(waveforms && { waveforms }),
    ...(drives && { drives }),
    ...(loads && { loads }),
    ...(loops && { loops }),
    ...(cables && { cables }),
  };
  return { layout, sources };
}

export const joinParts = (layout: LayoutPart, sources: SourcesPart): BoardFile => ({ ...layout, ...sources });
