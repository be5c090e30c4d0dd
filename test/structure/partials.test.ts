import { describe, expect, it } from 'vitest';
import type { Cable, Point3M } from '../../app/board/board.ts';
import { gaussLegendre } from '../../app/fields/quadrature.ts';
import type { Filament } from '../../app/structure/filament-kernel.ts';
import { buildMesh, type Mesh } from '../../app/structure/mesh.ts';
import { PartialElements } from '../../app/structure/partials.ts';
import { cellAtIndex } from '../../app/structure/sheet.ts';
import { type GroundPlane, wireFromCable } from '../../app/structure/wires.ts';
import { expectClose } from '../support/expect-close.ts';
import { rectangle, rectangleRing, sheetOf } from './support.ts';

const CELL_M = 0.01;
/** Low over the ground, so that images near and far matter; flat (under −z) and upright (under −y). */
const SITES: readonly (readonly [string, GroundPlane | null])[] = [
  ['free space', null],
  ['flat', { axis: 2, positionM: -0.06 }],
  ['upright', { axis: 1, positionM: -0.05 }],
];

const cable = (site: GroundPlane | null): Cable => ({
  name: 'bent',
  pointsM: [
    [0.04, 0.015, 0],
    [0.09, 0.015, 0],
    [0.09, 0.07, 0.03],
    ...(site === null ? [] : [site.axis === 2 ? ([0.09, 0.07, -0.06] as const) : ([0.09, -0.05, 0.03] as const)]),
  ],
  radiusM: 0.5e-3,
  farEnd: site === null ? 'open' : 'ground',
  seriesOhm: 0,
});

function meshAt(site: GroundPlane | null): Mesh {
  const sheet = sheetOf([rectangle(0.04, 0.03)], 0.04, 0.03, CELL_M, 0);
  return buildMesh(sheet, [wireFromCable(cable(site), 'cable', sheet, site, 0.02)], site);
}

const matrix = (size: number) => ({ size, re: new Float64Array(size * size), im: new Float64Array(size * size) });

/** Points with weights (sum 1) that stand for a patch or a wire part. */
type Cloud = readonly { readonly atM: Point3M; readonly weight: number }[];
const RULE = gaussLegendre(10);

const squareCloud = (centreM: Point3M): Cloud =>
  [...RULE.nodes].flatMap((s, i) =>
    [...RULE.nodes].map((t, j) => ({
      atM: [centreM[0] + (s - 0.5) * CELL_M, centreM[1] + (t - 0.5) * CELL_M, centreM[2]] as Point3M,
      weight: RULE.weights[i]! * RULE.weights[j]!,
    })),
  );

const lengthOf = ({ from, to }: Filament): number => Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);

function lineCloud(filaments: readonly Filament[]): Cloud {
  const total = filaments.reduce((sum, one) => sum + lengthOf(one), 0);
  return filaments.flatMap((one) =>
    [...RULE.nodes].map((t, i) => ({
      atM: [0, 1, 2].map((axis) => one.from[axis]! + t * (one.to[axis]! - one.from[axis]!)) as unknown as Point3M,
      weight: (RULE.weights[i]! * lengthOf(one)) / total,
    })),
  );
}

/** Mean of e^(−jkR)/R over both clouds: the exact kernel, for parts that do not touch. */
function meanKernel(a: Cloud, b: Cloud, k: number): [re: number, im: number, nearest: number] {
  let re = 0;
  let im = 0;
  let nearest = Infinity;
  for (const one of a) {
    for (const other of b) {
      const r = Math.hypot(one.atM[0] - other.atM[0], one.atM[1] - other.atM[1], one.atM[2] - other.atM[2]);
      nearest = Math.min(nearest, r);
      re += (one.weight * other.weight * Math.cos(k * r)) / r;
      im -= (one.weight * other.weight * Math.sin(k * r)) / r;
    }
  }
  return [re, im, nearest];
}

const mirrored = (cloud: Cloud, { axis, positionM }: GroundPlane): Cloud =>
  cloud.map(({ atM, weight }) => ({
    atM: atM.map((v, i) => (i === axis ? 2 * positionM - v : v)) as unknown as Point3M,
    weight,
  }));

