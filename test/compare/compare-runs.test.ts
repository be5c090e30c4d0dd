import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, expectTypeOf, it } from 'vitest';
import type { z } from 'zod';
import type { BoardFileInput } from '../../app/board/board-file.ts';
import { mergeSources, parseBoardFile, parseSourcesFile } from '../../app/board/parse-board.ts';
import { compareRuns } from '../../app/compare/compare-runs.ts';
import { comparisonSchema } from '../../app/compare/comparison-schema.ts';
import { headlineText } from '../../app/compare/run-text.ts';
import type { ComparedRun, Comparison, LineChange } from '../../app/compare/types.ts';
import type { EstimateResult, ResultPoint } from '../../app/estimate/result.ts';
import { boardFile, estimateOf, netFile } from '../support/estimates.ts';
import { HOSTILE_NAMES, hostileResult } from '../support/hostile-names.ts';
import { emptyResult, resultWith, sampleResult } from '../support/sample-result.ts';
import { storedRun } from '../support/stored-runs.ts';

/** Read-only all the way down, so that only the shapes are compared. */
type Frozen<T> = T extends object ? { readonly [K in keyof T]: Frozen<T[K]> } : T;

/** The sample with levels moved by so many dB, some lines away. */
function moved(result: EstimateResult, changesDb: readonly number[]): EstimateResult {
  const points = result.points.flatMap((point, i): ResultPoint[] => {
    const changeDb = changesDb[i % changesDb.length]!;
    if (changeDb > 9.5) return [];
    const up = (db: number) => db + changeDb;
    return [
      {
        ...point,
        levelDbuvPerM: up(point.levelDbuvPerM),
        marginDb: point.marginDb - changeDb,
        contributors: point.contributors.map((each) => ({
          ...each,
          levelDbuvPerM: up(each.levelDbuvPerM),
          viaDbuvPerM: Object.fromEntries(Object.entries(each.viaDbuvPerM).map(([name, db]) => [name, up(db)])),
        })),
      },
    ];
  });
  return resultWith(points);
}

const someBoard = boardFile({
  nets: [
    netFile('CLK_25M'),
    netFile('SPI_SCK', [
      [4, 4],
      [22, 4],
    ]),
  ],
});
const otherBoard = boardFile({
  nets: [
    netFile('CLK_25M', [
      [9, 12],
      [30, 12],
    ]),
    netFile('DATA0', [
      [4, 8],
      [22, 8],
    ]),
  ],
});

