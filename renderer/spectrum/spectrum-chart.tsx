import {
  Chart,
  type ChartOptions,
  LinearScale,
  LineElement,
  LogarithmicScale,
  PointElement,
  ScatterController,
  Tooltip,
} from 'chart.js';
import { type MouseEvent, type ReactElement, useEffect, useMemo, useRef, useState, type WheelEvent } from 'react';
import { Scatter } from 'react-chartjs-2';
import type { ResultPoint } from '../../app/estimate/result.ts';
import { frequencyTicks } from '../../app/report/figures/axis.ts';
import { countText } from '../../app/report/format.ts';
import { ContextMenu } from '../components/menu.tsx';
import { frequencyText, levelText, marginText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useSelectedPoint, useSelection, useShown } from '../state/hooks.ts';
import { attempt } from '../state/notices.ts';
import { hover, selectLine } from '../state/selection.ts';
import { type Palette, usePalette } from '../theme/palette.ts';
import { copyPicture, copyPoints } from './copying.ts';
import { drawSpectrum, type SpectrumScene } from './draw-spectrum.ts';
import { levelRange } from './level-range.ts';
import css from './spectrum.module.css';
import { useLimits } from './use-limits.ts';
import { useZoom, zoomAbout } from './zoom.ts';

Chart.register(ScatterController, PointElement, LineElement, LogarithmicScale, LinearScale, Tooltip);

const WHEEL_RATIO = 1.25;

/** The chart: what is drawn on the axes is in `drawSpectrum`; its points carry tooltip and clicks. */
export function SpectrumChart({ onSaid }: { readonly onSaid: (text: string) => void }): ReactElement {
  const palette = usePalette();
  const shown = useShown();
  const limits = useLimits();
  const kept = useApp((state) => state.kept);
  const measurements = useApp((state) => state.measurements);
  const hoveredHz = useApp((state) => state.hover.lineHz);
  const caveats = useApp((state) => state.result?.result.caveats);
  const { net } = useSelection();
  const chosen = useSelectedPoint();
  const [zoom, setZoom] = useZoom();
  const [menu, setMenu] = useState<{ readonly x: number; readonly y: number } | null>(null);
  const points = useMemo(() => shown?.points ?? [], [shown]);
  const range = zoom ?? limits.range;
  const scene: SpectrumScene = {
    points,
    ghosts: kept?.result.points ?? [],
    limitLines: limits.lines,
    requiredMarginDb: limits.requiredMarginDb,
    measurements,
    caveats: caveats ?? [],
    chosen,
    hoveredHz,
    net,
    range,
  };
  // The plugin is read once, when the chart is made: it looks here for what to draw.
  const latest = useRef({ scene, palette });
  latest.current = { scene, palette };
  const chart = useRef<Chart<'scatter'>>(null);
  const plugins = useMemo(
    () => [
      {
        id: 'spectrum',
        beforeDatasetsDraw: (drawn: Chart) => drawSpectrum(drawn, latest.current.scene, latest.current.palette),
      },
    ],
    [],
  );
  const levels = useMemo(
    () => levelRange(points, limits.lines, kept?.result.points ?? [], limits.range),
    [points, limits, kept],
  );
  const data = useMemo(
    () => ({
      datasets: [
        {
          data: points.map((point) => ({ x: point.frequencyHz, y: point.levelDbuvPerM })),
          pointRadius: 0,
          pointHitRadius: 6,
        },
      ],
    }),
    [points],
  );
  const options = useMemo(
    () => optionsOf(palette, range, levels, (index) => latest.current.scene.points[index]),
    [palette, range, levels],
  );
  // biome-ignore lint/correctness/useExhaustiveDependencies: everything the plugin draws
  useEffect(
    () => chart.current?.draw(),
    [chosen, hoveredHz, net, measurements, kept, limits.requiredMarginDb, caveats],
  );

  const pointUnder = (event: MouseEvent): ResultPoint | undefined => {
    const [element] =
      chart.current?.getElementsAtEventForMode(event.nativeEvent, 'nearest', { intersect: true, axis: 'xy' }, false) ??
      [];
    return element && points[element.index];
  };
  const onWheel = (event: WheelEvent) => {
    const scale = chart.current?.scales.x;
    if (scale === undefined) return;
    const x = event.clientX - event.currentTarget.getBoundingClientRect().left;
    const about = Math.min(range[1], Math.max(range[0], scale.getValueForPixel(x) ?? range[0]));
    setZoom(zoomAbout(zoom, limits.range, about, event.deltaY > 0 ? WHEEL_RATIO : 1 / WHEEL_RATIO));
  };
  return (
    <div className={css.chart}>
      <Scatter
        ref={chart}
        data={data}
        options={options}
        plugins={plugins}
        role="img"
        aria-label={labelOf(points, chosen)}
        onClick={(event) => {
          const point = pointUnder(event);
          if (point !== undefined) selectLine(point.frequencyHz, point.detector);
        }}
        onMouseMove={(event) => hover({ lineHz: pointUnder(event)?.frequencyHz ?? null })}
        onMouseLeave={() => hover({ lineHz: null })}
        onDoubleClick={() => setZoom(null)}
        onWheel={onWheel}
        onContextMenu={(event) => {
          event.preventDefault();
          setMenu({ x: event.clientX, y: event.clientY });
        }}
      />
      <ContextMenu
        at={menu}
        onClose={() => setMenu(null)}
        label="Spectrum"
        groups={[
          {
            label: 'Spectrum',
            entries: [
              {
                name: 'copy-picture',
                label: 'Copy as picture',
                run: () =>
                  void attempt('Copy', async () => {
                    await copyPicture(chart.current!.canvas, palette);
                    onSaid('picture copied');
                  }),
              },
              {
                name: 'copy-table',
                label: 'Copy the lines as table',
                run: () =>
                  void attempt('Copy', async () => {
                    await copyPoints(points);
                    onSaid(`${countText(points.length, 'line')} copied`);
                  }),
              },
              { name: 'all', label: 'Show the whole range', isDisabled: zoom === null, run: () => setZoom(null) },
            ],
          },
        ]}
      />
    </div>
  );
}

