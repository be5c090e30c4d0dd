import { describe, expect, it } from 'vitest';
import { parseBoardFile, toBoard } from '../../app/board/parse-board.ts';
import { AppError } from '../../app/errors.ts';
import { orchardBoard } from './example-board.ts';

const failure = (run: () => unknown): AppError => {
  try {
    run();
  } catch (error) {
    if (error instanceof AppError) return error;
    throw error;
  }
  throw new Error('nothing was thrown');
};

describe('parseBoardFile', () => {
  it('takes the contract example and fills the defaults in', () => {
    const file = parseBoardFile(orchardBoard());
    expect(file.drives?.[0]).toMatchObject({ seriesOhm: 0, delayNs: 0, inverted: false });
    expect(toBoard(file).board.name).toBe('Orchard valve controller');
  });

  it('says path, what must be and what came', () => {
    const board = orchardBoard();
    board.nets[0]!.traces![0]!.widthMm = -0.2;
    const error = failure(() => parseBoardFile(board));
    expect(error.code).toBe('input');
    expect(error.path).toBe('nets[0].traces[0].widthMm');
    expect(error.message).toBe('nets[0].traces[0].widthMm must be a number greater than 0; received -0.2');
  });
});
