/** A line of a chart. */
export interface ChartSeries {
  readonly key: string;
  readonly label: string;
  /** One a label; null: no figure, the line has a gap. */
  readonly values: readonly (number | null)[];
  /** Limits of an interval about each value. */
  readonly low?: readonly (number | null)[];
  readonly high?: readonly (number | null)[];
  /** `main` is drawn bold; each `marked` one has a style of its own; `other` ones are a faint ground. */
  readonly role: 'main' | 'marked' | 'other';
}

export interface LineStyle {
  readonly token: string;
  readonly width: number;
  readonly dash: readonly number[];
  readonly marker: 'circle' | 'triangle' | 'rect' | 'rectRot' | false;
}

const MARKED: readonly LineStyle[] = [
  { token: '--flax', width: 2, dash: [], marker: 'triangle' },
  { token: '--weld', width: 2, dash: [7, 4], marker: 'rect' },
  { token: '--woad', width: 2, dash: [2, 3], marker: 'rectRot' },
  { token: '--ink-2', width: 2, dash: [10, 3, 2, 3], marker: 'circle' },
];
const MAIN: LineStyle = { token: '--ink', width: 3.5, dash: [], marker: 'circle' };
const OTHER: LineStyle = { token: '--line', width: 1.5, dash: [], marker: false };

/** The style of a marked line by its place among the marked: dash and marker tell lines apart without colour. */
export function markedStyle(place: number): LineStyle {
  return MARKED[place % MARKED.length] ?? OTHER;
}

/** Each series with its style. */
export function styled(
  series: readonly ChartSeries[],
): readonly { readonly series: ChartSeries; readonly style: LineStyle }[] {
  let place = 0;
  return series.map((one) => {
    if (one.role === 'main') return { series: one, style: MAIN };
    if (one.role === 'other') return { series: one, style: OTHER };
    return { series: one, style: markedStyle(place++) };
  });
}