const centre = (all: Float64Array, i: number): Point3M => [all[3 * i]!, all[3 * i + 1]!, all[3 * i + 2]!];

function clouds(mesh: Mesh): { readonly nodes: Cloud[]; readonly edges: Cloud[] } {
  const { nodeCount, edgeCount, sheet, firstWireEdge, wireNodes, wirePieces, nodeCentreM, edgeCentreM } = mesh;
  return {
    nodes: Array.from({ length: nodeCount }, (_, n) =>
      n < sheet.cellCount ? squareCloud(centre(nodeCentreM, n)) : lineCloud(wireNodes[n - sheet.cellCount]!.halves),
    ),
    edges: Array.from({ length: edgeCount }, (_, e) =>
      e < firstWireEdge ? squareCloud(centre(edgeCentreM, e)) : lineCloud([wirePieces[e - firstWireEdge]!.filament]),
    ),
  };
}

/** Parts nearer than this share a singularity the clouds cannot integrate; self and touching parts have tests of their own. */
const APART_M = 0.6 * CELL_M;

describe.each(SITES)('partial elements, %s', (_, site) => {
  const mesh = meshAt(site);
  const k = (2 * Math.PI * 500e6) / 299_792_458;
  const nodes = matrix(mesh.nodeCount);
  const edges = matrix(mesh.edgeCount);
  new PartialElements(mesh).fill(k, nodes, edges);
  const all = clouds(mesh);

  it('potential coefficients are the exact kernel’s, image charge reversed', () => {
    let compared = 0;
    for (let i = 0; i < mesh.nodeCount; i++) {
      for (let j = 0; j <= i; j++) {
        const [re, im, nearest] = meanKernel(all.nodes[i]!, all.nodes[j]!, k);
        const image =
          site === null ? ([0, 0, 1] as const) : meanKernel(mirrored(all.nodes[i]!, site), all.nodes[j]!, k);
        if (nearest < APART_M || image[2] < APART_M) continue;
        compared++;
        const difference = Math.hypot(
          nodes.re[i * mesh.nodeCount + j]! - re + image[0],
          nodes.im[i * mesh.nodeCount + j]! - im + image[1],
        );
        // Retardation between centres only: (k·size)²/12 of a cell or a 20 mm piece; a bent node stands at its corner.
        expect(difference).toBeLessThan(0.03 * (Math.hypot(re, im) + Math.hypot(image[0], image[1])));
        expect(nodes.re[j * mesh.nodeCount + i]).toBe(nodes.re[i * mesh.nodeCount + j]);
      }
    }
    expect(compared).toBeGreaterThan(150);
  });

  it('impedances: inductance with the image’s sign by direction, charge at both ends', () => {
    const { edgeFrom, edgeTo, edgeVectorM, firstWireEdge, linkCount } = mesh;
    let compared = 0;
    for (let e = 0; e < mesh.edgeCount; e++) {
      for (let f = 0; f <= e; f++) {
        const v = centre(edgeVectorM, e);
        const w = centre(edgeVectorM, f);
        const isLink = (edge: number): boolean => edge >= firstWireEdge - linkCount && edge < firstWireEdge;
        let re = 0;
        let im = 0;
        if (!isLink(e) && !isLink(f)) {
          const [gRe, gIm, nearest] = meanKernel(all.edges[e]!, all.edges[f]!, k);
          const dot = v[0] * w[0] + v[1] * w[1] + v[2] * w[2];
          if (nearest < APART_M && dot !== 0) continue;
          re += dot * gRe;
          im += dot * gIm;
          if (site !== null) {
            const image = meanKernel(mirrored(all.edges[e]!, site), all.edges[f]!, k);
            const flipped = 2 * v[site.axis]! * w[site.axis]! - dot;
            if (image[2] < APART_M && flipped !== 0) continue;
            re += flipped * image[0];
            im += flipped * image[1];
          }
        }
        const at = e * mesh.edgeCount + f;
        const scale = 1 / (k * k);
        const chargeOf = (part: Float64Array): number => {
          const g = (a: number, b: number): number => (a < 0 || b < 0 ? 0 : part[a * mesh.nodeCount + b]!);
          const [a, b, c, d] = [edgeFrom[e]!, edgeTo[e]!, edgeFrom[f]!, edgeTo[f]!];
          return scale * (g(a, c) - g(a, d) - g(b, c) + g(b, d));
        };
        compared++;
        const inductiveRe = edges.re[at]! + chargeOf(nodes.re);
        const inductiveIm = edges.im[at]! + chargeOf(nodes.im);
        const size = Math.hypot(...v) * Math.hypot(...w) * 20;
        expect(Math.hypot(inductiveRe - re, inductiveIm - im)).toBeLessThan(0.01 * Math.max(Math.hypot(re, im), size));
      }
    }
    expect(compared).toBeGreaterThan(250);
  });
});

