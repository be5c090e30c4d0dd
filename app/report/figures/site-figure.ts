import type { Board, Point3M } from '../../board/board.ts';
import type { EstimateResult } from '../../estimate/result.ts';
import { ANTENNA_HIGHEST_M, ANTENNA_LOWEST_M, scanRadiusM, siteFrame, toSitePoint } from '../../site/site.ts';
import { degToRad } from '../../units/convert.ts';
import { degreesText, fixed, frequencyText, trimmed } from '../format.ts';
import { type Markup, markup } from '../markup.ts';
import { scaleBar } from './board-frame.ts';
import { linePath, px, ringPath, type Xy } from './path.ts';

const WIDTH = 760;
const HEIGHT = 296;
const SIDE_LEFT = 12;
const SIDE_WIDTH = 388;
const GROUND_Y = 256;
const TOP_Y = 24;
const PLAN_CENTRE: Xy = [640, 138];
const PLAN_RADIUS = 84;
/** The antenna stands this far before its mast, so that both are seen. */
const BOOM = 9;

/** Board and cables as the antenna of the worst line meets them. */
interface Scene {
  readonly outlines: readonly (readonly Point3M[])[];
  readonly cables: readonly (readonly Point3M[])[];
  readonly azimuthRad: number;
}

/** The set-up to scale: from the side in the plane of axis and antenna, and from above, for the worst line's position. */
export function siteFigure(board: Board, result: EstimateResult): Markup {
  const frame = siteFrame(board, result.site.orientation);
  const topM = board.stackup[0]?.zTopM ?? 0;
  const scene: Scene = {
    outlines: board.outlineM.flatMap((ring) =>
      [0, topM].map((zM) => ring.map(([xM, yM]) => toSitePoint(frame, [xM, yM, zM]))),
    ),
    cables: board.cables.map(({ pointsM }) => pointsM.map((point) => toSitePoint(frame, point))),
    azimuthRad: degToRad(result.points[0]?.turntableDeg ?? 0),
  };
  return markup`<svg class="figure" viewBox="0 0 ${WIDTH} ${HEIGHT}" role="img" aria-label="Test set-up to scale">
${sideView(scene, result)}
${planView(scene, result)}
</svg>`;
}

function sideView(scene: Scene, result: EstimateResult): Markup {
  const { site } = result;
  const worst = result.points[0];
  const radiusM = site.boundaryRadiusM;
  const antennaM = scanRadiusM(site, radiusM);
  const halfTableM = Math.max(0.5, radiusM);
  const leftM = halfTableM + 0.3;
  const pxPerM = Math.min(SIDE_WIDTH / (leftM + antennaM), (GROUND_Y - TOP_Y) / (ANTENNA_HIGHEST_M + 0.1));
  const at = (uM: number, zM: number): Xy => [SIDE_LEFT + (leftM + uM) * pxPerM, GROUND_Y - zM * pxPerM];
  const [cos, sin] = [Math.cos(scene.azimuthRad), Math.sin(scene.azimuthRad)];
  const project = (points: readonly Point3M[]) => points.map(([xM, yM, zM]) => at(xM * cos + yM * sin, zM));
  const [mastX, highY] = at(antennaM, ANTENNA_HIGHEST_M);
  const [, lowY] = at(antennaM, ANTENNA_LOWEST_M);
  const [tableLeft, tableY] = at(-halfTableM, site.tableHeightM);
  const [tableRight] = at(halfTableM, 0);
  const [fromX] = at(site.measuredFrom === 'boundary' ? radiusM : 0, 0);
  const [axisX] = at(0, 0);
  const [endX] = at(antennaM + 0.25, 0);
  const isGround = site.kind === 'ground-plane';
  const dimensionY = GROUND_Y + 14;
  const antenna = worst && at(antennaM, worst.antennaHeightM);
  return markup`<text class="label" x="${SIDE_LEFT}" y="12">From the side</text>
${isGround && markup`<path class="ground" d="M${SIDE_LEFT} ${GROUND_Y}H${px(endX)}"/>`}
<path class="table" d="M${px(tableLeft)} ${px(tableY)}H${px(tableRight)}M${px(tableLeft + 4)} ${px(tableY)}V${GROUND_Y}M${px(tableRight - 4)} ${px(tableY)}V${GROUND_Y}"/>
<path class="axis" d="M${px(axisX)} ${px(tableY - 26)}V${px(dimensionY)}"/>
${antenna && rays(at, result, antennaM)}
${scene.cables.map((cable) => markup`<path class="cable" d="${linePath(project(cable))}"/>`)}
<path class="board-solid" d="${scene.outlines.map((ring) => ringPath(project(ring))).join('')}"/>
<path class="ruler" d="M${px(mastX)} ${px(lowY)}V${px(highY)}M${px(mastX - 5)} ${px(lowY)}h10M${px(mastX - 5)} ${px(highY)}h10"/>
<text class="num" x="${px(mastX + 9)}" y="${px(highY + 3.5)}">${ANTENNA_HIGHEST_M} m</text>
<text class="num" x="${px(mastX + 9)}" y="${px(lowY + 3.5)}">${ANTENNA_LOWEST_M} m</text>
${antenna && antennaMark(antenna, [lowY, highY], result)}
<path class="ruler" d="M${px(fromX)} ${px(dimensionY)}H${px(mastX)}M${px(fromX)} ${px(dimensionY - 4)}v8M${px(mastX)} ${px(dimensionY - 4)}v8"/>
<text class="num middle" x="${px((fromX + mastX) / 2)}" y="${px(dimensionY + 13)}">${trimmed(site.distanceM, 2)} m from ${site.measuredFrom === 'boundary' ? 'the boundary' : 'the axis'}</text>
<text class="num end" x="${px(tableLeft - 4)}" y="${px(tableY + 3.5)}">${trimmed(site.tableHeightM, 2)} m</text>
<text class="unit" x="${SIDE_LEFT}" y="${px(GROUND_Y + 27)}">${isGround ? 'ground plane' : 'free space, no reflection'}</text>`;
}

