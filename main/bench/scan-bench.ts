import { boardFileSchema } from '../../app/board/board-file.ts';
import { toBoard } from '../../app/board/to-board.ts';
import { lineLevel } from '../../app/estimate/line-level.ts';
import { radiatingParts } from '../../app/estimate/radiating-parts.ts';
import { buildScene } from '../../app/estimate/scene.ts';
import { spectrumTable } from '../../app/estimate/spectrum-table.ts';
import { cylinderPlan } from '../../app/site/cylinder-field.ts';
import { boxOf } from '../../app/site/moment-grid.ts';
import { SPEED_OF_LIGHT_M_PER_S } from '../../app/units/constants.ts';
import type { BenchResult } from './bench-result.ts';
import { DIRECT_ANGLES, DIRECT_HEIGHTS, directScan } from './direct-scan.ts';
import { generatedBoard } from './generated-board.ts';

const NETS = 200;
const SEGMENTS = 10;
/** The plain sum runs at these harmonics only and is scaled up. */
const PLAIN_EVERY = 13;

/** 200 driven nets of 10 segments, 40 harmonics to 1 GHz, whole ground-plane scan, against the plain sum. */
export function scanBench(): BenchResult {
  const { board } = toBoard(
    boardFileSchema.parse(generatedBoard({ widthMm: 160, heightMm: 100, nets: NETS, segmentsPerNet: SEGMENTS })),
  );
  const started = performance.now();
  const site = { kind: 'ground-plane', distanceM: 3, measuredFrom: 'boundary', orientation: 'flat' } as const;
  const scene = buildScene(board, site, 1e9, 'pair-only');
  const table = spectrumTable(board, 20e6, 1e9, []);
  const levels = table.map((lines) => lineLevel(scene, lines, null)!);
  const seconds = (performance.now() - started) / 1000;
  const peakMb = process.resourceUsage().maxRSS / 1024;

  let elements = 0;
  for (const { pair } of scene.nets.values()) elements += pair.elements.count;
  let plainSeconds = 0;
  let plainCount = 0;
  let worstDb = 0;
  let evaluations = 0;
  for (const [i, lines] of table.entries()) {
    const parts = radiatingParts(scene, lines);
    const kPerM = (2 * Math.PI * lines.frequencyHz) / SPEED_OF_LIGHT_M_PER_S;
    const domains = [...new Set(parts.map(({ domain }) => domain))].map((domain) =>
      parts.filter((part) => part.domain === domain).map(({ radiator }) => radiator),
    );
    const plan = cylinderPlan(kPerM, scene.scanRadiusM, domains.flat(), 'ground-plane');
    evaluations += (2 * plan.order + 1) * plan.heightsM.length * plan.partCount;
    if (i % PLAIN_EVERY !== 0) continue;
    const before = performance.now();
    const plain = directScan(domains, kPerM, scene.scanRadiusM);
    plainSeconds += (performance.now() - before) / 1000;
    plainCount++;
    const level = levels[i]!;
    for (const [found, direct] of [
      [level.horizontalVPerM, Math.sqrt(plain.horizontal)],
      [level.verticalVPerM, Math.sqrt(plain.vertical)],
    ] as const) {
      worstDb = Math.max(worstDb, 20 * Math.log10(direct / found));
    }
  }
  const plainTotal = (plainSeconds * table.length) / plainCount;
  return {
    name: 'scan of 200 nets, 40 harmonics',
    seconds,
    ratio: plainTotal / seconds,
    peakMb,
    detail: {
      elements,
      frequencies: table.length,
      'antenna positions evaluated': evaluations,
      'antenna positions of the plain sum': DIRECT_ANGLES * DIRECT_HEIGHTS * 2 * table.length,
      'plain sum, scaled, seconds': plainTotal,
      'plain sum above the found maximum at most, dB': worstDb,
      'box of the elements': JSON.stringify(
        boxOf(
          [...scene.nets.values()].map(({ pair }) => ({ elements: pair.elements, currentsA: new Float64Array(0) })),
        ),
      ),
    },
  };
}
