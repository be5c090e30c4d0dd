import { EPSILON0_F_PER_M } from '../../app/units/constants.ts';
import { solveDense } from './dense-solve.ts';

/**
 * Second way to line impedances: 2-D electrostatics by the method of moments. Unknown is the total (free and bound)
 * charge on conductor surfaces and dielectric interfaces, constant on straight panels, point matching; over a ground
 * plane y = 0 by image charges.
 *   conductors: φ = V;   interfaces: (ε₂ − ε₁) E_n,mean + (ε₂ + ε₁) σ / 2ε0 = 0, normal from 1 to 2;   free charge = ε_outside σ
 * Source: C. Wei, R. F. Harrington, J. R. Mautz, T. K. Sarkar, Multiconductor transmission lines in multilayered
 * dielectric media, IEEE Trans. MTT-32(4), 1984.
 */

type Point = readonly [x: number, y: number];

/** Corners of a conductor, counter-clockwise, and its potential. */
export interface Conductor {
  readonly corners: readonly Point[];
  readonly voltage: number;
  /** An infinitely thin sheet along the corners, in one uniform dielectric, instead of a closed polygon. */
  readonly isSheet?: boolean;
}

export interface StaticProblem {
  readonly conductors: readonly Conductor[];
  /** Open polylines along which the permittivity changes; they must not run along a conductor. */
  readonly interfaces: readonly (readonly Point[])[];
  readonly epsilonAt: (x: number, y: number) => number;
  readonly hasGround: boolean;
  /** Panels on an interface piece and on the longest side of a conductor; other sides get a share. */
  readonly panels: number;
}

interface Panel {
  readonly x: number;
  readonly y: number;
  readonly halfLength: number;
  readonly tangentX: number;
  readonly tangentY: number;
  /** Conductor number, or −1 for an interface. */
  readonly conductor: number;
  readonly voltage: number;
  /** Permittivity to the right of the panel's direction (outside of a counter-clockwise conductor) and to the left. */
  readonly epsilonRight: number;
  readonly epsilonLeft: number;
}

/** Free charge per length of every conductor, C/m. */
export function chargesPerLength(problem: StaticProblem): number[] {
  const panels = makePanels(problem);
  const n = panels.length;
  const matrix = new Float64Array(n * n);
  const rhs = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const at = panels[i]!;
    rhs[i] = at.voltage;
    for (let j = 0; j < n; j++) {
      const source = panels[j]!;
      if (at.conductor >= 0) {
        matrix[i * n + j] = potential(at.x, at.y, source) - (problem.hasGround ? potential(at.x, -at.y, source) : 0);
        continue;
      }
      const [ex, ey] = i === j ? [0, 0] : field(at.x, at.y, source);
      // The image's field at (x, y) is the source's at (x, −y), mirrored and of opposite charge.
      const [ix, iy] = problem.hasGround ? field(at.x, -at.y, source) : [0, 0];
      const normalX = at.tangentY; // to the right
      const normalY = -at.tangentX;
      const mean = (ex - ix) * normalX + (ey + iy) * normalY;
      matrix[i * n + j] =
        (at.epsilonRight - at.epsilonLeft) * mean + (i === j ? (at.epsilonRight + at.epsilonLeft) / 2 : 0);
    }
  }
  solveDense(matrix, rhs); // σ/ε0
  const charges = problem.conductors.map(() => 0);
  panels.forEach((panel, i) => {
    if (panel.conductor < 0) return;
    charges[panel.conductor]! += 2 * panel.halfLength * panel.epsilonRight * EPSILON0_F_PER_M * rhs[i]!;
  });
  return charges;
}

/** ∫ −ln r / 2π along a panel, for σ/ε0 = 1. */
function potential(x: number, y: number, panel: Panel): number {
  const dx = x - panel.x;
  const dy = y - panel.y;
  const u = dx * panel.tangentX + dy * panel.tangentY;
  const v = Math.abs(dy * panel.tangentX - dx * panel.tangentY);
  const part = (a: number) => {
    const r2 = a * a + v * v;
    return (r2 === 0 ? 0 : (a / 2) * Math.log(r2)) - a + (v === 0 ? 0 : v * Math.atan(a / v));
  };
  return -(part(u + panel.halfLength) - part(u - panel.halfLength)) / (2 * Math.PI);
}

/** ∫ r / (2π r²) along a panel, for σ/ε0 = 1. */
function field(x: number, y: number, panel: Panel): [ex: number, ey: number] {
  const dx = x - panel.x;
  const dy = y - panel.y;
  const u = dx * panel.tangentX + dy * panel.tangentY;
  const v = dy * panel.tangentX - dx * panel.tangentY;
  const a = u + panel.halfLength;
  const b = u - panel.halfLength;
  const along = Math.log((a * a + v * v) / (b * b + v * v)) / (4 * Math.PI);
  const across = v === 0 ? 0 : (Math.atan(a / v) - Math.atan(b / v)) / (2 * Math.PI);
  return [along * panel.tangentX - across * panel.tangentY, along * panel.tangentY + across * panel.tangentX];
}

function makePanels({ conductors, interfaces, epsilonAt, panels }: StaticProblem): Panel[] {
  const list: Panel[] = [];
  const add = (from: Point, to: Point, count: number, conductor: number, voltage: number) => {
    const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
    const tangentX = (to[0] - from[0]) / length;
    const tangentY = (to[1] - from[1]) / length;
    // Fine towards both ends, where charge is singular; interfaces are long, so even finer there.
    const grading = conductor < 0 ? 4 : 2;
    const place = (k: number) =>
      (length * (k / count) ** grading) / ((k / count) ** grading + (1 - k / count) ** grading);
    for (let k = 0; k < count; k++) {
      const middle = (place(k) + place(k + 1)) / 2;
      const x = from[0] + middle * tangentX;
      const y = from[1] + middle * tangentY;
      const halfLength = (place(k + 1) - place(k)) / 2;
      const step = 1e-6 * halfLength;
      const epsilonRight = epsilonAt(x + step * tangentY, y - step * tangentX);
      const epsilonLeft = epsilonAt(x - step * tangentY, y + step * tangentX);
      list.push({ x, y, halfLength, tangentX, tangentY, conductor, voltage, epsilonRight, epsilonLeft });
    }
  };
  conductors.forEach(({ corners, voltage, isSheet }, number) => {
    const closed = corners.map((from, i) => [from, corners[(i + 1) % corners.length]!] as const);
    const sides = isSheet ? closed.slice(0, -1) : closed;
    const longest = Math.max(...sides.map(([a, b]) => Math.hypot(b[0] - a[0], b[1] - a[1])));
    for (const [from, to] of sides) {
      const share = Math.hypot(to[0] - from[0], to[1] - from[1]) / longest;
      add(from, to, Math.max(4, Math.ceil(panels * Math.sqrt(share))), number, voltage);
    }
  });
  for (const line of interfaces) {
    for (let i = 0; i + 1 < line.length; i++) {
      add(line[i]!, line[i + 1]!, panels, -1, 0);
    }
  }
  return list;
}
