import type { Board } from '../board/board.ts';
import type { Caveat } from '../errors.ts';
import { labUncertaintyDb } from '../limits/lab-uncertainty.ts';
import { CAUTIONS } from '../report/cautions.ts';
import { TABLE_HEIGHT_M } from '../site/site.ts';
import { hzToMhz } from '../units/convert.ts';
import { currentMaps } from './current-maps.ts';
import type { EstimateRequest } from './estimate-request.ts';
import { type LineLevel, siteAt } from './line-level.ts';
import { modelCaveats } from './model-caveats.ts';
import type { EstimatePlan, JudgedRange } from './plan.ts';
import { type JudgedPoints, judge } from './points.ts';
import type { EstimateResult, ResultPoint, Verdict } from './result.ts';

/** Reads the levels of all lines (in order of frequency), judges them and says what goes with them. */
export function finishEstimate(
  board: Board,
  request: EstimateRequest,
  plan: EstimatePlan,
  levels: readonly LineLevel[],
): EstimateResult {
  const { range, scene } = plan;
  const { limits, site } = request;
  const { points, sharedHz, worst, uncertaintyDb, verdict } = judgement(levels, request, plan);
  const roughHz = levels.filter(({ isRough }) => isRough).map(({ frequencyHz }) => frequencyHz);
  const findings = [...scene.nets.values()].flatMap((model) => model.findings);
  const caveats = modelCaveats(scene, request, range.fromHz, range.toHz, findings, sharedHz, roughHz);
  if (worst && worst.marginDb >= 0 && worst.marginDb < uncertaintyDb) caveats.push(uncertaintyCaveat(uncertaintyDb));
  if (!worst) caveats.push(noLineCaveat(range));
  const maps = currentMaps(plan, points);
  return {
    format: 'quietboard-result',
    version: 1,
    board: { name: board.name, revision: board.revision, sha256: request.boardSha256 },
    program: { version: request.programVersion },
    site: { ...site, tableHeightM: TABLE_HEIGHT_M, boundaryRadiusM: scene.boundaryRadiusM },
    limit: {
      standard: limits.standard,
      class: limits.class,
      distanceM: limits.distanceM,
      requiredMarginDb: request.requiredMarginDb,
      edition: limits.edition,
      source: limits.source,
      sourceStatus: limits.sourceStatus,
      maxHz: range.toHz,
      maxRule: range.rule,
      ...(limits.conversion !== undefined && { conversion: limits.conversion }),
      labUncertaintyDb: uncertaintyDb,
    },
    structure: request.structure,
    points,
    worst: worst ? { frequencyHz: worst.frequencyHz, marginDb: worst.marginDb } : null,
    verdict,
    caveats,
    findings,
    ...(maps.length > 0 && { currentMaps: maps }),
    notes: request.notes,
    cautions: CAUTIONS,
  };
}

export interface Judgement extends JudgedPoints {
  /** The first of the points. */
  readonly worst: ResultPoint | undefined;
  /** A laboratory's, at the worst point, dB. */
  readonly uncertaintyDb: number;
  readonly verdict: Verdict;
}

/** Points, the worst of them and the verdict of the levels (in order of frequency). */
export function judgement(
  levels: readonly LineLevel[],
  { limits, requiredMarginDb }: Pick<EstimateRequest, 'limits' | 'requiredMarginDb'>,
  { range, scene }: Pick<EstimatePlan, 'range' | 'scene'>,
): Judgement {
  const judged = judge(levels, limits);
  const worst = judged.points[0];
  const uncertaintyDb = labUncertaintyDb(
    worst?.frequencyHz ?? range.fromHz,
    worst ? siteAt(scene, worst.frequencyHz) : scene.site.kind,
  );
  return { ...judged, worst, uncertaintyDb, verdict: verdictOf(worst, requiredMarginDb, uncertaintyDb) };
}

function verdictOf(worst: ResultPoint | undefined, requiredMarginDb: number, uncertaintyDb: number): Verdict {
  if (!worst) return 'meets';
  if (worst.marginDb < 0) return 'exceeds';
  if (worst.marginDb < requiredMarginDb) return 'falls-short';
  return worst.marginDb < uncertaintyDb ? 'within-uncertainty' : 'meets';
}

const uncertaintyCaveat = (uncertaintyDb: number): Caveat => ({
  code: 'within-uncertainty',
  message: `the worst margin is smaller than a laboratory's expanded uncertainty of ${uncertaintyDb.toFixed(1)} dB (CISPR 16-4-2)`,
  where: '',
  fromHz: 0,
  toHz: 0,
});

const noLineCaveat = ({ fromHz, toHz }: JudgedRange): Caveat => ({
  code: 'no-line-in-range',
  message: `no source has a spectral line between ${hzToMhz(fromHz)} and ${hzToMhz(toHz)} MHz`,
  where: '',
  fromHz,
  toHz,
});
