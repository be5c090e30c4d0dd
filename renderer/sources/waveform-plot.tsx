import {
  Chart,
  type ChartOptions,
  LinearScale,
  LineElement,
  LogarithmicScale,
  PointElement,
  ScatterController,
} from 'chart.js';
import { type ReactElement, useMemo } from 'react';
import { Scatter } from 'react-chartjs-2';
import type { Waveform } from '../../app/board/board.ts';
import { frequencyTicks } from '../../app/report/figures/axis.ts';
import { frequencyText, quantityText } from '../i18n/format.ts';
import { type Palette, usePalette } from '../theme/palette.ts';
import css from './sources.module.css';
import { type Curve, lineCurve, timeCurve } from './waveform-curve.ts';

Chart.register(ScatterController, PointElement, LineElement, LinearScale, LogarithmicScale);

/** The waveform in time and as spectrum, following every change. */
export function WaveformPlot({ waveform }: { readonly waveform: Waveform }): ReactElement {
  const palette = usePalette();
  const time = useMemo(() => timeCurve(waveform), [waveform]);
  const lines = useMemo(() => lineCurve(waveform), [waveform]);
  const unit = waveform.quantity;
  return (
    <div className={css.plots}>
      <Plot
        label={`${waveform.name} over time`}
        curve={time}
        palette={palette}
        isLog={false}
        xText={(value) => quantityText(value, 's')}
        yTitle={unit}
      />
      <Plot
        label={`Spectrum of ${waveform.name}: ${lines.length} lines`}
        curve={lines}
        palette={palette}
        isLog
        xText={frequencyText}
        yTitle={`dBµ${unit}`}
      />
    </div>
  );
}

interface PlotProps {
  readonly label: string;
  readonly curve: readonly Curve[];
  readonly palette: Palette;
  readonly isLog: boolean;
  readonly xText: (value: number) => string;
  readonly yTitle: string;
}

function Plot({ label, curve, palette, isLog, xText, yTitle }: PlotProps): ReactElement {
  const data = {
    datasets: [
      {
        data: [...curve],
        showLine: !isLog,
        borderColor: palette.color('ink'),
        borderWidth: 1.5,
        backgroundColor: palette.color('ink'),
        pointRadius: isLog ? 1.5 : 0,
      },
    ],
  };
  return (
    <div className={css.plot}>
      <Scatter data={data} options={optionsOf(palette, isLog, xText, yTitle)} role="img" aria-label={label} />
    </div>
  );
}

const MOST_LABELS = 6;

function labelledTicks(fromHz: number, toHz: number): number[] {
  const labelled = frequencyTicks(fromHz, toHz).filter(({ label }) => label !== undefined);
  const isCrowded = labelled.length > MOST_LABELS;
  return labelled
    .map(({ frequencyHz }) => frequencyHz)
    .filter((frequencyHz) => !isCrowded || Number.isInteger(Math.round(Math.log10(frequencyHz) * 1e9) / 1e9));
}

function optionsOf(
  palette: Palette,
  isLog: boolean,
  xText: (value: number) => string,
  yTitle: string,
): ChartOptions<'scatter'> {
  const text = { color: palette.color('ink-quiet'), font: { family: palette.font, size: 10 } };
  const grid = { color: palette.color('grid') };
  return {
    responsive: true,
    maintainAspectRatio: false,
    animation: false,
    events: [],
    scales: {
      x: {
        type: isLog ? 'logarithmic' : 'linear',
        bounds: 'data',
        grid,
        // Frequencies as everywhere: 1, 2, 3, 5 of a decade, or its beginning alone where there are many.
        ...(isLog && {
          afterBuildTicks: (axis: { min: number; max: number; ticks: { value: number }[] }) => {
            axis.ticks = labelledTicks(axis.min, axis.max).map((value) => ({ value }));
          },
        }),
        ticks: {
          ...text,
          maxRotation: 0,
          ...(isLog ? { autoSkipPadding: 12 } : { maxTicksLimit: 5 }),
          callback: (value) => xText(Number(value)),
        },
      },
      y: { grid, ticks: { ...text, maxTicksLimit: 6 }, title: { display: true, text: yTitle, ...text } },
    },
  };
}