describe('a comparison', () => {
  it('of a run with itself has no change but unchanged lines', () => {
    const run = storedRun(someBoard);
    const same = compareRuns(run, run);
    expect(same.changes).toEqual([]);
    expect(same.warnings).toEqual([]);
    expect(same.worstMarginChangeDb).toBe(0);
    expect(same.lines).toHaveLength(run.result.points.length);
    expect(same.lines.every(({ status, marginChangeDb }) => status === 'unchanged' && marginChangeDb === 0)).toBe(true);
    expect(same.bands.every(({ marginChangeDb }) => marginChangeDb === 0 || marginChangeDb === null)).toBe(true);
  });

  it('the other way round is its mirror image', () => {
    const changes = fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 1, maxLength: 40 });
    fc.assert(
      fc.property(changes, changes, (one, other) => {
        const [a, b] = [
          storedRun(someBoard, moved(sampleResult(), one)),
          storedRun(otherBoard, moved(sampleResult(), other)),
        ];
        const [there, back] = [compareRuns(a, b), compareRuns(b, a)];
        expect(there.lines.map(mirrored)).toEqual(
          back.lines.map(({ causes, ...line }) => ({ ...line, causes: causes.length })),
        );
        expect(there.changes).toHaveLength(back.changes.length);
        expect(new Set(there.changes.map(subjectOf))).toEqual(new Set(back.changes.map(subjectOf)));
        expect(there.bands.map(({ before, after }) => [after, before])).toEqual(
          back.bands.map(({ before, after }) => [before, after]),
        );
        expect(there.counts.better).toBe(back.counts.worse);
        expect(there.counts.newlyOver).toBe(back.counts.newlyUnder);
      }),
      { seed: 77, numRuns: 25 },
    );
  });

  it('has the shape of its schema, key by key (checked by the compiler), and survives JSON', () => {
    expectTypeOf<Frozen<z.output<typeof comparisonSchema>>>().toEqualTypeOf<Frozen<Comparison>>();
    const comparison = compareRuns(storedRun(someBoard), storedRun(otherBoard, moved(sampleResult(), [1, -2, 9.9])));
    const json: unknown = JSON.parse(JSON.stringify(comparison));
    expect(comparisonSchema.parse(json)).toEqual(comparison);
  });

  it('copes with runs without any line', () => {
    const [none, some] = [storedRun(someBoard, emptyResult()), storedRun(someBoard, sampleResult())];
    expect(compareRuns(none, none)).toMatchObject({ worstMarginChangeDb: null, lines: [] });
    expect(compareRuns(none, some).headline).toContain('(before no line in the judged range)');
    expect(compareRuns(some, none).headline).toContain('no line in the judged range (was');
    expect(compareRuns(some, none).lines.every(({ status }) => status === 'gone')).toBe(true);
  });

  it('takes any name without letting it into a sentence raw', () => {
    const names = HOSTILE_NAMES.map((name) => name.slice(0, 900));
    const nets = (shift: number) =>
      names.map((name, i) =>
        netFile(name, [
          [1 + i, 2],
          [1 + i, 20 + shift],
        ]),
      );
    const board = (shift: number): BoardFileInput =>
      boardFile({
        name: names[shift]!,
        nets: nets(shift),
        cables: names.map((name, i) => ({
          name,
          pointsMm: [
            [0, i, 0],
            [-100 - 10 * shift, i, 0],
          ],
        })),
        waveforms: names.map((name) => ({ name, kind: 'lines', lines: [{ frequencyMhz: 50, amplitudeV: 1 + shift }] })),
        drives: names.map((name) => ({ net: name, waveform: name })),
      });
    const comparison = compareRuns(storedRun(board(0), hostileResult()), storedRun(board(1), hostileResult()));
    const texts = [
      comparison.headline,
      ...comparison.changes.map(({ text }) => text),
      ...comparison.warnings.map(({ message }) => message),
    ];
    expect(comparison.changes.length).toBeGreaterThan(3 * names.length);
    for (const text of texts) {
      expect(text).not.toMatch(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/u);
      expect(text.length).toBeLessThan(2500);
    }
    expect(comparisonSchema.safeParse(JSON.parse(JSON.stringify(comparison))).success).toBe(true);
  });

  it('keeps up with thousands of nets', () => {
    const nets = (shiftMm: number) =>
      Array.from({ length: 4000 }, (_, n) => ({
        name: `N${n}`,
        traces: [
          {
            layer: 'TOP',
            widthMm: 0.2,
            pointsMm: Array.from({ length: 20 }, (_, i): [number, number] => [
              i + (n % 50),
              n / 100 + (i % 2) + shiftMm,
            ]),
          },
        ],
      }));
    const [one, other] = [
      storedRun(boardFile({ nets: nets(0) }), emptyResult()),
      storedRun(boardFile({ nets: nets(0.5) }), emptyResult()),
    ];
    const startMs = performance.now();
    expect(compareRuns(one, other).changes).toHaveLength(4000);
    // 80 000 pieces take about 0.5 s here; quadratic work would take minutes.
    expect(performance.now() - startMs).toBeLessThan(10_000);
  });
});

const subjectOf = ({ kind, nets, loops, cables }: Comparison['changes'][number]): string =>
  JSON.stringify([kind, nets, loops, cables]);

/** Signs and sides changed by hand. */
function mirrored(line: LineChange) {
  const turn = (value: number | null) => (value === null ? null : value === 0 ? 0 : -value);
  const statuses = { new: 'gone', gone: 'new', changed: 'changed', unchanged: 'unchanged' };
  const crossings = {
    'newly-over': 'newly-under',
    'newly-under': 'newly-over',
    'still-over': 'still-over',
    under: 'under',
  };
  return {
    ...line,
    frequencyHz: line.frequencyHz,
    status: statuses[line.status],
    crossing: crossings[line.crossing],
    before: line.after,
    after: line.before,
    levelChangeDb: turn(line.levelChangeDb),
    limitChangeDb: turn(line.limitChangeDb),
    marginChangeDb: turn(line.marginChangeDb),
    contributors: line.contributors.map((each) => ({
      ...each,
      beforeDbuvPerM: each.afterDbuvPerM,
      afterDbuvPerM: each.beforeDbuvPerM,
      changeDb: turn(each.changeDb),
    })),
    causes: line.causes.length,
  };
}

