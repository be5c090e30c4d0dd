import type { Net } from './board.ts';

/** What a net's name suggests it carries. A proposal for the user, never used in an estimate. */
export type Proposal = 'clock' | 'data' | 'switching';

/**
 * Words of net names, common practice of the trade: parts between separators and digits, so that `SPI_CLK` and `CLK25M` tell
 * of a clock and `CLICK` does not.
 */
const WORDS: readonly (readonly [Proposal, ReadonlySet<string>])[] = [
  [
    'clock',
    new Set([
      'clk',
      'clock',
      'clkin',
      'clkout',
      'osc',
      'xtal',
      'mclk',
      'bclk',
      'sclk',
      'sck',
      'scl',
      'swclk',
      'tck',
      'lrck',
      'refclk',
      'pclk',
    ]),
  ],
  ['switching', new Set(['sw', 'lx', 'phase', 'pwm', 'gate'])],
  [
    'data',
    new Set([
      'mosi',
      'miso',
      'sdi',
      'sdo',
      'sda',
      'txd',
      'rxd',
      'tx',
      'rx',
      'dq',
      'dqs',
      'data',
      'swdio',
      'usb',
      'can',
      'rgmii',
      'rmii',
      'mii',
      'sdio',
      'cmd',
      'lvds',
      'rs',
    ]),
  ],
];

/** By the net's name and only where the net has copper and two pins to switch between; undefined: nothing is suggested. */
export function proposeNet({ name, traces, pins }: Net): Proposal | undefined {
  if (traces.length === 0 || pins.length < 2) return undefined;
  const words = name
    .slice(0, 200)
    .replaceAll(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase()
    .split(/[^a-z]+/);
  return WORDS.find(([, known]) => words.some((word) => known.has(word)))?.[0];
}
