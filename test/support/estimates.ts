import type { BoardFileInput } from '../../app/board/board-file.ts';
import { estimate } from '../../app/estimate/estimate.ts';
import type { EstimateRequest } from '../../app/estimate/estimate-request.ts';
import type { EstimateResult, ResultPoint } from '../../app/estimate/result.ts';
import { chooseLimits, type LimitSet } from '../../app/limits/choose.ts';
import type { LimitLine } from '../../app/limits/limit-line.ts';
import type { SiteRequest } from '../../app/site/site.ts';
import { boardOf } from './small-boards.ts';

type NetFile = BoardFileInput['nets'][number];
type DriveFile = NonNullable<BoardFileInput['drives']>[number];
export type Mm = [xMm: number, yMm: number];

/** Trace on TOP, 1.2 mm over a whole plane; no conductor thickness and no loss unless told. */
export function boardFile(parts: Partial<BoardFileInput> = {}): BoardFileInput {
  return {
    format: 'quietboard-board',
    version: 1,
    name: 'test board',
    outline: [
      {
        pointsMm: [
          [0, 0],
          [70, 0],
          [70, 44],
          [0, 44],
        ],
      },
    ],
    stackup: [
      { name: 'TOP', kind: 'copper', thicknessMm: 0 },
      { name: 'D', kind: 'dielectric', thicknessMm: 1.2, epsilonR: 4.1 },
      { name: 'BOT', kind: 'copper', thicknessMm: 0 },
    ],
    planes: [{ layer: 'BOT', net: 'GND' }],
    nets: [],
    ...parts,
  };
}

export const L_SHAPE_MM: Mm[] = [
  [9, 12],
  [48, 12],
  [48, 33],
];

/** A net with a driver U1.<name> at its first point and a load U2.<name> at its last. */
export function netFile(name: string, pointsMm: Mm[] = L_SHAPE_MM, layer = 'TOP'): NetFile {
  return {
    name,
    traces: [{ layer, widthMm: 0.4, pointsMm }],
    pins: [
      { name: `U1.${name}`, atMm: pointsMm[0]!, layer },
      { name: `U2.${name}`, atMm: pointsMm.at(-1)!, layer },
    ],
  };
}

/** Waveform `w` of some lines, MHz and peak volts. */
export const linesVoltage = (
  name: string,
  linesMhzV: readonly (readonly [number, number])[],
  clockDomain?: string,
) => ({
  name,
  kind: 'lines' as const,
  lines: linesMhzV.map(([frequencyMhz, amplitudeV]) => ({ frequencyMhz, amplitudeV })),
  ...(clockDomain !== undefined && { clockDomain }),
});

export const driveFile = (net: string, waveform: string, more: Partial<DriveFile> = {}): DriveFile => ({
  net,
  pin: `U1.${net}`,
  waveform,
  sourceOhm: 30,
  ...more,
});

export const loadFile = (net: string, resistanceOhm: number) => ({ net, pin: `U2.${net}`, resistanceOhm });

/** A board of some nets, each driven by its own drive and loaded with 75 Ω. */
export const drivenBoard = (
  nets: readonly NetFile[],
  drives: readonly DriveFile[],
  waveforms: NonNullable<BoardFileInput['waveforms']>,
  more: Partial<BoardFileInput> = {},
): BoardFileInput =>
  boardFile({
    nets: [...nets],
    drives: [...drives],
    waveforms,
    loads: nets.map(({ name }) => loadFile(name, 75)),
    ...more,
  });

const line = (detector: LimitLine['detector'], points: LimitLine['points']): LimitLine => ({
  standard: 'Test lines',
  aliases: [],
  class: 'B',
  distanceM: 3,
  detector,
  edition: 'none',
  source: 'invented',
  sourceStatus: 'user file',
  points,
  siteKind: 'ground-plane',
});

/** Quasi-peak 40 dBµV/m from 30 MHz to 1 GHz; average 50 and peak 70 from there to 6 GHz. */
export const FLAT_LINES: readonly LimitLine[] = [
  line('quasi-peak', [
    [30e6, 40],
    [1e9, 40],
  ]),
  ...(['average', 'peak'] as const).map((detector) =>
    line(detector, [
      [1e9, detector === 'average' ? 50 : 70],
      [6e9, detector === 'average' ? 50 : 70],
    ]),
  ),
];

export const limitSet = (lines: readonly LimitLine[] = FLAT_LINES): LimitSet =>
  chooseLimits({ standard: 'Test lines', class: 'B', distanceM: 3, convertDistance: false }, lines);

export interface Choices {
  readonly site?: Partial<SiteRequest>;
  readonly request?: Partial<EstimateRequest>;
}

export function requestOf({ site, request }: Choices = {}): EstimateRequest {
  return {
    limits: limitSet(),
    site: { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat', ...site },
    structure: 'pair-only',
    maxHz: 1e9,
    requiredMarginDb: 0,
    boardSha256: '00',
    programVersion: '0',
    notes: [],
    ...request,
  };
}

/** Trace pairs only, 30 MHz to 1 GHz, 3 m from the boundary over a ground plane, unless told. */
export const estimateOf = (file: BoardFileInput, choices: Choices = {}): EstimateResult =>
  estimate(boardOf(file), requestOf(choices));

/** The point at a frequency (the first one listed, so the detector with the worst margin). */
export function pointAt(result: EstimateResult, frequencyHz: number): ResultPoint {
  const found = result.points.find((point) => Math.abs(point.frequencyHz / frequencyHz - 1) < 1e-9);
  if (!found) throw new Error(`no point at ${frequencyHz} Hz`);
  return found;
}