describe('a headline', () => {
  const run = (more: Partial<ComparedRun>): ComparedRun => ({
    run: 1,
    startedAt: '',
    board: 'Kiln',
    revision: 'B',
    layoutSha256: '',
    sourcesSha256: '',
    programVersion: '0',
    note: '',
    limit: '',
    requiredMarginDb: 0,
    verdict: 'meets',
    worst: { frequencyHz: 125e6, detector: 'quasi-peak', marginDb: -3.1, contributor: null },
    ...more,
  });
  const worst = (kind: 'net' | 'loop' | 'cable', name: string, path: string) => ({
    frequencyHz: 375e6,
    detector: 'quasi-peak' as const,
    marginDb: 4.2,
    contributor: { kind, name, path },
  });

  it.each([
    [worst('net', 'CLK_25M', 'valve cable'), 'CLK_25M through the valve cable'],
    [worst('net', 'CLK_25M', 'J5'), 'CLK_25M through J5'],
    [worst('net', 'CLK_25M', 'plane'), 'CLK_25M through the plane'],
    [worst('net', 'CLK_25M', 'pair'), 'the trace pair of CLK_25M'],
    [worst('loop', 'converter loop', 'loop'), 'the converter loop'],
    [worst('cable', 'mains lead', 'mains lead'), 'the stated current of the mains lead'],
  ])('names who makes the worst line (%#)', (line, maker) => {
    expect(headlineText(run({}), run({ run: 2, revision: 'C', worst: line }))).toBe(
      `Revision C against B: worst margin 4.2 dB at 375 MHz by ${maker} (was −3.1 dB at 125 MHz)`,
    );
  });

  it('falls back to run numbers where revisions do not tell the runs apart', () => {
    expect(headlineText(run({}), run({ run: 2 }))).toMatch(/^Run 2 against run 1 \(revision B\): /);
    expect(headlineText(run({ revision: '' }), run({ run: 2 }))).toMatch(/^Run 2 against run 1: /);
    expect(headlineText(run({}), run({ run: 2, board: 'Oven', revision: '' }))).toMatch(
      /^Run 2 \(Oven\) against run 1 \(Kiln, revision B\): /,
    );
  });
});

