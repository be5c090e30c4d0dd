import { dbText } from '../../compare/run-text.ts';
import type { BandMargin, TrendGroup } from '../../compare/types.ts';
import { bandName } from '../comparison/comparison-words.ts';
import { type Markup, markup, shortName } from '../markup.ts';
import { revisionName, standingOfPoint } from '../trend/trend-words.ts';
import { linearScale, multiples, roundStep, type Scale } from './axis.ts';
import { markGroup } from './marks.ts';
import { dashPath, linePath, px, type Xy } from './path.ts';
import type { Box } from './place-labels.ts';
import { FIGURE_WIDTH, PLOT_LEFT } from './spectrum-frame.ts';

const HEIGHT = 280;
const BOX: Box = { left: PLOT_LEFT, top: 22, right: 590, bottom: 246 };
/** Room that a revision's name takes under the axis. */
const NAME_PX = 54;
const LABEL_APART_PX = 12;
/** Bands drawn; more would be a thicket. */
const MOST_BANDS = 6;
/** Larger margins are cut: they matter to nobody. */
const MOST_MARGIN_DB = 50;

type Worst = BandMargin['worst'];

/** Worst margin over revisions: of the whole range (marked), and of each band (thin, named at its end); up is better. `hatchId`: unique in the page. */
export function trendFigure(group: TrendGroup, hatchId = 'trend-hatch'): Markup {
  const { points, requiredMarginDb } = group;
  const bands = group.bands.filter(({ steps }) => steps.some(({ worst }) => worst)).slice(0, MOST_BANDS);
  const scale = marginScale([...points, ...bands.flatMap(({ steps }) => steps)], requiredMarginDb);
  const xAt = (i: number) => BOX.left + ((i + 0.5) / points.length) * (BOX.right - BOX.left);
  const places = (steps: readonly { worst: Worst }[]): (Xy | undefined)[] =>
    steps.map(({ worst }, i) => (worst ? [xAt(i), scale.at(Math.min(worst.marginDb, MOST_MARGIN_DB))] : undefined));
  const all = places(points);
  const drawn = bands.map((band) => ({ name: bandName(band), places: places(band.steps) }));
  const zeroY = scale.at(0);
  const bandPx = zeroY - scale.at(requiredMarginDb);
  const values = multiples(scale.from, scale.to, roundStep(scale.to - scale.from, 8));
  return markup`<svg class="figure" viewBox="0 0 ${FIGURE_WIDTH} ${HEIGHT}" role="img" aria-label="Worst margin over revisions">
<defs><pattern id="${hatchId}" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><path class="hatch" d="M0 0V5"/></pattern></defs>
<path class="grid" d="${values.map((value) => `M${px(BOX.left)} ${px(scale.at(value))}H${px(BOX.right)}`).join('')}"/>
<rect class="frame" x="${px(BOX.left)}" y="${px(BOX.top)}" width="${px(BOX.right - BOX.left)}" height="${px(BOX.bottom - BOX.top)}"/>
${values.map((value) => markup`<text class="num end" x="${px(BOX.left - 5)}" y="${px(scale.at(value) + 3.5)}">${dbNumber(value)}</text>`)}
<text class="unit" x="${px(BOX.left - 40)}" y="${px(BOX.top - 7)}">worst margin, dB</text>
${bandPx > 0 && markup`<rect class="band" fill="url(#${hatchId})" x="${px(BOX.left)}" y="${px(zeroY - bandPx)}" width="${px(BOX.right - BOX.left)}" height="${px(bandPx)}"/>`}
<path class="limit qp" d="M${px(BOX.left)} ${px(zeroY)}H${px(BOX.right)}"/>
${drawn.map(({ places: own }, i) => markup`<path class="trend-band b${i}" d="${pieces(own)}"/>`)}
<path class="trend-worst" d="${pieces(all)}"/>
${(['fine', 'short', 'over'] as const).map((standing) =>
  markGroup(
    standing,
    all.flatMap((place, i) => (place && standingOfPoint(points[i]!) === standing ? [place] : [])),
  ),
)}
${revisionNames(group, xAt)}
${endLabels(drawn, all, zeroY)}
</svg>`;
}

const dbNumber = (value: number): string => String(Math.round(value * 1e6) / 1e6).replace('-', '−');

function marginScale(steps: readonly { worst: Worst }[], requiredMarginDb: number): Scale {
  const margins = steps.flatMap(({ worst }) => (worst ? [Math.min(worst.marginDb, MOST_MARGIN_DB)] : []));
  const low = margins.reduce((least, margin) => Math.min(least, margin), 0);
  const high = margins.reduce((most, margin) => Math.max(most, margin), Math.max(10, requiredMarginDb));
  return linearScale(Math.floor((low - 2) / 5) * 5, Math.ceil((high + 2) / 5) * 5, BOX.bottom, BOX.top);
}

/** Half a dash that stands for a revision whose neighbours have no line. */
const LONE_HALF_PX = 8;

/** One path, interrupted where a revision has no line. */
function pieces(places: readonly (Xy | undefined)[]): string {
  const runs: Xy[][] = [[]];
  for (const place of places) {
    if (place) runs.at(-1)!.push(place);
    else runs.push([]);
  }
  return runs.map((run) => (run.length === 1 ? dashPath(...run[0]!, LONE_HALF_PX, 0) : linePath(run))).join('');
}

/** As many names as fit, the last one always. */
function revisionNames({ points }: TrendGroup, xAt: (i: number) => number): Markup {
  const step = Math.ceil((NAME_PX * points.length) / (BOX.right - BOX.left));
  const shown = points.map((point, i) => ({ point, i })).filter(({ i }) => (points.length - 1 - i) % step === 0);
  return markup`${shown.map(({ point, i }) => {
    const margin = point.worst && `${dbText(point.worst.marginDb)} dB`;
    return markup`<text class="label middle" x="${px(xAt(i))}" y="${px(BOX.bottom + 14)}">${shortName(revisionName(point), 9)}</text>${
      margin !== null &&
      markup`<text class="minor middle" x="${px(xAt(i))}" y="${px(BOX.bottom + 26)}">${margin}</text>`
    }`;
  })}`;
}

/** Names at the right end of each line, moved apart where lines end together; the whole range first, then from the top. */
function endLabels(
  drawn: readonly { name: string; places: readonly (Xy | undefined)[] }[],
  all: readonly (Xy | undefined)[],
  zeroY: number,
): Markup {
  const lastOf = (places: readonly (Xy | undefined)[]) => places.findLast((place) => place !== undefined);
  const wanted = [
    { text: 'limit', y: zeroY, className: 'unit' },
    ...[lastOf(all)].flatMap((end) => (end ? [{ text: 'worst of all', y: end[1], className: 'label strong' }] : [])),
    ...drawn.flatMap(({ name, places }) => {
      const end = lastOf(places);
      return end ? [{ text: name, y: end[1], className: 'label' }] : [];
    }),
  ].sort((one, other) => one.y - other.y);
  let freeY = BOX.top - LABEL_APART_PX;
  return markup`${wanted.map(({ text, y, className }) => {
    freeY = Math.max(y + 3.5, freeY + LABEL_APART_PX);
    return markup`<text class="${className}" x="${px(BOX.right + 8)}" y="${px(freeY)}">${text}</text>`;
  })}`;
}
