import type { TrendGroup, TrendPoint } from '../../compare/types.ts';
import { type Standing, standingOfMargin } from '../verdict.ts';

export const revisionName = ({ revision, run }: Pick<TrendPoint, 'revision' | 'run'>): string =>
  revision === '' ? `run ${run}` : revision;

/** Where and against what: "CISPR 32 class B at 3 m from the boundary, ground plane, board flat, planes and cables solved". */
export function setupText({ limit, setup }: Pick<TrendGroup, 'limit' | 'setup'>): string {
  const from = setup.measuredFrom === 'boundary' ? 'boundary' : 'turntable axis';
  const site = setup.site === 'ground-plane' ? 'ground plane' : 'free space';
  const structure = setup.structure === 'solved' ? 'planes and cables solved' : 'trace pairs only';
  return `${limit} from the ${from}, ${site}, board ${setup.orientation}, ${structure}`;
}

/** Of the worst margin against what was required of this run; no line is fine. */
export const standingOfPoint = ({
  worst,
  requiredMarginDb,
}: Pick<TrendPoint, 'worst' | 'requiredMarginDb'>): Standing =>
  worst ? standingOfMargin(worst.marginDb, requiredMarginDb) : 'fine';
