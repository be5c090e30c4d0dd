import { describe, expect, it } from 'vitest';
import { type BoardFileInput, boardFileSchema } from '../../../app/board/board-file.ts';
import { toBoard } from '../../../app/board/to-board.ts';
import { buildNetGraph } from '../../../app/network/net-graph.ts';
import { type LayoutPart, splitParts } from '../../../app/project/board-parts.ts';
import { ringAreaMm2, withArea } from '../../../renderer/levers/loop-area.ts';
import { withTracesMoved } from '../../../renderer/levers/move-layer.ts';
import { layerRuns, withHeight } from '../../../renderer/levers/plane-height.ts';

/** Oracle: the board the program makes of the changed layout: its heights, and whether a net's copper is one piece. */

const copper = (name: string) => ({ name, kind: 'copper', thicknessMm: 0.03 }) as const;
const core = (name: string, thicknessMm: number) => ({ name, kind: 'dielectric', thicknessMm, epsilonR: 4 }) as const;

const board = (net: Partial<BoardFileInput['nets'][number]> = {}): BoardFileInput => ({
  format: 'quietboard-board',
  version: 1,
  name: 'Layers',
  outline: [
    {
      pointsMm: [
        [0, 0],
        [40, 0],
        [40, 20],
        [0, 20],
      ],
    },
  ],
  stackup: [
    copper('TOP'),
    core('D1', 0.1),
    core('D2', 0.3),
    copper('L2'),
    core('D3', 1),
    copper('L3'),
    core('D4', 0.2),
    copper('BOT'),
  ],
  planes: [{ layer: 'L2', net: 'GND' }],
  nets: [
    {
      name: 'CLK',
      traces: [
        {
          layer: 'TOP',
          widthMm: 0.2,
          pointsMm: [
            [5, 10],
            [20, 10],
          ],
        },
        {
          layer: 'BOT',
          widthMm: 0.2,
          pointsMm: [
            [20, 10],
            [35, 10],
          ],
        },
      ],
      vias: [{ atMm: [20, 10], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 0.3 }],
      pins: [
        { name: 'U1.1', atMm: [5, 10], layer: 'TOP' },
        { name: 'U2.1', atMm: [35, 10], layer: 'BOT' },
      ],
      ...net,
    },
  ],
});

const layoutOf = (file: BoardFileInput): LayoutPart => splitParts(boardFileSchema.parse(file)).layout;
const boardOf = (layout: LayoutPart) => toBoard(boardFileSchema.parse(layout)).board;
const runsOf = (layout: LayoutPart) => layerRuns(boardOf(layout), boardOf(layout).nets[0]!);

describe('the height to the plane', () => {
  it('is the dielectric between the facing surfaces, on every layer the net runs on', () => {
    const runs = runsOf(layoutOf(board()));
    expect(runs.map(({ layer, plane }) => [layer, plane?.layer, plane?.net])).toEqual([
      ['TOP', 'L2', 'GND'],
      ['BOT', 'L2', 'GND'],
    ]);
    expect(runs[0]!.plane!.heightM).toBeCloseTo(0.4e-3, 12);
    // With the copper of L3 between: 1 + 0.03 + 0.2 mm.
    expect(runs[1]!.plane!.heightM).toBeCloseTo(1.23e-3, 12);
    expect(runs.map(({ lengthM }) => lengthM)).toEqual([expect.closeTo(0.015, 12), expect.closeTo(0.015, 12)]);
  });

  it('is what was asked for after the change, dielectrics in proportion, copper as it was', () => {
    const near = withHeight(layoutOf(board()), 'TOP', 'L2', 0.2e-3);
    expect(runsOf(near)[0]!.plane!.heightM).toBeCloseTo(0.2e-3, 12);
    expect(near.stackup.slice(1, 3).map(({ thicknessMm }) => thicknessMm)).toEqual([0.05, 0.15]);
    const far = withHeight(layoutOf(board()), 'BOT', 'L2', 0.63e-3);
    expect(runsOf(far)[1]!.plane!.heightM).toBeCloseTo(0.63e-3, 12);
    expect(far.stackup[5]).toEqual(layoutOf(board()).stackup[5]);
    expect(() => withHeight(layoutOf(board()), 'BOT', 'L2', 0.02e-3)).toThrow(/copper between/);
  });
});

describe('traces moved to another layer', () => {
  const through = { atMm: [5, 10] as [number, number], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 0.3 };
  const withVia = board({ vias: [...board().nets[0]!.vias!, through] });

  it('stay joined, on the new layer', () => {
    const moved = withTracesMoved(layoutOf(withVia), 'CLK', 'TOP', 'L3') as LayoutPart;
    const net = boardOf(moved).nets[0]!;
    expect(runsOf(moved).map(({ layer }) => layer)).toEqual(['L3', 'BOT']);
    const graph = buildNetGraph(net);
    expect([graph.islands, graph.unattachedPins]).toEqual([1, []]);
  });

  it('are refused in words where a pin has no via, a via is too short, or a plane is there', () => {
    expect(withTracesMoved(layoutOf(board()), 'CLK', 'TOP', 'L3')).toMatch(/U1\.1 .*no via to L3/);
    const blind = board({
      traces: [
        ...board().nets[0]!.traces!,
        {
          layer: 'L2',
          widthMm: 0.2,
          pointsMm: [
            [20, 10],
            [20, 15],
          ],
        },
      ],
      vias: [{ ...board().nets[0]!.vias![0]!, toLayer: 'L2' }],
      pins: [],
    });
    expect(withTracesMoved(layoutOf(blind), 'CLK', 'TOP', 'BOT')).toMatch(/via at 20 \/ 10 mm .*does not reach BOT/);
    expect(withTracesMoved(layoutOf(withVia), 'CLK', 'TOP', 'L2')).toMatch(/plane GND/);
  });

  it('would have come apart where they are refused: the refusal is no caution', () => {
    const file = layoutOf(board());
    const net = file.nets[0]!;
    const traces = net.traces!.map((trace) => (trace.layer === 'TOP' ? { ...trace, layer: 'L3' } : trace));
    expect(buildNetGraph(boardOf({ ...file, nets: [{ ...net, traces }] }).nets[0]!).unattachedPins).toEqual(['U1.1']);
  });
});

describe('a current loop', () => {
  it('has the area of its rectangle, wherever it stands in space', () => {
    expect(
      ringAreaMm2([
        [8, 6, 1.6],
        [14, 6, 1.6],
        [14, 10, 1.6],
        [8, 10, 1.6],
      ]),
    ).toBeCloseTo(24, 12);
    expect(
      ringAreaMm2([
        [1, 5, 0],
        [1, 9, 0],
        [1, 9, 3],
        [1, 5, 3],
      ]),
    ).toBeCloseTo(12, 12);
  });

  it('of another area keeps its middle and its proportions', () => {
    const half = withArea(
      [
        [8, 6, 1.6],
        [14, 6, 1.6],
        [14, 10, 1.6],
        [8, 10, 1.6],
      ],
      6,
    );
    // A quarter of the area is half of each side about (11, 8).
    expect(half).toEqual([
      [9.5, 7, 1.6],
      [12.5, 7, 1.6],
      [12.5, 9, 1.6],
      [9.5, 9, 1.6],
    ]);
  });
});