describe('the sample', () => {
  const read = (name: string): unknown =>
    JSON.parse(readFileSync(new URL(`../../samples/valve-controller/${name}.json`, import.meta.url), 'utf8'));
  const run = (letter: string) => {
    const board = mergeSources(
      parseBoardFile(read(`rev-${letter}.board`)),
      parseSourcesFile(read(`rev-${letter}.sources`)),
    );
    // Trace pairs only: seconds instead of minutes. What changed on the board is the same; the order follows these levels.
    return storedRun(board, estimateOf(board));
  };
  const [a, b, c] = ['a', 'b', 'c'].map(run) as [
    ReturnType<typeof run>,
    ReturnType<typeof run>,
    ReturnType<typeof run>,
  ];

  it('tells revision B from A (sentences compared with the files by hand)', () => {
    expect(
      compareRuns(a, b)
        .changes.map(({ text }) => text)
        .sort(),
    ).toEqual([
      'RS485_D: trace on TOP 38 → 12 mm, on BOT none → 26 mm; 2 vias added',
      'converter loop: moved by 6 µm',
      'plane GND moved from layer BOT to GND; cut-out of 2 × 30 mm removed at (39, 27) mm',
      'plane VDD_3V3 on layer PWR added (78 × 48 mm)',
      'stackup: 2 → 4 copper layers; board 1.6 → 1.606 mm thick; dielectric under TOP 1.53 → 0.2 mm',
      'stackup: CORE 1.53 → 1.1 mm, permittivity 4.4 → 4.5',
    ]);
  });

  it('tells revision C from B, each net with what its own level did', () => {
    const { changes } = compareRuns(b, c);
    expect(changes.map(({ text }) => text).sort()).toEqual([
      'CLK_25M: rise and fall time 1 → 3 ns',
      'CLK_25M: series resistor none → 33 Ω',
      'CLK_25M: trace on TOP 54 → 12 mm; pin Y1.3 moved from (12, 38) to (50, 34) mm',
      'RS485_D: trace on TOP 12 → 38 mm, on BOT 26 mm → none; 2 vias removed',
      'SPI_MOSI and RS485_D: rise and fall time 1.5 → 4 ns',
      'SPI_SCK: rise and fall time 1.5 → 4 ns',
      'converter loop: area 24 → 12 mm², length around 20 → 16 mm',
      'converter loop: steepest edge 0.1375 → 0.055 A/ns',
    ]);
    for (const name of ['CLK_25M', 'SPI_SCK', 'converter loop']) {
      const own = changes.filter(({ effect }) => effect!.name === name);
      expect(own.length).toBeGreaterThan(0);
      for (const { effect } of own) expect(effect!.changeDb).toBeLessThan(0);
    }
    const alone = changes.filter(({ effect }) => effect!.isAlone).map(({ nets }) => nets);
    // SPI_MOSI, whose edge slowed, has no other change; RS485_D beside it has.
    expect(alone).toEqual([['SPI_SCK'], ['SPI_MOSI', 'RS485_D']]);
  });

  it('finds the effect of one slower edge where the spectrum of a trapezoid has it', () => {
    // Nothing but the clock: beside others its level would be taken where theirs is at its maximum.
    const all = b.document.board;
    const alone = { ...all, loops: [], drives: all.drives!.filter(({ net }) => net === 'CLK_25M') };
    const slow = structuredClone(alone);
    const clock = slow.waveforms!.find(({ name }) => name === 'clk') as { riseNs: number; fallNs: number };
    clock.riseNs = 3;
    clock.fallNs = 3;
    const { changes } = compareRuns(storedRun(alone, estimateOf(alone)), storedRun(slow, estimateOf(slow)));
    expect(changes.map(({ text }) => text)).toEqual(['CLK_25M: rise and fall time 1 → 3 ns']);
    const { frequencyHz, changeDb, isAlone } = changes[0]!.effect!;
    expect(isAlone).toBe(true);
    // Trapezoid with equal ramps τ = t(10–90)/0.8: amplitude ∝ |sin(πfτ)/(πfτ)| (C. R. Paul, Introduction to EMC, 2nd ed., eq. 3.21);
    // duty cycle and net are the same on both sides, so the whole change of the line is the ratio of these.
    const envelope = (rise1090S: number) => {
      const x = (Math.PI * frequencyHz * rise1090S) / 0.8;
      return Math.abs(Math.sin(x) / x);
    };
    expect(changeDb).toBeCloseTo(20 * Math.log10(envelope(3e-9) / envelope(1e-9)), 6);
  });
});

it('next to nothing is nothing: how well a sum cancels is no change in dB', () => {
  const at = (levelDbuvPerM: number) => {
    const points = sampleResult().points.map((point) => ({
      ...point,
      contributors: [{ kind: 'net' as const, name: 'CLK_25M', levelDbuvPerM, viaDbuvPerM: { pair: levelDbuvPerM } }],
    }));
    return resultWith(points);
  };
  const [quiet, heard] = [storedRun(someBoard, at(-180)), storedRun(otherBoard, at(12))];
  const effectsOf = (one: typeof quiet, other: typeof quiet) => {
    const { changes, lines } = compareRuns(one, other);
    const own = changes.filter(({ nets }) => nets.includes('CLK_25M')).map(({ effect }) => effect);
    expect(own.length).toBeGreaterThan(0);
    return { own, contributors: lines.flatMap((line) => line.contributors) };
  };
  const louder = effectsOf(quiet, heard);
  for (const each of [...louder.own, ...louder.contributors]) {
    expect(each).toMatchObject({
      beforeDbuvPerM: null,
      afterDbuvPerM: expect.closeTo(12, 9) as number,
      changeDb: null,
    });
  }
  const never = effectsOf(quiet, storedRun(otherBoard, at(-60)));
  expect(never).toEqual({ own: never.own.map(() => null), contributors: [] });
});
