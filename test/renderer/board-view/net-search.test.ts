import { describe, expect, it } from 'vitest';
import type { Net } from '../../../app/board/board.ts';
import { cycled, searchNets } from '../../../renderer/board-view/net-search.ts';

/** Oracle: what a user who types a part of a name expects, written out. */

const nets = ['DATA10', 'DATA2', 'CLK_25M', 'clk', 'GND', '+3V3', 'CLK_EN'].map(
  (name): Net => ({ name, traces: [], vias: [], pins: [] }),
);
const found = (query: string) => searchNets(nets, query).map(({ name }) => name);

describe('searching nets', () => {
  it('finds parts of names whatever their case, in the order people count', () => {
    expect(found('data')).toEqual(['DATA2', 'DATA10']);
    expect(found('CLK 25')).toEqual(['CLK_25M']);
    expect(found('nothing')).toEqual([]);
    expect(found('')).toHaveLength(nets.length);
  });

  it('puts the exact name first and takes signs as they are', () => {
    expect(found('CLK')[0]).toBe('clk');
    expect(found('+3')).toEqual(['+3V3']);
  });

  it('steps round and round, from elsewhere to the first', () => {
    const names = ['A', 'B', 'C'];
    expect(cycled(names, null, 1)).toBe('A');
    expect(cycled(names, 'C', 1)).toBe('A');
    expect(cycled(names, 'A', -1)).toBe('C');
    expect(cycled(names, 'elsewhere', -1)).toBe('C');
    expect(cycled([], 'A', 1)).toBeUndefined();
  });
});
