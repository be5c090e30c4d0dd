import type { Board } from '../board/board.ts';
import { AppError, type Caveat, inputError } from '../errors.ts';
import { labUncertaintyDb } from '../limits/lab-uncertainty.ts';
import { upperFrequency } from '../limits/upper-frequency.ts';
import { CAUTIONS } from '../report/cautions.ts';
import { TABLE_HEIGHT_M } from '../site/site.ts';
import { fundamentalHz } from '../sources/clock.ts';
import { hzToMhz, mhzToHz } from '../units/convert.ts';
import type { EstimateHooks, EstimateRequest } from './estimate-request.ts';
import { type LineLevel, lineLevel, siteAt } from './line-level.ts';
import { modelCaveats } from './model-caveats.ts';
import { judge } from './points.ts';
import type { EstimateResult, ResultPoint, Verdict } from './result.ts';
import { buildScene } from './scene.ts';
import { spectrumTable } from './spectrum-table.ts';

/**
 * The main job: the board's radiated-emission levels on a test site against limit lines.
 *
 * Every spectral line of the drives, loops and stated cable currents between the lowest limit frequency and the upper end
 * of the judged range is solved (net currents), scanned (height, turntable, both polarisations), read like a receiver and
 * held against each limit line that covers it. Throws `input` when the board cannot be modelled, `cancelled` on stop.
 */
export function estimate(board: Board, request: EstimateRequest, hooks: EstimateHooks = {}): EstimateResult {
  requireSources(board);
  const { limits, site } = request;
  const range = judgedRange(board, request);
  const scene = buildScene(board, site, range.toHz);
  const extraHz = scene.cables.flatMap(({ table }) => table.map(({ frequencyHz }) => frequencyHz));
  const table = spectrumTable(board, range.fromHz, range.toHz, extraHz);

  const levels: LineLevel[] = [];
  for (const [done, lines] of table.entries()) {
    if (hooks.stop?.()) throw new AppError('cancelled', 'stopped by the user');
    hooks.onProgress?.(done, table.length);
    const level = lineLevel(scene, lines);
    if (level) levels.push(level);
  }
  hooks.onProgress?.(table.length, table.length);

  const { points, sharedHz } = judge(levels, limits);
  const findings = [...scene.nets.values()].flatMap((model) => model.findings);
  const worst = points[0];
  const uncertaintyDb = labUncertaintyDb(
    worst?.frequencyHz ?? range.fromHz,
    worst ? siteAt(scene, worst.frequencyHz) : site.kind,
  );
  const verdict = verdictOf(worst, request.requiredMarginDb, uncertaintyDb);
  const caveats = modelCaveats(scene, request, range.fromHz, range.toHz, findings, sharedHz);
  if (worst && worst.marginDb >= 0 && worst.marginDb < uncertaintyDb) caveats.push(uncertaintyCaveat(uncertaintyDb));
  if (!worst) caveats.push(noLineCaveat(range));
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
    notes: request.notes,
    cautions: CAUTIONS,
  };
}

interface JudgedRange {
  readonly fromHz: number;
  readonly toHz: number;
  readonly rule: string;
}

/** From the lowest limit frequency to the standard's upper frequency (or the user's), never beyond the limit lines. */
function judgedRange(board: Board, { limits, maxHz }: EstimateRequest): JudgedRange {
  const fromHz = Math.min(...limits.lines.map(({ points }) => points[0]![0]));
  const lastHz = Math.max(...limits.lines.map(({ points }) => points.at(-1)![0]));
  const used = new Set([...board.drives, ...board.loops].map(({ waveform }) => waveform));
  const clocksHz = board.waveforms.filter(({ name }) => used.has(name)).map(fundamentalHz);
  const standard = upperFrequency(limits.standard, Math.max(0, ...clocksHz));
  const wantedHz = maxHz ?? standard.maxHz;
  if (wantedHz <= fromHz) throw inputError('max-mhz', `above ${hzToMhz(fromHz)} MHz`, hzToMhz(wantedHz));
  const rule = maxHz === undefined ? standard.rule : `set by the user (the standard's rule: ${standard.rule})`;
  if (wantedHz > lastHz) {
    return { fromHz, toHz: lastHz, rule: `${rule}; ends at ${hzToMhz(lastHz)} MHz, where the limit lines end` };
  }
  return { fromHz, toHz: wantedHz, rule };
}

function requireSources(board: Board): void {
  const stated = board.cables.filter(({ commonModeRms }) => commonModeRms !== undefined);
  if (board.drives.length + board.loops.length + stated.length > 0) return;
  const nets = board.nets.filter(({ traces, pins }) => traces.length > 0 && pins.length > 0);
  const examples = nets
    .slice(0, 5)
    .map(
      ({ name, pins }) =>
        `${name} (pins ${pins
          .slice(0, 3)
          .map((pin) => pin.name)
          .join(', ')})`,
    )
    .join('; ');
  throw inputError(
    'drives',
    `given: what switches on this board is not in its layout. Write a sources file with waveforms and drives${examples ? `, for example on ${examples}` : ''}`,
    'no drive, loop or stated cable current',
  );
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
  fromHz: Math.min(fromHz, mhzToHz(30)),
  toHz,
});
