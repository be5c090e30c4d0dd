import type { Contributor, EstimateResult, ResultPoint } from '../../estimate/result.ts';
import { lead, name, quiet, type Section, type ShareGroup, type ShareRow } from '../blocks.ts';
import { KIND_REMARK, pathsOf, pathText } from '../contributor-text.ts';
import { BAR_SPAN_DB } from '../figures/bars.ts';
import { frequencyText, marginText } from '../format.ts';
import { printed } from '../number.ts';
import { DETECTOR_SHORT } from '../text-table.ts';
import { worstOfEachFrequency } from '../worst-readings.ts';

/** Frequencies taken apart, contributors and paths listed for each. */
const MOST_FREQUENCIES = 6;
const MOST_CONTRIBUTORS = 5;
const MOST_PATHS = 5;

/** What the worst lines are made of: contributor by path, as bars in dB with the law of their sum. */
export function sharesSection(result: EstimateResult): Section {
  const title = 'What the worst lines are made of';
  const worst = worstOfEachFrequency(result.points).slice(0, MOST_FREQUENCIES);
  if (worst.every(({ contributors }) => contributors.length === 0)) return { title, blocks: [] };
  return {
    title,
    blocks: [
      lead(
        `Levels at the height, angle and polarisation of each maximum. The light bars under a contributor are its paths: trace pair, plane, each cable. Within one clock domain contributors, and the paths of each, add as phasors: they may cancel, so that a part can be larger than the sum; different domains add as powers. A full bar is the strongest part, an empty one ${BAR_SPAN_DB} dB below it; what is weaker is not listed.`,
      ),
      { kind: 'shares', groups: worst.map(shareGroup) },
    ],
  };
}

function shareGroup(point: ResultPoint): ShareGroup {
  const topDb = point.contributors
    .flatMap((contributor) => [
      contributor.levelDbuvPerM,
      ...pathsOf(contributor).map(({ levelDbuvPerM }) => levelDbuvPerM),
    ])
    .reduce((one, other) => Math.max(one, other), point.levelDbuvPerM);
  const shown = point.contributors
    .slice(0, MOST_CONTRIBUTORS)
    .filter(({ levelDbuvPerM }) => levelDbuvPerM > topDb - BAR_SPAN_DB);
  return {
    title: frequencyText(point.frequencyHz),
    remark: `${DETECTOR_SHORT[point.detector]}, margin ${printed(marginText(point.marginDb))} dB`,
    levelDbuvPerM: point.levelDbuvPerM,
    topDbuvPerM: topDb,
    rows: shown.flatMap((contributor) => contributorRows(contributor, topDb)),
    left: point.contributors.length - shown.length,
  };
}

function contributorRows(contributor: Contributor, topDb: number): ShareRow[] {
  const paths = pathsOf(contributor).filter(({ levelDbuvPerM }) => levelDbuvPerM > topDb - BAR_SPAN_DB);
  const isSame = paths.length === 1 && paths[0]!.levelDbuvPerM === contributor.levelDbuvPerM;
  const remark = contributor.kind === 'net' && isSame ? pathText(paths[0]!.name) : KIND_REMARK[contributor.kind];
  const own: ShareRow = {
    text: [name(contributor.name, 30), ' ', quiet(remark)],
    levelDbuvPerM: contributor.levelDbuvPerM,
    isPath: false,
  };
  if (isSame) return [own];
  const parts = paths
    .slice(0, MOST_PATHS)
    .map(
      (path): ShareRow => ({ text: name(pathText(path.name), 30), levelDbuvPerM: path.levelDbuvPerM, isPath: true }),
    );
  return [own, ...parts];
}
