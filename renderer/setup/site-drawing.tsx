import type { ReactElement } from 'react';
import type { Board, Point3M } from '../../app/board/board.ts';
import { type RunSettings, siteRequestOf } from '../../app/project/run-settings.ts';
import { degreesText } from '../../app/report/format.ts';
import {
  ANTENNA_HIGHEST_M,
  ANTENNA_LOWEST_M,
  boundaryRadiusM,
  scanRadiusM,
  siteFrame,
  TABLE_HEIGHT_M,
  toSitePoint,
} from '../../app/site/site.ts';
import { degToRad } from '../../app/units/convert.ts';
import { useApp } from '../state/app-store.ts';
import { useSelectedPoint } from '../state/hooks.ts';
import css from './setup.module.css';

const WIDTH = 640;
const HEIGHT = 230;
const GROUND = 205;
const TOP = 14;
const LEFT = 14;

/** Table, board, cables and antenna from the side, to scale; turned to the chosen line's worst angle. */
export function SiteDrawing({
  board,
  settings,
}: {
  readonly board: Board;
  readonly settings: RunSettings;
}): ReactElement {
  const point = useSelectedPoint();
  const chosenCable = useApp((state) => state.selection.cable);
  const request = siteRequestOf(settings);
  const frame = siteFrame(board, settings.orientation);
  const radiusM = boundaryRadiusM(board, frame, board.cables);
  const antennaM = scanRadiusM(request, radiusM);
  const turn = degToRad(point?.turntableDeg ?? 0);
  const tableM = Math.max(0.5, radiusM);
  const pxPerM = Math.min((WIDTH - LEFT - 80) / (tableM + antennaM), (GROUND - TOP) / (ANTENNA_HIGHEST_M + 0.15));
  const x = (uM: number) => LEFT + (tableM + uM) * pxPerM;
  const y = (zM: number) => GROUND - zM * pxPerM;
  const path = (points: readonly Point3M[]) =>
    points
      .map((pointM) => toSitePoint(frame, pointM))
      .map(
        ([xM, yM, zM], i) =>
          `${i === 0 ? 'M' : 'L'}${x(xM * Math.cos(turn) + yM * Math.sin(turn)).toFixed(1)} ${y(zM).toFixed(1)}`,
      )
      .join('');
  const heightM = point?.antennaHeightM ?? ANTENNA_LOWEST_M;
  const topM = board.stackup[0]?.zTopM ?? 0;
  const hasGround = settings.site === 'ground-plane';
  const fromM = settings.measuredFrom === 'boundary' ? radiusM : 0;
  return (
    <figure className={css.figure}>
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={describe(settings, heightM, board)}>
        {hasGround && <path className={css.ground} d={`M0 ${GROUND}H${WIDTH}`} />}
        {hasGround && (
          <text x={WIDTH - 4} y={GROUND + 14} textAnchor="end">
            ground plane
          </text>
        )}
        <path className={css.table} d={`M${x(-tableM)} ${y(TABLE_HEIGHT_M)}H${x(tableM)}`} />
        <path className={css.thin} d={`M${x(0)} ${GROUND}V${y(TABLE_HEIGHT_M)}`} />
        <text x={x(0) + 4} y={y(TABLE_HEIGHT_M / 2) + 4}>
          {TABLE_HEIGHT_M} m
        </text>
        {board.outlineM.map((ring, i) => (
          <path
            // biome-ignore lint/suspicious/noArrayIndexKey: rings have no name and keep their order
            key={i}
            className={css.board}
            d={path([...ring, ...ring.slice(0, 1)].map(([xM, yM]): Point3M => [xM, yM, topM]))}
          />
        ))}
        {board.cables.map(({ name, pointsM }) => (
          <path key={name} className={css.cable} data-chosen={name === chosenCable || undefined} d={path(pointsM)} />
        ))}
        <path className={css.mast} d={`M${x(antennaM) + 8} ${GROUND}V${y(ANTENNA_HIGHEST_M) - 6}`} />
        <path className={css.travel} d={`M${x(antennaM)} ${y(ANTENNA_LOWEST_M)}V${y(ANTENNA_HIGHEST_M)}`} />
        <path className={css.antenna} d={`M${x(antennaM)} ${y(heightM)}m-7 -5l14 5l-14 5z`} />
        <text x={x(antennaM) + 16} y={y(ANTENNA_HIGHEST_M) + 4}>
          4 m
        </text>
        <text x={x(antennaM) + 16} y={y(ANTENNA_LOWEST_M) + 4}>
          1 m
        </text>
        <path
          className={css.measure}
          d={`M${x(fromM)} ${GROUND - 6}H${x(antennaM)}M${x(fromM)} ${GROUND - 10}v8M${x(antennaM)} ${GROUND - 10}v8`}
        />
        <text x={(x(fromM) + x(antennaM)) / 2} y={GROUND - 10} textAnchor="middle">
          {settings.distanceM} m
        </text>
      </svg>
      <figcaption>
        From the side, to scale
        {point === null ? '.' : `, turned to ${degreesText(point.turntableDeg)}°: the worst angle of the chosen line.`}
      </figcaption>
    </figure>
  );
}

function describe(settings: RunSettings, heightM: number, board: Board): string {
  const cables = board.cables.length === 0 ? 'no cable' : board.cables.map(({ name }) => name).join(', ');
  return `Test set-up from the side: board ${settings.orientation} on a table of ${TABLE_HEIGHT_M} m, ${cables}, antenna at ${settings.distanceM} m, ${heightM.toFixed(2)} m high`;
}
