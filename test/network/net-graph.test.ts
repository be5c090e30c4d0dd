import { describe, expect, it } from 'vitest';
import type { Net, PointM, Trace } from '../../app/board/board.ts';
import { buildNetGraph, type NetGraph } from '../../app/network/net-graph.ts';
import { expectClose } from '../support/expect-close.ts';

const MM = 1e-3;
const at = (xMm: number, yMm: number): PointM => [xMm * MM, yMm * MM];
const trace = (layerIndex: number, widthMm: number, ...pointsMm: [number, number][]): Trace => ({
  layerIndex,
  widthM: widthMm * MM,
  pointsM: pointsMm.map(([x, y]) => at(x, y)),
});
const pin = (name: string, xMm: number, yMm: number, layerIndex = 0) => ({ name, atM: at(xMm, yMm), layerIndex });
const via = (xMm: number, yMm: number, fromLayerIndex: number, toLayerIndex: number, drillMm = 0.3) => ({
  atM: at(xMm, yMm),
  fromLayerIndex,
  toLayerIndex,
  drillM: drillMm * MM,
});
const netOf = (parts: Partial<Net>): Net => ({ name: 'N', traces: [], vias: [], pins: [], ...parts });
const lengthMm = ({ segments }: NetGraph): number => segments.reduce((sum, { lengthM }) => sum + lengthM, 0) / MM;
const degreeOf = (graph: NetGraph, node: number): number =>
  [...graph.segments, ...graph.vias].filter(({ nodeA, nodeB }) => nodeA === node || nodeB === node).length;
const isConnected = (graph: NetGraph): boolean => graph.islands === 1;
/** Independent loops: edges − nodes + parts. */
const loopsOf = ({ segments, vias, nodes, islands }: NetGraph): number =>
  segments.length + vias.length - nodes.length + islands;

