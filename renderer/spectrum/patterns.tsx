import type { ReactElement } from 'react';
import type { LineDetail } from '../../app/contract/line-detail.ts';
import { degreesText } from '../../app/report/format.ts';
import { ErrorNotice } from '../components/notes.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { levelText, numberText } from '../i18n/format.ts';
import { useDetail } from '../state/hooks.ts';
import { heightPath, polarPath, ringLevels } from './pattern-paths.ts';
import css from './spectrum.module.css';

const SIZE = 200;
const RADIUS = 82;
const SPAN_DB = 30;

/** Which side of the board looks at the antenna, and at which height: the chosen line over a whole turn and travel. */
export function Patterns(): ReactElement | null {
  const detail = useDetail();
  if (detail.kind === 'none') return null;
  if (detail.kind === 'failed')
    return <ErrorNotice title="The patterns cannot be computed">{detail.message}</ErrorNotice>;
  return (
    <section aria-busy={detail.kind === 'loading'}>
      <h4>
        Patterns
        <HelpTip question="What do the patterns show?">
          <p>
            Left: the level while the turntable turns the board once, seen from above, at the antenna height of the
            maximum; 0° is where the board’s right edge (+x) looks at the antenna. Right: the level while the antenna
            goes from 1 to 4 m at the angle of the maximum. Solid: vertical polarisation. Dashed: horizontal.
          </p>
        </HelpTip>
      </h4>
      {detail.kind === 'loading' ? (
        <p className={css.where}>Computing…</p>
      ) : (
        <div className={css.patterns}>
          <Polar detail={detail.detail} />
          <Height detail={detail.detail} />
        </div>
      )}
    </section>
  );
}

function Polar({ detail }: { readonly detail: LineDetail }): ReactElement {
  const { turntableDeg, horizontalDbuvPerM, verticalDbuvPerM } = detail.azimuth;
  const top = Math.max(...horizontalDbuvPerM, ...verticalDbuvPerM);
  const scale = { topDb: top, spanDb: SPAN_DB, radius: RADIUS };
  const mark = (detail.turntableDeg * Math.PI) / 180;
  return (
    <svg
      className={css.pattern}
      viewBox={`${-SIZE / 2} ${-SIZE / 2} ${SIZE} ${SIZE}`}
      role="img"
      aria-label={`Turntable pattern: maximum ${levelText(detail.levelDbuvPerM)} dBµV/m at ${degreesText(detail.turntableDeg)}°, ${detail.polarization}`}
    >
      {ringLevels(scale).map(({ level, radius }) => (
        <g key={level}>
          <circle className={css.grid} r={radius} />
          <text className={css.tick} x={2} y={-radius + 9}>
            {numberText(Math.round(level))}
          </text>
        </g>
      ))}
      {[0, 90, 180, 270].map((angle) => {
        const turn = (angle * Math.PI) / 180;
        return (
          <g key={angle}>
            <line className={css.grid} x2={RADIUS * Math.cos(turn)} y2={-RADIUS * Math.sin(turn)} />
            <text className={css.angle} x={92 * Math.cos(turn)} y={-92 * Math.sin(turn) + 3}>
              {angle}°
            </text>
          </g>
        );
      })}
      <path className={css.horizontal} d={polarPath(turntableDeg, horizontalDbuvPerM, scale)} />
      <path className={css.vertical} d={polarPath(turntableDeg, verticalDbuvPerM, scale)} />
      <line className={css.chosenLine} x2={RADIUS * Math.cos(mark)} y2={-RADIUS * Math.sin(mark)} />
    </svg>
  );
}

const FRAME = { left: 34, right: 190, top: 12, bottom: 172 } as const;

function Height({ detail }: { readonly detail: LineDetail }): ReactElement {
  const { antennaHeightM, horizontalDbuvPerM, verticalDbuvPerM } = detail.height;
  const top = Math.max(...horizontalDbuvPerM, ...verticalDbuvPerM);
  const low = antennaHeightM[0]!;
  const high = antennaHeightM.at(-1)!;
  const scale = { topDb: top, spanDb: SPAN_DB, lowM: low, highM: high, frame: FRAME };
  const y = (heightM: number) => FRAME.bottom - ((heightM - low) / (high - low)) * (FRAME.bottom - FRAME.top);
  return (
    <svg
      className={css.pattern}
      viewBox={`0 0 ${SIZE} ${SIZE}`}
      role="img"
      aria-label={`Height pattern: maximum at ${detail.antennaHeightM.toFixed(2)} m`}
    >
      {[1, 2, 3, 4].map((heightM) => (
        <g key={heightM}>
          <line className={css.grid} x1={FRAME.left} x2={FRAME.right} y1={y(heightM)} y2={y(heightM)} />
          <text className={css.tick} x={4} y={y(heightM) + 3}>
            {heightM} m
          </text>
        </g>
      ))}
      {[0, 10, 20, 30].map((below) => {
        const x = FRAME.right - (below / SPAN_DB) * (FRAME.right - FRAME.left);
        return (
          <g key={below}>
            <line className={css.grid} x1={x} x2={x} y1={FRAME.top} y2={FRAME.bottom} />
            <text className={css.angle} x={x} y={FRAME.bottom + 14}>
              {numberText(Math.round(top - below))}
            </text>
          </g>
        );
      })}
      <text className={css.angle} x={(FRAME.left + FRAME.right) / 2} y={FRAME.bottom + 26}>
        dBµV/m
      </text>
      <path className={css.horizontal} d={heightPath(antennaHeightM, horizontalDbuvPerM, scale)} />
      <path className={css.vertical} d={heightPath(antennaHeightM, verticalDbuvPerM, scale)} />
      <line
        className={css.chosenLine}
        x1={FRAME.left}
        x2={FRAME.right}
        y1={y(detail.antennaHeightM)}
        y2={y(detail.antennaHeightM)}
      />
    </svg>
  );
}
