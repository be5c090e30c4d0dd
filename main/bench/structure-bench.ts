import type { Board } from '../../app/board/board.ts';
import { boardFileSchema } from '../../app/board/board-file.ts';
import { toBoard } from '../../app/board/to-board.ts';
import { chooseLimits } from '../../app/limits/choose.ts';
import { runEstimate } from '../jobs/run-estimate.ts';
import type { BenchResult } from './bench-result.ts';
import { type GeneratedSize, generatedBoard } from './generated-board.ts';

/** 200 nets, 40 harmonics to 1 GHz, a 160 × 100 mm plane and two 1 m cables, planes and cables solved, all cores. */
export const largeStructureBench = (): Promise<BenchResult> =>
  structureBench('planes and cables: 160 × 100 mm, 200 nets, two 1 m cables', {
    size: { widthMm: 160, heightMm: 100, nets: 200, segmentsPerNet: 10 },
    cables: [
      {
        name: 'left cable',
        pointsMm: [
          [0, 50, 0],
          [-1000, 50, 0],
        ],
      },
      {
        name: 'right cable',
        pointsMm: [
          [160, 30, 0],
          [1160, 30, 0],
        ],
      },
    ],
  });

const SMALL: StructureCase = {
  size: { widthMm: 60, heightMm: 40, nets: 10, segmentsPerNet: 10 },
  cables: [
    {
      name: 'cable',
      pointsMm: [
        [60, 20, 0],
        [1060, 20, 0],
      ],
    },
  ],
};

/** A 60 × 40 mm board with one cable and 10 nets. */
export const smallStructureBench = (): Promise<BenchResult> =>
  structureBench('planes and cables: 60 × 40 mm, 10 nets, one 1 m cable', SMALL);

/** The same with so many lines that planes and cables are interpolated between solved frequencies. */
export const manyLinesBench = (): Promise<BenchResult> =>
  structureBench('planes and cables: the same with lines every 4 MHz', { ...SMALL, clockMhz: 4 });

interface StructureCase {
  readonly size: GeneratedSize;
  readonly cables: { name: string; pointsMm: [number, number, number][] }[];
  /** Instead of the generated board's own. */
  readonly clockMhz?: number;
}

async function structureBench(name: string, { size, cables, clockMhz }: StructureCase): Promise<BenchResult> {
  const file = generatedBoard(size);
  const waveforms = file.waveforms!.map((waveform) => ({
    ...waveform,
    ...(clockMhz !== undefined && waveform.kind === 'trapezoid' && { frequencyMhz: clockMhz }),
  }));
  const { board } = toBoard(boardFileSchema.parse({ ...file, waveforms, cables }));
  const limits = { standard: 'CISPR 32', class: 'B', distanceM: 3, convertDistance: false };
  const started = performance.now();
  const before = process.cpuUsage();
  const result = await runEstimate({ board, limits, request: requestFor(board) });
  const seconds = (performance.now() - started) / 1000;
  const { user, system } = process.cpuUsage(before);
  return {
    name,
    seconds,
    peakMb: process.resourceUsage().maxRSS / 1024,
    detail: {
      'processor time of all threads, seconds': (user + system) / 1e6,
      lines: new Set(result.points.map(({ frequencyHz }) => frequencyHz)).size,
      nets: board.nets.length,
      'limit standard': chooseLimits(limits).standard,
      'worst margin, dB': result.worst?.marginDb ?? 'none',
    },
  };
}

const requestFor = (board: Board) => ({
  site: { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' } as const,
  structure: 'solved' as const,
  maxHz: 1e9,
  requiredMarginDb: 0,
  boardSha256: '',
  programVersion: '',
  notes: [board.name],
});
