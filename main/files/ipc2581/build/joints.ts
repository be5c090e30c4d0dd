import type { BoardFileInput } from '../../../../app/board/board-file.ts';
import type { Hole, Ipc2581Document, Step } from '../document.ts';
import type { PointMm } from '../path.ts';
import { placeShape } from '../place-shape.ts';
import type { Findings } from './findings.ts';
import type { Flattener } from './flattener.ts';
import { type BoardFrame, boxOf, roundMm } from './frame.ts';
import { type Span, spanOf } from './hole-span.ts';
import type { ShapeResolver } from './shape-resolver.ts';

export type FileVia = NonNullable<BoardFileInput['nets'][number]['vias']>[number];

export interface Joints {
  readonly byNet: Map<string, FileVia[]>;
  /** Distinct (x, y, diameter) of holes drilled as vias, with or without a net. */
  readonly viaCount: number;
}

interface Tools {
  readonly frame: BoardFrame;
  readonly flattener: Flattener;
  readonly resolver: ShapeResolver;
  readonly findings: Findings;
}

/**
 * Everything that joins copper layers, by net: vias, plated component holes and plated slots. A hole written twice
 * (in a pad stack and on the drill layer) counts once and takes net and span from whichever has them.
 */
export function buildJoints(document: Ipc2581Document, step: Step, coppers: readonly string[], tools: Tools): Joints {
  const { frame, findings } = tools;
  const written = [...step.holes, ...slotHoles(step, tools)];
  const holes = mergeHoles(written.map((hole) => ({ ...hole, span: spanOf(document, hole, coppers) })));
  const through = coppers.length < 2 ? undefined : { fromLayer: coppers[0]!, toLayer: coppers.at(-1)! };
  const byNet = new Map<string, FileVia[]>();
  const viaPlaces = new Set<string>();
  const counts = { plated: 0, withoutNet: 0, withoutSize: 0 };
  for (const hole of holes) {
    if (hole.kind === 'via') viaPlaces.add(placeKey(hole));
    const span = hole.span ?? through;
    const drillMm = roundMm(hole.diameterMm);
    if (drillMm === 0) counts.withoutSize++;
    else if (hole.net === undefined) counts.withoutNet += hole.kind === 'via' ? 1 : 0;
    else if (span !== undefined) {
      if (hole.kind === 'plated') counts.plated++;
      const vias = byNet.get(hole.net) ?? [];
      byNet.set(hole.net, vias);
      vias.push({ atMm: frame.point([hole.xMm, hole.yMm]), ...span, drillMm });
    }
  }
  findings.add(
    'plated-holes',
    counts.plated,
    `${counts.plated} plated holes and slots with a net join the layers like vias; they are not in the count of vias`,
  );
  findings.add('vias-without-net', counts.withoutNet, `${counts.withoutNet} vias carry no net and are not imported`);
  findings.add(
    'holes-without-size',
    counts.withoutSize,
    `${counts.withoutSize} plated holes have no diameter and are left out`,
  );
  return { byNet, viaCount: viaPlaces.size };
}

const placeKey = ({ xMm, yMm, diameterMm }: Hole): string => `${roundMm(xMm)} ${roundMm(yMm)} ${roundMm(diameterMm)}`;

interface SpannedHole extends Hole {
  /** Undefined when the file does not tell: then the hole goes through. */
  readonly span: Span | undefined;
}

/** One hole for each place and span; stacked blind vias at one place keep their spans. */
function mergeHoles(written: readonly SpannedHole[]): SpannedHole[] {
  const byPlace = new Map<string, SpannedHole[]>();
  for (const hole of written) {
    const key = placeKey(hole);
    const known = byPlace.get(key) ?? [];
    byPlace.set(key, known);
    const i = known.findIndex((other) => isSameHole(other, hole));
    if (i < 0) known.push(hole);
    else known[i] = merged(known[i]!, hole);
  }
  return [...byPlace.values()].flat();
}

const isSameHole = (p: SpannedHole, q: SpannedHole): boolean =>
  p.span === undefined ||
  q.span === undefined ||
  (p.span.fromLayer === q.span.fromLayer && p.span.toLayer === q.span.toLayer);

const merged = (p: SpannedHole, q: SpannedHole): SpannedHole => ({
  ...p,
  kind: p.kind === 'via' || q.kind === 'via' ? 'via' : 'plated',
  net: p.net ?? q.net,
  span: p.span ?? q.span,
});

/** Plated slots as holes in their middle, as wide as the slot is narrow. */
function slotHoles(step: Step, { resolver, flattener }: Tools): Hole[] {
  return step.slots.flatMap((slot): Hole[] => {
    const points: PointMm[] = [];
    for (const shape of slot.shapes) {
      resolver.expand(placeShape(shape, slot.transform), slot.transform, (plain) => {
        for (const point of flattener.clearance(plain.kind === 'area' ? plain.ring : plain.path)) points.push(point);
      });
    }
    const box = boxOf(points);
    if (box === undefined) return [];
    const diameterMm = Math.min(box.maxX - box.minX, box.maxY - box.minY);
    const [xMm, yMm] = [(box.minX + box.maxX) / 2, (box.minY + box.maxY) / 2];
    return [{ xMm, yMm, diameterMm, kind: 'plated', net: slot.net, layer: slot.layer, from: undefined, to: undefined }];
  });
}