describe('images close to the ground', () => {
  it('use the closed form: a wire standing on the ground has an image that touches it', () => {
    const site = { axis: 2, positionM: -0.06 } as const;
    const mesh = meshAt(site);
    const edges = matrix(mesh.edgeCount);
    const nodes = matrix(mesh.nodeCount);
    new PartialElements(mesh).fill(1e-3, nodes, edges);
    const last = mesh.edgeCount - 1;
    const l = Math.hypot(...centre(mesh.edgeVectorM, last));
    // Piece and image as one straight wire of twice the length: L(2l) = 2 (L(l) + M), F. W. Grover, chapter 7.
    const self = (length: number): number => {
      const a = 0.5e-3;
      return 2 * length * (Math.asinh(length / a) - Math.sqrt(1 + (a / length) ** 2) + a / length);
    };
    const from = mesh.edgeFrom[last]!;
    const inductive = edges.re[last * mesh.edgeCount + last]! + nodes.re[from * mesh.nodeCount + from]! / 1e-6;
    expectClose(inductive, self(2 * l) / 2, {
      rel: 1e-5,
      because: 'kR = 1e-5; 1/k² times rounding of the charge part',
    });
  });
});

describe('edges and slots of the copper', () => {
  it('change currents along them and charges beside them by the same kernel', () => {
    // Six columns, four rows; a slot between rows 1 and 2 under columns 1 to 4.
    const slot = rectangleRing(0.0101, 0.0199, 0.0499, 0.0201);
    const sheet = sheetOf([rectangle(0.06, 0.04, [slot])], 0.06, 0.04, CELL_M);
    const mesh = buildMesh(sheet, [], null);
    const nodes = matrix(mesh.nodeCount);
    const edges = matrix(mesh.edgeCount);
    const k = 0.1;
    new PartialElements(mesh).fill(k, nodes, edges);
    const g = (i: number, j: number): number => nodes.re[i * mesh.nodeCount + j]!;
    /** Inductive kernel of two edges, 1/m. */
    const kernel = (e: number, f: number): number => {
      const [a, b, c, d] = [mesh.edgeFrom[e]!, mesh.edgeTo[e]!, mesh.edgeFrom[f]!, mesh.edgeTo[f]!];
      const charge = (g(a, c) - g(a, d) - g(b, c) + g(b, d)) / (k * k);
      return (edges.re[Math.max(e, f) * mesh.edgeCount + Math.min(e, f)]! + charge) / CELL_M ** 2;
    };
    const edgeFrom = (column: number, row: number): number => mesh.edgeFrom.indexOf(cellAtIndex(sheet, column, row));
    const cell = (column: number, row: number): number => cellAtIndex(sheet, column, row);
    const because = 'squares of the same size and place; 1/k² costs digits';
    const plain = kernel(edgeFrom(2, 3), edgeFrom(2, 3));
    for (const row of [0, 1, 2, 3]) {
      const edge = edgeFrom(2, row);
      expectClose(kernel(edge, edge), g(cell(2, row), cell(2, row)), { rel: 1e-6, because });
    }
    expectClose(kernel(edgeFrom(2, 1), edgeFrom(2, 2)), g(cell(2, 1), cell(2, 2)), { rel: 1e-6, because });
    // Below the closed form of a square at the outline, further below it at the slot.
    const square = 2.973_209_8 / CELL_M;
    expect(plain).toBeLessThan(0.95 * square);
    expect(g(cell(2, 1), cell(2, 1))).toBeLessThan(0.9 * square);
    expectClose(kernel(edgeFrom(1, 0), edgeFrom(1, 0)), plain, { rel: 1e-6, because: 'one open side each' });
  });
});
