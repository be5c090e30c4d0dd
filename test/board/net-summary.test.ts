import { describe, expect, it } from 'vitest';
import { summarizeNets } from '../../app/board/net-summary.ts';
import { parseBoardFile, toBoard } from '../../app/board/parse-board.ts';
import { orchardBoard } from './example-board.ts';

describe('summarizeNets', () => {
  it('lists signals by length, then nets with planes, with what a sources file needs', () => {
    const file = orchardBoard();
    // Half of the plane gone: x < 25 has none under DATA0's first 15 of 40 mm (10 → 40 across, 10 mm up).
    file.planes![0]!.pointsMm = [
      [25, 0],
      [80, 0],
      [80, 50],
      [25, 50],
    ];
    const nets = summarizeNets(toBoard(parseBoardFile(file)).board);
    expect(nets.map((net) => net.name)).toEqual(['CLK', 'DATA0', 'GND']);
    const [clock, data, ground] = nets;
    expect(clock!.lengthM).toBeCloseTo(0.05, 12);
    expect(data!.lengthM).toBeCloseTo(0.04, 12);
    expect(clock).toMatchObject({ viaCount: 1, layers: ['TOP'], hasPlane: false, hasReturnPath: false });
    expect(clock!.drives[0]!.waveform).toBe('clk');
    expect(clock!.loads[0]!.pin).toBe('U2.7');
    expect(data!.pins.map((pin) => pin.name)).toEqual(['U1.4', 'J1.2']);
    expect(clock!.references.map(({ layer, net }) => [layer, net])).toEqual([['GND', 'GND']]);
    expect(data!.withoutReferenceM).toBeCloseTo(0.015, 12);
    expect(ground!.hasPlane).toBe(true);
  });
});