describe('traces of one layer', () => {
  it('a polyline with a pin at each end is a chain; segments run from node to node', () => {
    const graph = buildNetGraph(
      netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0], [10, 5], [17, 5])], pins: [pin('A', 0, 0), pin('B', 17, 5)] }),
    );
    expect(graph.nodes.length).toBe(4);
    expect(graph.segments.length).toBe(3);
    expect(isConnected(graph)).toBe(true);
    expectClose(lengthMm(graph), 22, { rel: 1e-12, because: '10 + 5 + 7 mm' });
    expect(degreeOf(graph, graph.pinNodes.get('A')!)).toBe(1);
    expect(degreeOf(graph, graph.pinNodes.get('B')!)).toBe(1);
    for (const { nodeA, nodeB, fromM, toM } of graph.segments) {
      expect(fromM).toEqual(graph.nodes[nodeA]!.atM);
      expect(toM).toEqual(graph.nodes[nodeB]!.atM);
    }
  });

  it.each([
    ['on its centre line', 0],
    ['inside its edge', 0.09],
    ['beyond it by less than half a width', -0.09],
  ])('an end that lands on another trace %s splits it there', (_, offMm) => {
    const graph = buildNetGraph(
      netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0]), trace(0, 0.15, [4, 6], [4, offMm])] }),
    );
    expect(graph.segments.length).toBe(3);
    expect(isConnected(graph)).toBe(true);
    const joint = graph.nodes.findIndex((_, node) => degreeOf(graph, node) === 3);
    expectClose(graph.nodes[joint]!.atM[0], 4 * MM, { rel: 1e-9, because: 'the joint lies on the straight trace' });
    expect(Math.abs(graph.nodes[joint]!.atM[1])).toBeLessThan(1e-12);
  });

  it('an end just short of another trace is not joined, nor one on another layer', () => {
    const apart = [trace(0, 0.2, [0, 0], [10, 0]), trace(0, 0.15, [4, 6], [4, 0.11])];
    expect(buildNetGraph(netOf({ traces: apart })).islands).toBe(2);
    const layers = [trace(0, 0.2, [0, 0], [10, 0]), trace(2, 0.2, [4, 6], [4, 0])];
    expect(buildNetGraph(netOf({ traces: layers })).islands).toBe(2);
  });

  it('a wide end that covers a thin trace joins it', () => {
    const graph = buildNetGraph(netOf({ traces: [trace(0, 0.1, [0, 0], [10, 0]), trace(0, 1, [4, 6], [4, 0.4])] }));
    expect(isConnected(graph)).toBe(true);
    expect(graph.segments.length).toBe(3);
  });

  it('crossing traces of one layer join', () => {
    const graph = buildNetGraph(netOf({ traces: [trace(0, 0.2, [0, 0], [10, 4]), trace(0, 0.2, [2, 7], [6, -3])] }));
    expect(graph.segments.length).toBe(4);
    expect(graph.nodes.length).toBe(5);
    const joint = graph.nodes.findIndex((_, node) => degreeOf(graph, node) === 4);
    // 0.4 x = 7 − 2.5 (x − 2): x = 12/2.9
    expectClose(graph.nodes[joint]!.atM[0], (12 / 2.9) * MM, { rel: 1e-9, because: 'crossing by hand' });
  });

  it('parts that overlap without a loose end at the place are joined once', () => {
    // The corner of one trace lies on the edge of the other; its own ends go elsewhere.
    const graph = buildNetGraph(
      netOf({ traces: [trace(0, 0.3, [0, 0], [10, 0]), trace(0, 0.3, [3, 5], [4, 0.1], [5, 5])] }),
    );
    expect(isConnected(graph)).toBe(true);
    expect(loopsOf(graph)).toBe(0);
  });

  it('doubles and overlapping collinear pieces give one segment, the widest', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [
          trace(0, 0.2, [0, 0], [10, 0]),
          trace(0, 0.3, [10, 0], [0, 0]),
          trace(0, 0.25, [6, 0], [14, 0]),
          trace(0, 0.4, [3, 0], [5, 0]),
        ],
      }),
    );
    expectClose(lengthMm(graph), 14, { rel: 1e-12, because: 'union of 0–10, 6–14 and 3–5' });
    expect(loopsOf(graph)).toBe(0);
    const widthAt = (xMm: number) =>
      graph.segments.find(({ fromM, toM }) => (fromM[0] - xMm * MM) * (toM[0] - xMm * MM) < 0)!.widthM / MM;
    expectClose(widthAt(1), 0.3, { rel: 1e-12, because: 'the double is wider' });
    expectClose(widthAt(4), 0.4, { rel: 1e-12, because: 'the widest there' });
    expectClose(widthAt(12), 0.25, { rel: 1e-12, because: 'alone there' });
  });

  it('a trace drawn twice, a little beside itself, is one', () => {
    const graph = buildNetGraph(
      netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0]), trace(0, 0.2, [0, 0.02], [10, 0.02])] }),
    );
    expect(graph.segments.length).toBe(1);
    expectClose(lengthMm(graph), 10, { rel: 1e-4, because: 'one of them' });
  });

  it('pieces without length are dropped; specks in a row do not tear the trace', () => {
    const specks = Array.from({ length: 2001 }, (_, i): [number, number] => [5 + i * 0.0005, 0]);
    const graph = buildNetGraph(netOf({ traces: [trace(0, 0.2, [0, 0], [0, 0], [5, 0], ...specks, [6, 3])] }));
    expect(isConnected(graph)).toBe(true);
    expectClose(lengthMm(graph), 9, { rel: 1e-4, because: '5 + 1 + 3 mm, a last speck of 0.5 µm may go' });
    expect(graph.segments.every(({ lengthM }) => lengthM > 1e-6)).toBe(true);
  });

  it('a finely drawn bend keeps its shape: pieces far shorter than the width do not collapse', () => {
    const arc = Array.from({ length: 91 }, (_, i): [number, number] => [
      2 * Math.sin((i * Math.PI) / 180),
      2 - 2 * Math.cos((i * Math.PI) / 180),
    ]);
    const graph = buildNetGraph(
      netOf({
        traces: [trace(0, 0.6, ...arc)],
        pins: [pin('A', 0, 0), pin('B', 2, 2)],
        vias: [via(2, 2, 0, 4, 0.5), via(0.5, 0.1, 0, 4, 0.5)],
      }),
    );
    expect(graph.segments.length).toBe(90);
    expect(loopsOf(graph)).toBe(0);
    expectClose(lengthMm(graph), Math.PI, { rel: 1e-4, because: 'quarter circle of 2 mm in 1° chords' });
  });

  it('loops of copper stay, also one that closes on itself by overlap', () => {
    const exact = trace(0, 0.2, [0, 0], [10, 0], [10, 5], [0, 5], [0, 0]);
    const touching = trace(0, 0.2, [0, 0], [10, 0], [10, 5], [0, 5], [0.05, 0.05]);
    for (const ring of [exact, touching]) expect(loopsOf(buildNetGraph(netOf({ traces: [ring] })))).toBe(1);
  });
});

