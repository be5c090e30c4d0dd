import {
  CategoryScale,
  Chart,
  type ChartData,
  type ChartOptions,
  LinearScale,
  LineController,
  LineElement,
  type Plugin,
  PointElement,
  Tooltip,
} from 'chart.js';
import { type ReactElement, useMemo } from 'react';
import { Line } from 'react-chartjs-2';
import type { TrendBand, TrendGroup } from '../../app/compare/types.ts';
import { standingOfMargin } from '../../app/report/verdict.ts';
import { drawMark } from '../components/marks/draw-mark.ts';
import { frequencyText, marginText } from '../i18n/format.ts';
import { prefersReducedMotion } from '../theme/motion.ts';
import { type ColorName, type Palette, usePalette } from '../theme/palette.ts';
import css from './ledger.module.css';

Chart.register(LineController, LineElement, PointElement, CategoryScale, LinearScale, Tooltip);

const BAND_COLORS: readonly ColorName[] = ['category-1', 'category-3', 'category-4', 'category-5', 'category-7'];
/** Told apart without colour, too. */
const BAND_DASHES = [[], [6, 3], [2, 3], [8, 3, 2, 3], [1, 2]];

const bandName = ({ detector, fromHz, toHz }: TrendBand): string =>
  `${detector}, ${frequencyText(fromHz)} to ${frequencyText(toHz)}`;

/** Margin over revisions: the worst of all as marks on a strong line, the bands as thin ones. */
export function TrendChart({ group }: { readonly group: TrendGroup }): ReactElement {
  const palette = usePalette();
  const data = useMemo(() => dataOf(group, palette), [group, palette]);
  const options = useMemo(() => optionsOf(palette), [palette]);
  const plugins = useMemo(() => [limitAndMarks(group, palette)], [group, palette]);
  return (
    <figure className={css.figure}>
      <div className={css.chart}>
        <Line
          data={data}
          options={options}
          plugins={plugins}
          role="img"
          aria-label={`Worst margin in dB from revision to revision: ${summary(group)}`}
          // Plugins are read once, when the chart is made.
          key={palette.theme + group.points.map(({ run }) => run).join(' ')}
        />
      </div>
      <figcaption className={css.legend}>
        <span>
          <i className={css.strong} />
          worst of all
        </span>
        {group.bands.map((band, i) => (
          <span key={bandName(band)}>
            <svg className={css.sample} viewBox="0 0 24 4" aria-hidden="true">
              <path
                d="M0 2H24"
                stroke={palette.color(BAND_COLORS[i % BAND_COLORS.length]!)}
                strokeDasharray={BAND_DASHES[i % BAND_DASHES.length]!.join(' ')}
              />
            </svg>
            {bandName(band)}
          </span>
        ))}
      </figcaption>
    </figure>
  );
}

const summary = ({ points }: TrendGroup): string =>
  points
    .map(({ revision, worst }) => `${revision} ${worst === null ? 'no line' : `${marginText(worst.marginDb)} dB`}`)
    .join(', ');

function dataOf({ points, bands }: TrendGroup, palette: Palette): ChartData<'line', (number | null)[]> {
  return {
    labels: points.map(({ revision }) => revision || '–'),
    datasets: [
      {
        label: 'worst of all',
        data: points.map(({ worst }) => worst?.marginDb ?? null),
        borderColor: palette.color('ink'),
        borderWidth: 2,
        pointRadius: 0,
        pointHitRadius: 12,
      },
      ...bands.map((band, i) => ({
        label: bandName(band),
        data: band.steps.map(({ worst }) => worst?.marginDb ?? null),
        borderColor: palette.color(BAND_COLORS[i % BAND_COLORS.length]!),
        borderDash: BAND_DASHES[i % BAND_DASHES.length]!,
        borderWidth: 1,
        pointRadius: 1.5,
        pointHitRadius: 8,
      })),
    ],
  };
}

function optionsOf(palette: Palette): ChartOptions<'line'> {
  const ticks = { color: palette.color('ink-quiet'), font: { family: palette.font, size: 11 } };
  return {
    responsive: true,
    maintainAspectRatio: false,
    animation: prefersReducedMotion() ? false : { duration: 160 },
    layout: { padding: 8 },
    scales: {
      x: { ticks, grid: { color: palette.color('grid') }, title: { display: true, text: 'revision', ...ticks } },
      y: {
        ticks,
        grid: { color: palette.color('grid') },
        title: { display: true, text: 'margin, dB', ...ticks },
        grace: '8%',
      },
    },
    plugins: {
      tooltip: { callbacks: { label: ({ dataset, parsed }) => `${dataset.label}: ${marginText(parsed.y ?? 0)} dB` } },
    },
  };
}

/** The limit (0 dB), the required margin as a band above it, and the standing of every revision. */
const limitAndMarks = (group: TrendGroup, palette: Palette): Plugin<'line'> => ({
  id: 'limit-and-marks',
  beforeDatasetsDraw({ ctx, chartArea, scales }) {
    const scale = scales.y!;
    const zero = scale.getPixelForValue(0);
    const required = scale.getPixelForValue(group.requiredMarginDb);
    ctx.save();
    ctx.beginPath();
    ctx.rect(chartArea.left, chartArea.top, chartArea.width, chartArea.height);
    ctx.clip();
    ctx.globalAlpha = 0.25;
    ctx.fillStyle = palette.color('short-fill');
    ctx.fillRect(chartArea.left, required, chartArea.width, zero - required);
    ctx.globalAlpha = 1;
    ctx.strokeStyle = palette.color('over');
    ctx.lineWidth = 1.5;
    ctx.strokeRect(chartArea.left, zero, chartArea.width, 0);
    ctx.fillStyle = palette.color('ink-quiet');
    ctx.font = `11px ${palette.font}`;
    ctx.fillText('limit', chartArea.left + 4, zero + 12);
    ctx.restore();
  },
  afterDatasetsDraw(chart) {
    const elements = chart.getDatasetMeta(0).data;
    for (const [i, { worst }] of group.points.entries()) {
      const element = elements[i];
      if (worst === null || element === undefined) continue;
      drawMark(chart.ctx, standingOfMargin(worst.marginDb, group.requiredMarginDb), element, palette);
    }
  },
});
