import type { Board, Net, PointM } from '../board/board.ts';
import type { Finding } from '../estimate/result.ts';
import type { NetGraph } from '../network/net-graph.ts';
import type { PlaneIndex, SegmentReference } from '../returns/reference.ts';

/** Openings the return gets around within this distance (clearances of vias and pins) are no finding, m. */
const SMALL_WAY_AROUND_M = 1e-3;

/** Places where a net crosses a slot in its reference plane or runs past the plane's edge. */
export function gapFindings(
  board: Board,
  planes: PlaneIndex,
  net: Net,
  graph: NetGraph,
  found: readonly SegmentReference[],
  served: readonly SegmentReference[],
): Finding[] {
  const findings: Finding[] = [];
  for (const [i, { fromM, toM, lengthM, layerIndex }] of graph.segments.entries()) {
    const plane = served[i]!.planes.reduce((one, other) => (other.heightM < one.heightM ? other : one));
    for (const { from, to } of found[i]!.gaps) {
      const middle = (from + to) / 2;
      const atM: PointM = [fromM[0] + middle * (toM[0] - fromM[0]), fromM[1] + middle * (toM[1] - fromM[1])];
      const across: PointM = [(fromM[1] - toM[1]) / lengthM, (toM[0] - fromM[0]) / lengthM];
      const aroundM = Math.min(
        planes.distanceToCopperM(plane.layerIndex, atM, across),
        planes.distanceToCopperM(plane.layerIndex, atM, [-across[0], -across[1]]),
      );
      if (aroundM < SMALL_WAY_AROUND_M) continue;
      const way =
        aroundM === Infinity
          ? 'there is no way around on either side'
          : `the shorter way around is ${(aroundM * 1e3).toFixed(1)} mm to the side`;
      findings.push({
        code: 'plane-gap',
        net: net.name,
        message: `no copper of ${board.stackup[plane.layerIndex]!.name} under ${((to - from) * lengthM * 1e3).toFixed(1)} mm of the trace; ${way}`,
        atM: [atM[0], atM[1]],
        layer: board.stackup[layerIndex]!.name,
      });
    }
  }
  return findings;
}
