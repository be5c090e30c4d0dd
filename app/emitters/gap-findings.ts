import type { Board, Net } from '../board/board.ts';
import type { Finding } from '../estimate/result.ts';
import type { NetGraph } from '../network/net-graph.ts';
import type { SegmentReference } from '../returns/reference.ts';

/** Openings shorter than this many dielectric heights are no gap: the return spreads over about that width. */
const GAP_HEIGHTS = 2;

/** Places where a net crosses a slot in its reference plane or runs past the plane's edge. */
export function gapFindings(
  board: Board,
  net: Net,
  graph: NetGraph,
  found: readonly SegmentReference[],
  served: readonly SegmentReference[],
): Finding[] {
  const findings: Finding[] = [];
  for (const [i, segment] of graph.segments.entries()) {
    const plane = served[i]!.planes.reduce((one, other) => (other.heightM < one.heightM ? other : one));
    const planeLayer = board.stackup[plane.layerIndex]!.name;
    for (const { from, to } of found[i]!.gaps) {
      const lengthM = (to - from) * segment.lengthM;
      if (lengthM < GAP_HEIGHTS * plane.heightM) continue;
      const middle = (from + to) / 2;
      findings.push({
        code: 'plane-gap',
        net: net.name,
        message: `no copper of ${planeLayer} under ${(lengthM * 1e3).toFixed(1)} mm of the trace: its return must go around`,
        atM: [
          segment.fromM[0] + middle * (segment.toM[0] - segment.fromM[0]),
          segment.fromM[1] + middle * (segment.toM[1] - segment.fromM[1]),
        ],
        layer: board.stackup[segment.layerIndex]!.name,
      });
    }
  }
  return findings;
}
