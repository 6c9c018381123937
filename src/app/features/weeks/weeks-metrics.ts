import type { Figures, Rate } from '@shared/entries/loom-line';
import { formatCount, formatPercent, formatRate } from '@shared/figures/format';
import type { Figure } from '@shared/figures/no-figure';

export const METRIC_IDS = ['efficiency', 'picks-per-hour', 'warp-breaks', 'weft-breaks'] as const;
export type MetricId = (typeof METRIC_IDS)[number];

/** What Weeks can compare. */
export interface Metric {
  readonly id: MetricId;
  readonly label: string;
  /** Beneath the chart and in the table's head. */
  readonly unit: string;
  /** In a sentence, before the number: "Shed efficiency 84.1%". */
  readonly ofShed: string;
  readonly ofShedUnit: string;
  readonly figure: (figures: Figures) => Figure;
  /** The counts behind a rate, with its 95% interval; null: not a rate of counts. */
  readonly rate: ((figures: Figures) => Rate) | null;
  readonly format: (value: number) => string;
  /** A difference between two weeks: percentage points for shares. */
  readonly formatChange: (difference: number) => string;
  /** The unit of a difference, where it is not the figure's own. */
  readonly changeUnit: string;
  readonly fromZero: boolean;
}

const signed = (text: string) => (text.startsWith('−') || /^0(\.0)?$/.test(text) ? text : `+${text}`);

export const METRICS: Readonly<Record<MetricId, Metric>> = {
  efficiency: {
    id: 'efficiency',
    label: 'Efficiency',
    unit: 'loom efficiency, %',
    ofShed: 'Shed efficiency',
    ofShedUnit: '',
    figure: (figures) => figures.efficiency,
    rate: null,
    format: formatPercent,
    formatChange: (difference) => signed(formatRate(difference * 100)),
    changeUnit: 'points',
    fromZero: false,
  },
  'picks-per-hour': {
    id: 'picks-per-hour',
    label: 'Picks an hour',
    unit: 'picks an hour, each loom',
    ofShed: 'The shed’s looms wove',
    ofShedUnit: ' picks an hour each',
    figure: (figures) => figures.picksPerHour,
    rate: null,
    format: formatCount,
    formatChange: (difference) => signed(formatCount(difference)),
    changeUnit: '',
    fromZero: false,
  },
  'warp-breaks': {
    id: 'warp-breaks',
    label: 'Warp breaks',
    unit: 'warp breaks per 10⁵ picks',
    ofShed: 'The shed’s warps broke',
    ofShedUnit: ' times per 10⁵ picks',
    figure: (figures) => figures.warp.rate,
    rate: (figures) => figures.warp,
    format: formatRate,
    formatChange: (difference) => signed(formatRate(difference)),
    changeUnit: '',
    fromZero: true,
  },
  'weft-breaks': {
    id: 'weft-breaks',
    label: 'Weft breaks',
    unit: 'weft breaks per 10⁵ picks',
    ofShed: 'The shed’s wefts broke',
    ofShedUnit: ' times per 10⁵ picks',
    figure: (figures) => figures.weft.rate,
    rate: (figures) => figures.weft,
    format: formatRate,
    formatChange: (difference) => signed(formatRate(difference)),
    changeUnit: '',
    fromZero: true,
  },
};
