import { ChangeDetectionStrategy, Component, ElementRef, computed, inject, input } from '@angular/core';
import {
  CategoryScale,
  LineController,
  LineElement,
  LinearScale,
  PointElement,
  Tooltip,
  type ChartData,
  type ChartOptions,
} from 'chart.js';
import { BaseChartDirective, provideCharts } from 'ng2-charts';
import { ThemeChanges } from '../theme-changes';
import { styled, type ChartSeries } from './chart-series';
import { intervalWhiskers } from './interval-whiskers';
import { LineSwatch } from './line-swatch';

/**
 * Lines over weeks or shifts, drawn by Chart.js in the theme's tokens. Loaded lazily: import it in a `@defer` block.
 * Its text equivalent is `summary`, and the table that stands beside it.
 */
@Component({
  selector: 'app-line-chart',
  imports: [BaseChartDirective, LineSwatch],
  providers: [
    provideCharts({
      registerables: [CategoryScale, LineController, LineElement, LinearScale, PointElement, Tooltip],
    }),
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <figure>
      <figcaption>{{ caption() }}</figcaption>
      <div class="canvas" role="img" [attr.aria-label]="summary()">
        <canvas baseChart type="line" [data]="data()" [options]="options()" [plugins]="plugins"></canvas>
      </div>
      <ul aria-hidden="true">
        @for (line of legend(); track line.series.key) {
          <li><app-line-swatch [style]="line.style" /> {{ line.series.label }}</li>
        }
        @if (others(); as count) {
          <li><app-line-swatch [style]="otherStyle" /> {{ count }} {{ otherWord() }}</li>
        }
      </ul>
    </figure>
  `,
  styles: `
    figure {
      display: grid;
      gap: var(--gap-1);
      min-width: 0;
    }
    figcaption {
      font-weight: 600;
    }
    .canvas {
      position: relative;
      height: var(--chart-height, 280px);
      min-width: 0;
    }
    ul {
      display: flex;
      flex-wrap: wrap;
      gap: 4px 20px;
      padding: 0;
      list-style: none;
      font-size: 0.9375rem;
    }
    li {
      display: inline-flex;
      align-items: center;
      gap: 8px;
    }
  `,
})
export class LineChart {
  readonly caption = input.required<string>();
  /** A label of several lines is a list. */
  readonly labels = input.required<readonly (string | string[])[]>();
  readonly series = input.required<readonly ChartSeries[]>();
  readonly summary = input.required<string>();
  readonly format = input<(value: number) => string>(String);
  readonly fromZero = input(false);
  /** What the faint lines are: "other looms". */
  readonly otherWord = input('others');

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  private readonly theme = inject(ThemeChanges);

  private readonly lines = computed(() => styled(this.series()));
  /** The first lies on top. */
  private readonly drawn = computed(() =>
    [...this.lines()].sort((a, b) => DEPTH[a.series.role] - DEPTH[b.series.role]),
  );
  protected readonly legend = computed(() => this.lines().filter(({ series }) => series.role !== 'other'));
  protected readonly others = computed(
    () => this.lines().filter(({ series }) => series.role === 'other').length,
  );
  protected readonly otherStyle = styled([{ key: '', label: '', values: [], role: 'other' }])[0].style;
  protected readonly plugins = [
    intervalWhiskers((index) => {
      const one = this.drawn()[index]?.series;
      return one?.low && one.high && one.role !== 'other' ? { low: one.low, high: one.high } : null;
    }),
  ];

  protected readonly data = computed((): ChartData<'line', (number | null)[], string | string[]> => {
    const colour = this.colours();
    return {
      labels: [...this.labels()],
      datasets: this.drawn().map(({ series, style }) => ({
        label: series.label,
        data: [...series.values],
        borderColor: colour(style.token),
        backgroundColor: colour(style.token),
        borderWidth: style.width,
        borderDash: [...style.dash],
        pointStyle: style.marker,
        pointRadius: style.marker ? 4 : 0,
        pointHoverRadius: style.marker ? 6 : 0,
        pointHitRadius: style.marker ? 12 : 0,
        tension: 0,
        spanGaps: false,
      })),
    };
  });

  protected readonly options = computed((): ChartOptions<'line'> => {
    const colour = this.colours();
    const limits = this.drawn()
      .filter(({ series }) => series.role !== 'other')
      .flatMap(({ series }) => [...(series.low ?? []), ...(series.high ?? [])])
      .filter((value) => value !== null);
    const font = { family: getComputedStyle(this.host).fontFamily, size: 14 };
    return {
      animation: false,
      responsive: true,
      maintainAspectRatio: false,
      interaction: { mode: 'index', intersect: false },
      scales: {
        x: {
          grid: { display: false },
          border: { color: colour('--line-strong') },
          ticks: { color: colour('--ink-2'), font },
        },
        y: {
          beginAtZero: this.fromZero(),
          ...(limits.length > 0 && { suggestedMin: Math.min(...limits), suggestedMax: Math.max(...limits) }),
          grid: { color: colour('--line') },
          border: { display: false },
          ticks: {
            color: colour('--ink-2'),
            font,
            maxTicksLimit: 6,
            callback: (value) => this.format()(Number(value)),
          },
        },
      },
      plugins: {
        tooltip: {
          backgroundColor: colour('--ink'),
          titleColor: colour('--on-ink'),
          bodyColor: colour('--on-ink'),
          titleFont: font,
          bodyFont: font,
          padding: 10,
          usePointStyle: true,
          filter: (item) => this.drawn()[item.datasetIndex]?.series.role !== 'other',
          callbacks: { label: (item) => this.pointWords(item.datasetIndex, item.dataIndex) },
        },
      },
    };
  });

  private pointWords(datasetIndex: number, at: number): string {
    const series = this.drawn()[datasetIndex]?.series;
    const value = series?.values[at];
    if (!series || value == null) return '';
    const [low, high] = [series.low?.[at], series.high?.[at]];
    const format = this.format();
    const interval = low == null || high == null ? '' : ` (${format(low)}–${format(high)})`;
    return `${series.label}: ${format(value)}${interval}`;
  }

  /** The theme's tokens as this moment has them: a canvas cannot read them for itself. */
  private colours(): (token: string) => string {
    this.theme.version();
    const style = getComputedStyle(this.host);
    return (token) => style.getPropertyValue(token).trim();
  }
}

const DEPTH: Readonly<Record<ChartSeries['role'], number>> = { other: 2, marked: 1, main: 0 };