describe('vias', () => {
  const onLayers = (...layers: number[]) => layers.map((layer, i) => trace(layer, 0.2, [5, 5], [5 + 3 * (i + 1), 9]));

  it('join every layer they pass on which the net has copper there, in a chain', () => {
    const graph = buildNetGraph(netOf({ traces: onLayers(0, 2, 6), vias: [via(5, 5, 0, 6)] }));
    expect(isConnected(graph)).toBe(true);
    expect(graph.vias.map(({ fromLayerIndex, toLayerIndex }) => [fromLayerIndex, toLayerIndex])).toEqual([
      [0, 2],
      [2, 6],
    ]);
    for (const { nodeA, nodeB, fromLayerIndex, toLayerIndex } of graph.vias) {
      expect(graph.nodes[nodeA]!.layerIndex).toBe(fromLayerIndex);
      expect(graph.nodes[nodeB]!.layerIndex).toBe(toLayerIndex);
    }
  });

  it('a blind via leaves out what is below its end', () => {
    expect(buildNetGraph(netOf({ traces: onLayers(0, 2, 6), vias: [via(5, 5, 0, 2)] })).islands).toBe(2);
  });

  it('listed twice or stacked, they are one', () => {
    const twice = buildNetGraph(netOf({ traces: onLayers(0, 6), vias: [via(5, 5, 0, 6), via(5, 5, 0, 6)] }));
    expect(twice.vias.length).toBe(1);
    const stacked = buildNetGraph(netOf({ traces: onLayers(0, 6), vias: [via(5, 5, 0, 2), via(5, 5, 2, 6, 0.25)] }));
    expect(stacked.vias.map(({ fromLayerIndex, toLayerIndex }) => [fromLayerIndex, toLayerIndex])).toEqual([[0, 6]]);
    const apart = buildNetGraph(netOf({ traces: onLayers(0, 6), vias: [via(5, 5, 0, 2), via(5, 5, 4, 6)] }));
    expect(apart.islands).toBe(2);
  });

  it('in the middle of a trace, or beside ends that stop in the pad, they join it', () => {
    const through = buildNetGraph(
      netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0]), trace(4, 0.2, [3, 0.05], [3, 8])], vias: [via(3, 0, 0, 4)] }),
    );
    expect(isConnected(through)).toBe(true);
    expect(through.segments.length).toBe(3);
    const ends = buildNetGraph(
      netOf({
        traces: [
          trace(0, 0.15, [0, 0], [4.8, 0]),
          trace(0, 0.15, [10, 0], [5.2, 0.1]),
          trace(4, 0.15, [5, 4], [5, 0.25]),
        ],
        vias: [via(5, 0, 0, 4)],
      }),
    );
    expect(isConnected(ends)).toBe(true);
    expect(ends.vias.length).toBe(1);
    expect(ends.segments.length).toBe(3);
  });

  it('with copper on one layer only they are nothing', () => {
    const graph = buildNetGraph(netOf({ traces: onLayers(0), vias: [via(5, 5, 0, 6), via(1, 1, 0, 6)] }));
    expect(graph.vias).toEqual([]);
    expect(graph.segments.length).toBe(1);
  });

  it('a short way from pin to via keeps its length (dog bone), and the pin is the start', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [trace(0, 0.15, [0, 0], [0.35, 0.35]), trace(6, 0.15, [0.35, 0.35], [8, 0.35])],
        vias: [via(0.35, 0.35, 0, 6, 0.2)],
        pins: [pin('U1.1', 0, 0), pin('R1.1', 8, 0.35, 6)],
      }),
    );
    expect(isConnected(graph)).toBe(true);
    expect(loopsOf(graph)).toBe(0);
    expectClose(lengthMm(graph), 0.35 * Math.SQRT2 + 7.65, { rel: 1e-9, because: 'as drawn' });
    expect(degreeOf(graph, graph.pinNodes.get('U1.1')!)).toBe(1);
  });
});

