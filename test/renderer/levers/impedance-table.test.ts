import { describe, expect, it } from 'vitest';
import { boardFileSchema } from '../../../app/board/board-file.ts';
import { impedanceText, parseImpedance } from '../../../renderer/levers/impedance-table.ts';

/** Oracle: the board file's own rule for these rows. */

describe('a pasted impedance table', () => {
  it('is read whatever parts its cells, and is what the file takes', () => {
    const rows = parseImpedance('25 40 30\n100\t120;45\n\n300, 180, -10\n');
    expect(rows).toEqual([
      [25, 40, 30],
      [100, 120, 45],
      [300, 180, -10],
    ]);
    const cables = boardFileSchema.shape.cables.parse([
      {
        name: 'c',
        pointsMm: [
          [0, 0, 0],
          [1, 0, 0],
        ],
        seriesImpedance: rows,
      },
    ]);
    expect(cables![0]!.seriesImpedance).toEqual(rows);
    expect(parseImpedance(impedanceText(rows as never))).toEqual(rows);
  });

  it('says which line is wrong and what must stand there', () => {
    expect(parseImpedance('25 40 30\n100 x 3')).toMatch(/^Line 2 must be three numbers/);
    expect(parseImpedance('25 40')).toMatch(/^Line 1 must be three numbers/);
    expect(parseImpedance('25 40 1\n25 40 1')).toMatch(/^Line 2 .*higher frequency/);
    expect(parseImpedance('25 -4 1')).toMatch(/^Line 1 .*at least 0/);
    expect(parseImpedance(' \n')).toMatch(/at least one line/);
  });
});
