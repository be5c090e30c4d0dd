import { pathLengthMm, pathVertices } from '../path.ts';
import type { CopperStroke } from './copper.ts';
import { type Findings, nameList } from './findings.ts';
import { type BoxMm, boxOf } from './frame.ts';

/** Fewer lines are no hatch. */
const FEWEST_STROKES = 40;
/** Copper of the lines (length times width) over their box: a hatch has about half, a routed net a few percent. */
const LEAST_COVERAGE = 0.25;
/** A smaller box is a pad or a small fill drawn with lines. */
const SMALLEST_BOX_MM2 = 25;

/** Reports planes that a layout program drew as a hatch of lines: they are imported as traces, not as planes. */
export function reportHatchedPlanes(strokes: readonly CopperStroke[], findings: Findings): void {
  const groups = new Map<string, { label: string; strokes: CopperStroke[] }>();
  for (const stroke of strokes) {
    const key = `${stroke.layer}\u0000${stroke.net}`;
    const group = groups.get(key) ?? { label: `${stroke.net} on ${stroke.layer}`, strokes: [] };
    groups.set(key, group);
    group.strokes.push(stroke);
  }
  const hatched = [...groups.values()].filter((group) => isHatch(group.strokes)).map(({ label }) => label);
  findings.add(
    'hatched-plane',
    hatched.length,
    `drawn as a hatch of lines and imported as traces, although likely planes: ${nameList(hatched)}; add the planes by hand`,
  );
}

function isHatch(strokes: readonly CopperStroke[]): boolean {
  if (strokes.length < FEWEST_STROKES) return false;
  const box = boxOf(strokes.flatMap(({ path }) => pathVertices(path)));
  const boxMm2 = box === undefined ? 0 : boxArea(box);
  const copperMm2 = strokes.reduce((sum, { path, widthMm }) => sum + pathLengthMm(path) * (widthMm ?? 0), 0);
  return boxMm2 >= SMALLEST_BOX_MM2 && copperMm2 >= LEAST_COVERAGE * boxMm2;
}

const boxArea = ({ minX, minY, maxX, maxY }: BoxMm): number => (maxX - minX) * (maxY - minY);