describe('pins', () => {
  it('join the trace that ends in their pad, and say how far off', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [trace(0, 0.2, [0, 0], [10, 0])],
        pins: [pin('A', -0.4, 0.3), pin('B', 10, 0.59), pin('C', 10, 2)],
      }),
    );
    expectClose(graph.pinOffsetsM.get('A')!, 0.5 * MM, { rel: 1e-9, because: '0.3, 0.4, 0.5' });
    expect(graph.pinNodes.get('B')).toBe(graph.segments[0]!.nodeB);
    expect(graph.unattachedPins).toEqual(['C']);
    expectClose(lengthMm(graph), 10, { rel: 1e-12, because: 'the trace stays as drawn' });
  });

  it('in the middle of a trace split it; on another layer they do not', () => {
    const graph = buildNetGraph(
      netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0])], pins: [pin('A', 4, 0.08), pin('B', 6, 0, 2)] }),
    );
    expect(graph.segments.length).toBe(2);
    expect(degreeOf(graph, graph.pinNodes.get('A')!)).toBe(2);
    expect(graph.unattachedPins).toEqual(['B']);
  });

  it('beside a trace take the nearest copper within reach', () => {
    const graph = buildNetGraph(netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0])], pins: [pin('A', 4, 0.5)] }));
    expectClose(graph.nodes[graph.pinNodes.get('A')!]!.atM[0], 4 * MM, {
      rel: 1e-9,
      because: 'foot of the perpendicular',
    });
    expectClose(graph.pinOffsetsM.get('A')!, 0.5 * MM, { rel: 1e-9, because: 'distance' });
  });

  it('several ends that stop in one pad meet at its centre', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [
          trace(0, 0.2, [0, 0], [9.7, 0]),
          trace(0, 0.2, [10.3, 0.2], [20, 5]),
          trace(0, 0.2, [10, -0.5], [10, -7]),
        ],
        pins: [pin('U1.3', 10, 0)],
      }),
    );
    expect(isConnected(graph)).toBe(true);
    const node = graph.pinNodes.get('U1.3')!;
    expect(degreeOf(graph, node)).toBe(3);
    expect(graph.nodes[node]!.atM).toEqual(at(10, 0));
    expect(graph.pinOffsetsM.get('U1.3')).toBe(0);
  });

  it('neighbouring pads of one net keep their own trace ends', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [trace(0, 0.15, [0, 0], [0, 5], [0.5, 5], [0.5, 0.1])],
        pins: [pin('U1.1', 0, 0), pin('U1.2', 0.5, 0)],
      }),
    );
    expect(graph.pinNodes.get('U1.1')).not.toBe(graph.pinNodes.get('U1.2'));
    expect(loopsOf(graph)).toBe(0);
  });

  it('leave a trace that lies wholly in their reach its length', () => {
    const graph = buildNetGraph(netOf({ traces: [trace(0, 0.1, [0.2, 0], [0.55, 0])], pins: [pin('A', 0, 0)] }));
    expect(graph.segments.length).toBe(1);
    expectClose(lengthMm(graph), 0.35, { rel: 1e-9, because: 'as drawn' });
    expectClose(graph.pinOffsetsM.get('A')!, 0.2 * MM, { rel: 1e-9, because: 'its nearer end' });
  });

  it('a pad of several ends over a via of several ends: no segment without length is left between', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [
          trace(0, 0.1, [0.1, 0], [0.3, 0]),
          trace(0, 0.1, [-0.1, 0], [-6, 0]),
          trace(0, 0.1, [0, 0.4], [0, 6]),
          trace(4, 0.1, [0, 0], [0, -6]),
        ],
        vias: [via(0, 0, 0, 4)],
        pins: [pin('A', 0, 0)],
      }),
    );
    expect(isConnected(graph)).toBe(true);
    expect(graph.segments.length).toBe(3);
    for (const { lengthM } of graph.segments) expect(lengthM).toBeGreaterThan(5 * MM);
  });

  it('on a via without a trace of their layer hang on the barrel', () => {
    const graph = buildNetGraph(
      netOf({
        traces: [trace(6, 0.2, [5, 5], [12, 5])],
        vias: [via(5, 5, 0, 6, 0.9)],
        pins: [pin('J1.1', 5, 5), pin('J1.2', 12, 5, 6)],
      }),
    );
    expect(graph.unattachedPins).toEqual([]);
    expect(isConnected(graph)).toBe(true);
    expect(graph.nodes[graph.pinNodes.get('J1.1')!]!.layerIndex).toBe(0);
    expect(graph.vias.length).toBe(1);
  });

  it('names that look like object members are names', () => {
    const graph = buildNetGraph(
      netOf({ traces: [trace(0, 0.2, [0, 0], [10, 0])], pins: [pin('__proto__', 0, 0), pin('constructor', 30, 0)] }),
    );
    expect(graph.pinNodes.get('__proto__')).toBeDefined();
    expect(graph.unattachedPins).toEqual(['constructor']);
  });

  it('a net without traces has no copper', () => {
    const graph = buildNetGraph(netOf({ pins: [pin('A', 0, 0)], vias: [via(3, 3, 0, 4)] }));
    expect(graph).toMatchObject({ nodes: [], segments: [], vias: [], unattachedPins: ['A'], islands: 0 });
  });
});
