import type { Board } from '../board/board.ts';
import { inputError } from '../errors.ts';
import { upperFrequency } from '../limits/upper-frequency.ts';
import { fundamentalHz } from '../sources/clock.ts';
import { hzToMhz } from '../units/convert.ts';
import type { EstimateRequest } from './estimate-request.ts';
import { buildScene, drivenNets, type Scene } from './scene.ts';
import { type FrequencyLines, spectrumTable } from './spectrum-table.ts';

/** What is judged, what radiates and at which frequencies: everything before the first field is computed. */
export interface EstimatePlan {
  readonly range: JudgedRange;
  readonly scene: Scene;
  readonly table: readonly FrequencyLines[];
}

/** Throws `input` when the board has no source or cannot be modelled. */
export function planEstimate(board: Board, request: EstimateRequest): EstimatePlan {
  requireSources(board);
  const range = judgedRange(board, request);
  const scene = buildScene(board, request.site, range.toHz, request.structure);
  const extraHz = scene.cables.flatMap(({ table }) => table.map(({ frequencyHz }) => frequencyHz));
  return { range, scene, table: spectrumTable(board, range.fromHz, range.toHz, extraHz) };
}

export interface JudgedRange {
  readonly fromHz: number;
  readonly toHz: number;
  readonly rule: string;
}

/** From the lowest limit frequency to the standard's upper frequency (or the user's), never beyond the limit lines. */
export function judgedRange(board: Board, { limits, maxHz }: Pick<EstimateRequest, 'limits' | 'maxHz'>): JudgedRange {
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

/** Throws `input`, with what could be driven, when nothing on the board is. */
export function requireSources(board: Board): void {
  const stated = board.cables.filter(({ commonModeRms }) => commonModeRms !== undefined);
  if (drivenNets(board).length + board.loops.length + stated.length > 0) return;
  if (board.drives.length > 0) {
    const driven = [...new Set(board.drives.map(({ net }) => net))].slice(0, 5).join(', ');
    throw inputError('drives', 'on at least one net with a trace', driven);
  }
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
