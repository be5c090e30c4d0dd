import { describe, expect, it } from 'vitest';
import { boardFileSchema } from '../../../app/board/board-file.ts';
import { toBoard } from '../../../app/board/to-board.ts';
import { joinParts, type SourcesPart, splitParts } from '../../../app/project/board-parts.ts';
import { type QuickLever, quickLevers } from '../../../renderer/levers/quick-lever.ts';
import { orchardBoard } from '../../board/example-board.ts';

/** Oracle: the SI board that the program makes of the changed document, and its own rules of what a waveform may be. */

const { layout, sources } = splitParts(boardFileSchema.parse(orchardBoard()));
const boardOf = (changed: SourcesPart) => toBoard(boardFileSchema.parse(joinParts(layout, changed))).board;
const named = (levers: readonly QuickLever[], label: string) => levers.find((lever) => lever.label === label)!;
const firstNet = sources.drives![0]!.net;
const levers = quickLevers(sources, { kind: 'net', name: firstNet });

describe('quick levers', () => {
  it('show what the board has, in SI, and set what is asked', () => {
    const drive = boardOf(sources).drives[0]!;
    const series = named(levers, 'Series resistor');
    const driver = named(levers, 'Driver resistance');
    expect([series.value, driver.value]).toEqual([drive.seriesOhm, drive.sourceOhm]);
    expect(boardOf(series.set(sources, 47)).drives[0]).toEqual({ ...drive, seriesOhm: 47 });
    expect(boardOf(driver.set(sources, 12)).drives[0]).toEqual({ ...drive, sourceOhm: 12 });
    const at = sources.loads!.findIndex(({ net }) => net === firstNet);
    const load = levers.find(({ key }) => key === `load ${at}`)!;
    expect(load.value).toBeCloseTo(boardOf(sources).loads[at]!.capacitanceF, 20);
    expect(boardOf(load.set(sources, 22e-12)).loads[at]!.capacitanceF).toBeCloseTo(22e-12, 20);
  });

  it('change both edges in proportion and nothing else of the waveform', () => {
    const edges = named(levers, 'Rise and fall time');
    const name = sources.drives![0]!.waveform;
    const uneven: SourcesPart = {
      ...sources,
      waveforms: sources.waveforms!.map((waveform) =>
        waveform.name === name && waveform.kind === 'trapezoid' ? { ...waveform, riseNs: 1, fallNs: 1.5 } : waveform,
      ),
    };
    const changed = edges.set(uneven, 2e-9).waveforms!.find((waveform) => waveform.name === name)!;
    const before = uneven.waveforms!.find((waveform) => waveform.name === name)!;
    expect(changed).toEqual({ ...before, riseNs: 2, fallNs: 3 });
  });

  it('say the longest edge that the document takes: it is accepted, and one a hair longer is not', () => {
    for (const { name } of sources.waveforms!) {
      const user = sources.drives!.find(({ waveform }) => waveform === name);
      if (user === undefined) continue;
      const edges = quickLevers(sources, { kind: 'net', name: user.net }).find(({ key }) => key === `edges ${name}`);
      if (edges === undefined) continue;
      expect(() => boardOf(edges.set(sources, edges.most))).not.toThrow();
      expect(() => boardOf(edges.set(sources, edges.most * 1.001))).toThrow();
      expect(edges.range.max).toBeLessThanOrEqual(edges.most);
    }
  });

  it('try beforehand only what the document takes', () => {
    for (const { set, probe } of levers)
      if (probe !== null) expect(() => boardOf(set(sources, probe.value))).not.toThrow();
    expect(levers.filter(({ probe }) => probe !== null).length).toBeGreaterThan(2);
  });

  it('are none for a waveform without a single edge, and none for a net that nothing drives', () => {
    const drawn: SourcesPart = {
      waveforms: [
        {
          kind: 'piecewise',
          name: 'w',
          periodNs: 10,
          pointsNsA: [
            [0, 0],
            [5, 1],
          ],
        },
      ],
      loops: [
        {
          name: 'l',
          waveform: 'w',
          pointsMm: [
            [0, 0, 0],
            [1, 0, 0],
            [1, 1, 0],
          ],
          delayNs: 0,
          inverted: false,
        },
      ],
    };
    expect(quickLevers(drawn, { kind: 'loop', name: 'l' })).toEqual([]);
    expect(quickLevers(sources, { kind: 'net', name: 'no such net' })).toEqual([]);
  });
});
