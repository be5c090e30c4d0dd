import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { SourcesFile } from '../../app/board/board-file.ts';
import { matchNames } from '../../app/board/net-pattern.ts';
import { mergeSources, parseBoardFile, parseSourcesFile } from '../../app/board/parse-board.ts';
import { appFailure } from '../support/app-failure.ts';
import { orchardBoard } from './example-board.ts';

const sources = (parts: object): SourcesFile =>
  parseSourcesFile({ format: 'quietboard-sources', version: 1, ...parts });
const merge = (parts: object) => mergeSources(parseBoardFile(orchardBoard()), sources(parts));

describe('mergeSources', () => {
  it('adds, and replaces what has the same name', () => {
    const fast = { name: 'clk', kind: 'trapezoid', frequencyMhz: 50, lowV: 0, highV: 1.8, riseNs: 1, fallNs: 1 };
    const merged = merge({
      waveforms: [fast, { ...fast, name: 'other' }],
      cables: [
        {
          name: 'valve cable',
          pointsMm: [
            [0, 0, 0],
            [0, 0, -1],
          ],
        },
      ],
    });
    expect(merged.waveforms!.map((waveform) => waveform.name)).toEqual(['pw', 'clk', 'other']);
    expect(merged.waveforms![1]).toMatchObject({ frequencyMhz: 50 });
    expect(merged.cables!.map((cable) => cable.pointsMm.length)).toEqual([2]);
    expect(merged.loops!.map((loop) => loop.name)).toEqual(['converter loop']);
  });

  it("replaces all of a net's drives and loads, and leaves other nets alone", () => {
    const merged = merge({ drives: [{ net: 'CLK', pin: 'R1.1', waveform: 'clk' }], loads: [{ net: 'DATA0' }] });
    expect(merged.drives).toMatchObject([{ net: 'CLK', pin: 'R1.1' }]);
    expect(merged.loads!.map((load) => load.net)).toEqual(['CLK', 'DATA0']);
  });

  it('expands patterns; a net named in full keeps to its own entry; planes and pinless nets are passed over', () => {
    const board = orchardBoard();
    board.nets.push({ name: 'DATA1' });
    const merged = mergeSources(
      parseBoardFile(board),
      sources({
        drives: [
          { net: '*', waveform: 'clk', sourceOhm: 33 },
          { net: 'CLK', waveform: 'clk', sourceOhm: 10 },
        ],
      }),
    );
    expect(merged.drives!.map(({ net, sourceOhm }) => [net, sourceOhm])).toEqual([
      ['DATA0', 33],
      ['CLK', 10],
    ]);
  });

  it('loads by pattern only what is driven, by the board file or the sources', () => {
    const loads = [{ net: '*', capacitancePf: 5 }];
    expect(merge({ loads }).loads!.map((load) => load.net)).toEqual(['CLK']);
    const drives = [{ net: 'DATA0', waveform: 'clk' }];
    expect(merge({ drives, loads }).loads!.map((load) => load.net)).toEqual(['CLK', 'DATA0']);
    expect(appFailure(() => merge({ loads: [{ net: 'DATA*' }] })).message).toContain('fits a driven net');
  });

  it.each<[string, object, string, string]>([
    ['a name without a net', { drives: [{ net: 'DATA', waveform: 'clk' }] }, 'drives[0].net', '(nearest: "DATA0")'],
    ['a pattern that fits nothing', { loads: [{ net: 'DATX*' }] }, 'loads[0].net', '(nearest: "DATA0")'],
    ['a pattern that fits only planes', { drives: [{ net: 'G*D', waveform: 'clk' }] }, 'drives[0].net', 'no plane'],
    ['an unknown pin', { loads: [{ net: 'CLK', pin: 'U9.1' }] }, 'loads[0].pin', 'a pin of net "CLK"'],
    ['an unknown waveform', { drives: [{ net: '*', waveform: 'clkk' }] }, 'drives[0].waveform', '(nearest: "clk")'],
    [
      'a name twice',
      {
        loops: [1, 2].map(() => ({
          name: 'l',
          pointsMm: [
            [0, 0, 0],
            [1, 0, 0],
            [0, 1, 0],
          ],
          waveform: 'pw',
        })),
      },
      'loops[1].name',
      'loops[0].name has it',
    ],
  ])('refuses %s with the place in the sources file', (_what, parts, path, message) => {
    const error = appFailure(() => merge(parts));
    expect(error.path).toBe(path);
    expect(error.message).toContain(message);
  });
});

describe('matchNames', () => {
  it('takes a name that holds a * of its own first', () => {
    expect(matchNames('D*', ['D1', 'D*', 'D2'])).toEqual(['D*']);
    expect(matchNames('D*1', ['D*', 'D1', 'DX1'])).toEqual(['D1', 'DX1']);
  });

  it('agrees with a regular expression of the same meaning', () => {
    const text = fc.string({ unit: fc.constantFrom('a', 'b', '*'), maxLength: 7 });
    fc.assert(
      fc.property(text, fc.string({ unit: fc.constantFrom('a', 'b'), maxLength: 9 }), (pattern, name) => {
        const expected = new RegExp(`^${pattern.replaceAll('*', '.*')}$`).test(name);
        expect(matchNames(pattern, [name]).length > 0).toBe(expected);
      }),
      { seed: 4711, numRuns: 5000 },
    );
  });
});
