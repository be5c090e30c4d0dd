import type { Board } from '../../board/board.ts';
import type { EstimateResult, ResultPoint, StructureCurrentMap } from '../../estimate/result.ts';
import { type Block, heading, lead, note, type Section } from '../blocks.ts';
import { mainContributor } from '../contributor-text.ts';
import { cableFigure, MOST_CABLES } from '../figures/cable-figure.ts';
import { currentFigure, type DrawnOver } from '../figures/current-figure.ts';
import { LEVEL_COLOURS, LEVEL_STEP_DB } from '../figures/level-colours.ts';
import { frequencyText, levelText, marginText, mmText } from '../format.ts';
import { printed } from '../number.ts';
import { worstOfEachFrequency } from '../worst-readings.ts';
import { mainText } from './main-text.ts';

/** Frequencies with a picture. */
const MOST_MAPS = 3;

/** Where the current flows at some of the worst lines: the plane from the top, the cables along their length. */
export function currentsSection(result: EstimateResult, board: Board): Section {
  const title = 'Current on plane and cables';
  const maps = (result.currentMaps ?? []).slice(0, MOST_MAPS);
  if (maps.length === 0) return { title, blocks: [] };
  const points = new Map(worstOfEachFrequency(result.points).map((point) => [point.frequencyHz, point]));
  return {
    title,
    blocks: [
      lead(
        `What nets and loops drive over the planes and into the cables at some of the worst lines; rms, clock domains added as powers. The return current straight under a trace belongs to the trace pair and is not in it. The planes count as one sheet, seen from the top, with cells of ${mmText(maps[0]!.cellM, 1)}; axes in mm; ${LEVEL_STEP_DB} dB a colour, and the weakest colour for all that lies more than ${LEVEL_STEP_DB * LEVEL_COLOURS.length} dB below the top of the scale. The line over it is the main contributor, all layers. Cables are drawn straight, each to its own scale (at most ${MOST_CABLES}, those with the largest current): square at the board, ticks at bends, ring at an open end.`,
      ),
      ...maps.map((map) => mapBlock(map, points.get(map.frequencyHz), board)),
    ],
  };
}

function mapBlock(map: StructureCurrentMap, point: ResultPoint | undefined, board: Board): Block {
  const main = point && mainContributor(point);
  const over = main && drawnOver(main.contributor.kind, main.contributor.name, board);
  const plane = currentFigure(map, board, over);
  const cables = cableFigure(map, board);
  const said = point && [
    `: ${printed(levelText(point.levelDbuvPerM))} dBµV/m, margin ${printed(marginText(point.marginDb))} dB`,
    main && ['; mainly ', mainText(point)],
  ];
  return {
    kind: 'together',
    blocks: [
      heading(frequencyText(map.frequencyHz), said),
      { kind: 'figure', pictures: [plane, cables].filter((picture) => picture !== undefined), captions: [] },
      ...(plane ? [] : [note('No current on the planes.')]),
    ],
  };
}

function drawnOver(kind: string, name: string, board: Board): DrawnOver | undefined {
  const net = kind === 'net' ? board.nets.find((one) => one.name === name) : undefined;
  const loopM = kind === 'loop' ? board.loops.find((one) => one.name === name)?.pointsM : undefined;
  return net || loopM ? { name, net, loopM } : undefined;
}
