import { type PointerEvent, type ReactElement, useEffect, useMemo, useRef, useState } from 'react';
import { countText } from '../../app/report/format.ts';
import { standingOf } from '../../app/report/verdict.ts';
import { frequencyText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useSelectedPoint, useShown } from '../state/hooks.ts';
import { hover, selectLine } from '../state/selection.ts';
import { usePalette } from '../theme/palette.ts';
import { drawStrip, frequencyAt, type StripSize, stripScale } from './draw-strip.ts';
import css from './spectrum.module.css';
import { stripTicks, tickNear } from './strip-ticks.ts';
import { useLimits } from './use-limits.ts';
import { useSize } from './use-size.ts';
import { useZoom, zoomBetween } from './zoom.ts';

const REACH_PX = 6;
/** A pointer that moved less has clicked. */
const DRAG_PX = 5;

/** Overview and navigation: every line a tick whose length is its margin. Click chooses, dragging zooms the spectrum. */
export function RangeStrip(): ReactElement {
  const canvas = useRef<HTMLCanvasElement>(null);
  const size = useSize(canvas);
  const palette = usePalette();
  const shown = useShown();
  const kept = useApp((state) => state.kept);
  const hoveredHz = useApp((state) => state.hover.lineHz);
  const chosen = useSelectedPoint();
  const { range, requiredMarginDb } = useLimits();
  const [zoom, setZoom] = useZoom();
  const [pressed, setPressed] = useState<number | null>(null);
  const [drag, setDrag] = useState<readonly [number, number] | null>(null);
  const ticks = useMemo(() => ticksOf(shown?.points ?? [], range, size), [shown, range, size]);
  const ghosts = useMemo(() => ticksOf(kept?.result.points ?? [], range, size), [kept, range, size]);

  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!context || size.widthPx === 0) return;
    context.setTransform(devicePixelRatio, 0, 0, devicePixelRatio, 0, 0);
    drawStrip(context, size, { ticks, ghosts, range, requiredMarginDb, zoom, drag, chosen, hoveredHz }, palette);
  }, [size, ticks, ghosts, range, requiredMarginDb, zoom, drag, chosen, hoveredHz, palette]);

  const placeOf = (event: PointerEvent) => event.clientX - canvas.current!.getBoundingClientRect().left;
  const onPointerDown = (event: PointerEvent) => {
    if (event.button !== 0) return;
    canvas.current!.setPointerCapture(event.pointerId);
    setPressed(placeOf(event));
  };
  const onPointerMove = (event: PointerEvent) => {
    const x = placeOf(event);
    if (pressed !== null && (drag !== null || Math.abs(x - pressed) > DRAG_PX)) setDrag([pressed, x]);
    else hover({ lineHz: tickNear(ticks, x, REACH_PX)?.point.frequencyHz ?? null });
  };
  const onPointerUp = (event: PointerEvent) => {
    if (pressed === null) return;
    const x = placeOf(event);
    setPressed(null);
    setDrag(null);
    if (drag !== null) {
      setZoom(zoomBetween(frequencyAt(range, size, drag[0]), frequencyAt(range, size, x), range));
      return;
    }
    const tick = tickNear(ticks, x, REACH_PX);
    if (tick !== null) selectLine(tick.point.frequencyHz, tick.point.detector);
  };
  const over = (shown?.points ?? []).filter((point) => standingOf(point, requiredMarginDb) === 'over').length;
  const summary =
    shown === null
      ? 'not estimated yet'
      : `${countText(shown.points.length, 'reading')}, ${over} over the limit${chosen === null ? '' : `; chosen: ${frequencyText(chosen.frequencyHz)}`}`;
  return (
    <canvas
      ref={canvas}
      className={css.strip}
      width={Math.round(size.widthPx * devicePixelRatio)}
      height={Math.round(size.heightPx * devicePixelRatio)}
      role="img"
      aria-label={`Range ${frequencyText(range[0])} to ${frequencyText(range[1])}: ${summary}. Arrow keys step through the lines.`}
      onPointerDown={onPointerDown}
      onPointerMove={onPointerMove}
      onPointerUp={onPointerUp}
      onPointerCancel={() => {
        setPressed(null);
        setDrag(null);
      }}
      onPointerLeave={() => hover({ lineHz: null })}
      onDoubleClick={() => setZoom(null)}
    />
  );
}

const ticksOf = (points: Parameters<typeof stripTicks>[0], range: readonly [number, number], size: StripSize) =>
  stripTicks(
    points.filter(({ frequencyHz }) => frequencyHz >= range[0] && frequencyHz <= range[1]),
    stripScale(range, size).at,
  );