/** Direct ray, and over a ground plane the reflected one, for the worst line's antenna height. */
function rays(at: (uM: number, zM: number) => Xy, { site, points }: EstimateResult, antennaM: number): Markup {
  const heightM = points[0]!.antennaHeightM;
  const source = at(0, site.tableHeightM);
  const antenna = at(antennaM, heightM);
  // Equal angles at the ground: it is met where the line from the image reaches z = 0.
  const reflection = at((antennaM * site.tableHeightM) / (site.tableHeightM + heightM), 0);
  return markup`<path class="ray" d="${linePath([source, antenna])}"/>${
    site.kind === 'ground-plane' && markup`<path class="ray" d="${linePath([source, reflection, antenna])}"/>`
  }`;
}

/** A vertical antenna as a bar, a horizontal one end-on as a ring with a dot. */
function antennaMark([x, y]: Xy, [lowY, highY]: Xy, { points }: EstimateResult): Markup {
  const { polarization, antennaHeightM, frequencyHz } = points[0]!;
  const elementX = x - BOOM;
  const shape =
    polarization === 'vertical'
      ? markup`<path class="antenna" d="M${px(elementX)} ${px(y - 9)}v18"/>`
      : markup`<circle class="antenna" cx="${px(elementX)}" cy="${px(y)}" r="5"/><circle class="antenna-dot" cx="${px(elementX)}" cy="${px(y)}" r="1.6"/>`;
  // Two lines of text between the numbers at the travel's ends, never over them.
  const textY = Math.max(highY + 17, Math.min(lowY - 22, y + 0.5));
  return markup`<path class="boom" d="M${px(x)} ${px(y)}H${px(elementX)}"/>${shape}<text class="label" x="${px(x + 9)}" y="${px(textY)}">${fixed(antennaHeightM, 2)} m, ${polarization}</text>
<text class="unit" x="${px(x + 9)}" y="${px(textY + 11)}">worst line, ${frequencyText(frequencyHz)}</text>`;
}

function planView(scene: Scene, { site, points }: EstimateResult): Markup {
  const [centreX, centreY] = PLAN_CENTRE;
  const radiusM = Math.max(site.boundaryRadiusM, 1e-3);
  const pxPerM = PLAN_RADIUS / radiusM;
  const at = ([xM, yM]: Point3M): Xy => [centreX + xM * pxPerM, centreY - yM * pxPerM];
  const polar = (deg: number, radius: number): Xy => [
    centreX + radius * Math.cos(degToRad(deg)),
    centreY - radius * Math.sin(degToRad(deg)),
  ];
  const worst = points[0];
  return markup`<text class="label" x="${px(centreX - PLAN_RADIUS - 24)}" y="12">From above</text>
<clipPath id="plan-clip"><circle cx="${px(centreX)}" cy="${px(centreY)}" r="${PLAN_RADIUS + 1}"/></clipPath>
<circle class="boundary" cx="${px(centreX)}" cy="${px(centreY)}" r="${PLAN_RADIUS}"/>
${[0, 90, 180, 270].map((deg) => {
  const [x, y] = polar(deg, PLAN_RADIUS + 18);
  return markup`<path class="ruler" d="${linePath([polar(deg, PLAN_RADIUS), polar(deg, PLAN_RADIUS + 5)])}"/><text class="num middle" x="${px(x)}" y="${px(y + 3.5)}">${deg}°</text>`;
})}
<path class="axis" d="M${px(centreX - 5)} ${px(centreY)}h10M${px(centreX)} ${px(centreY - 5)}v10"/>
<g clip-path="url(#plan-clip)">${scene.cables.map((cable) => markup`<path class="cable" d="${linePath(cable.map(at))}"/>`)}
<path class="board-plan" d="${scene.outlines.map((ring) => ringPath(ring.map(at))).join('')}"/></g>
${worst && markup`<path class="arrow" d="${linePath([polar(worst.turntableDeg, PLAN_RADIUS - 2), polar(worst.turntableDeg, PLAN_RADIUS + 30)])}"/>${arrowHead(polar, worst.turntableDeg)}`}
<text class="num middle" x="${px(centreX)}" y="${px(centreY + PLAN_RADIUS + 44)}">boundary radius ${fixed(site.boundaryRadiusM, 2)} m${worst ? `; worst line from ${degreesText(worst.turntableDeg)}°` : ''}</text>
${scaleBar(pxPerM, [centreX - PLAN_RADIUS, centreY + PLAN_RADIUS + 58], 90, 'm')}`;
}

/** Points away from the board, at the antenna. */
function arrowHead(polar: (deg: number, radius: number) => Xy, deg: number): Markup {
  const tip = polar(deg, PLAN_RADIUS + 34);
  return markup`<path class="arrow-head" d="${ringPath([tip, polar(deg - 2.4, PLAN_RADIUS + 25), polar(deg + 2.4, PLAN_RADIUS + 25)])}"/>`;
}
