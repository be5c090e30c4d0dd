import { expect, it } from 'vitest';
import type { Net } from '../../app/board/board.ts';
import { proposeNet } from '../../app/board/propose-nets.ts';

/** Names as boards of the trade carry them (common practice), and what a reader takes them for. */
const net = (name: string, pinCount = 2): Net => ({
  name,
  traces: [
    {
      layerIndex: 0,
      widthM: 2e-4,
      pointsM: [
        [0, 0],
        [0.01, 0],
      ],
    },
  ],
  vias: [],
  pins: Array.from({ length: pinCount }, (_, i) => ({ name: `U${i}.1`, atM: [i / 100, 0], layerIndex: 0 })),
});

it.each([
  ['CLK_25M', 'clock'],
  ['SPI_SCK', 'clock'],
  ['/mcu/SWCLK', 'clock'],
  ['RefClk', 'clock'],
  ['XTAL1', 'clock'],
  ['SPI_MOSI', 'data'],
  ['USB_D+', 'data'],
  ['BUCK_SW', 'switching'],
  ['CLICK_SENSE', undefined],
  ['GND', undefined],
  ['Net-(R12-Pad2)', undefined],
])('%s', (name, proposal) => {
  expect(proposeNet(net(name))).toBe(proposal);
});

it('proposes no net that cannot switch', () => {
  expect(proposeNet(net('CLK', 1))).toBeUndefined();
  expect(proposeNet({ ...net('CLK'), traces: [] })).toBeUndefined();
});