function labelOf(points: readonly ResultPoint[], chosen: ResultPoint | null): string {
  if (points.length === 0) return 'Spectrum: not estimated yet';
  const about = chosen ?? points[0]!;
  return `Spectrum of ${countText(points.length, 'reading')}. ${chosen === null ? 'Worst' : 'Chosen'}: ${frequencyText(about.frequencyHz)}, ${levelText(about.levelDbuvPerM)} dBµV/m, margin ${marginText(about.marginDb)} dB`;
}

function optionsOf(
  palette: Palette,
  [fromHz, toHz]: readonly [number, number],
  [low, high]: readonly [number, number],
  pointOf: (index: number) => ResultPoint | undefined,
): ChartOptions<'scatter'> {
  const text = { color: palette.color('ink-quiet'), font: { family: palette.font, size: 11 } };
  const ticks = frequencyTicks(fromHz, toHz);
  return {
    responsive: true,
    maintainAspectRatio: false,
    animation: false,
    layout: { padding: { right: 8, top: 4 } },
    scales: {
      x: {
        type: 'logarithmic',
        min: fromHz,
        max: toHz,
        grid: { color: palette.color('grid') },
        title: { display: true, text: 'frequency', ...text },
        afterBuildTicks: (axis) => {
          axis.ticks = ticks.map(({ frequencyHz }) => ({ value: frequencyHz }));
        },
        ticks: { ...text, autoSkip: false, maxRotation: 0, callback: (_value, index) => ticks[index]?.label ?? '' },
      },
      y: {
        min: low,
        max: high,
        grid: { color: palette.color('grid') },
        title: { display: true, text: 'dBµV/m', ...text },
        ticks: { ...text, stepSize: 10 },
      },
    },
    plugins: {
      tooltip: {
        displayColors: false,
        callbacks: {
          label: ({ dataIndex }) => {
            const point = pointOf(dataIndex);
            if (point === undefined) return '';
            const [main] = point.contributors;
            return [
              `${frequencyText(point.frequencyHz)}, ${point.detector}`,
              `${levelText(point.levelDbuvPerM)} dBµV/m, margin ${marginText(point.marginDb)} dB`,
              ...(main === undefined ? [] : [`mainly ${main.name}`]),
            ];
          },
        },
      },
    },
  };
}
