import { readFileSync } from 'node:fs';
import { test } from 'vitest';
import { mergeSources, parseBoardFile, parseSourcesFile, toBoard } from '../../app/board/parse-board.ts';
import { prepareLevers } from '../../app/levers/levers.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { requestOf } from '../support/estimates.ts';
import { expectFresh } from './support.ts';

const jsonOf = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`../../samples/valve-controller/${name}`, import.meta.url), 'utf8'));
const board = toBoard(
  mergeSources(parseBoardFile(jsonOf('rev-b.board.json')), parseSourcesFile(jsonOf('rev-b.sources.json'))),
).board;
const request = (maxHz: number) =>
  requestOf({
    request: {
      structure: 'solved',
      maxHz,
      limits: chooseLimits({ standard: 'CISPR 32', class: 'B', distanceM: 3, convertDistance: false }),
    },
  });

const changes = {
  'a slower clock edge': {
    ...board,
    waveforms: board.waveforms.map((w) => (w.name === 'clk' ? { ...w, rise1090S: 3e-9, fall1090S: 3e-9 } : w)),
  },
  'a series resistor': {
    ...board,
    drives: board.drives.map((drive) => (drive.net === 'SPI_MOSI' ? { ...drive, seriesOhm: 47 } : drive)),
  },
  'another load': {
    ...board,
    loads: board.loads.map((load) => (load.net === 'RS485_D' ? { ...load, capacitanceF: 22e-12 } : load)),
  },
};

test('the sample up to 70 MHz, every line solved', () => {
  const levers = prepareLevers(board, request(70e6));
  for (const changed of Object.values(changes)) expectFresh(levers, changed, request(70e6));
});

test('the sample up to 110 MHz, where the estimate interpolates planes and cables over frequency: within that error', () => {
  const levers = prepareLevers(board, request(110e6));
  for (const changed of Object.values(changes)) expectFresh(levers, changed, request(110e6), 0.1);
});
