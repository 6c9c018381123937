import { addDays, isDate, mondayOf } from '../../core/dates';
import type { WeeksQuery } from '../../core/reports-client';
import { METRIC_IDS, type MetricId } from './weeks-metrics';

export const RUNS = [4, 8, 12] as const;
export type Run = (typeof RUNS)[number];

/** What the address says of the page, as text; all of it may be missing or typed by hand. */
export interface WeeksParams {
  readonly metric?: string | undefined;
  readonly by?: string | undefined;
  readonly weeks?: string | undefined;
  /** A day of the last week shown. */
  readonly to?: string | undefined;
  /** Keys of the marked rows, by commas. */
  readonly mark?: string | undefined;
  /** `label`, `cloth`, `change`, or a week's Monday. */
  readonly sort?: string | undefined;
  readonly dir?: string | undefined;
}

/** The page's view: what is compared, over which weeks, in which order. */
export interface WeeksView {
  readonly metric: MetricId;
  readonly by: 'loom' | 'row';
  readonly run: Run;
  /** First and last Monday, inclusive. */
  readonly from: string;
  readonly to: string;
  /** Null: nobody chose, the page marks for itself. */
  readonly marked: readonly string[] | null;
  readonly sort: string;
  readonly descending: boolean;
}

/** More lines than this cannot be told apart. */
export const MOST_MARKED = 4;

/** Reads the address. Whatever it does not say, or says wrongly, is as it is at first. */
export function weeksViewOf(params: WeeksParams, today: string): WeeksView {
  const run = RUNS.find((weeks) => String(weeks) === params.weeks) ?? 8;
  const thisWeek = mondayOf(today);
  const asked = params.to && isDate(params.to) ? mondayOf(params.to) : thisWeek;
  const to = asked > thisWeek ? thisWeek : asked;
  return {
    metric: METRIC_IDS.find((metric) => metric === params.metric) ?? 'efficiency',
    by: params.by === 'row' ? 'row' : 'loom',
    run,
    from: addDays(to, -7 * (run - 1)),
    to,
    marked: params.mark === undefined ? null : params.mark.split(',').filter(Boolean).slice(0, MOST_MARKED),
    sort: params.sort ?? 'label',
    descending: params.dir === 'down',
  };
}

/** The question to the book; the metric and the order are the page's own. */
export function weeksQueryOf(view: WeeksView, shedId: string | null): WeeksQuery | null {
  return shedId === null ? null : { shedId, by: view.by, from: view.from, to: view.to };
}

export function sameQuery(a: WeeksQuery | null, b: WeeksQuery | null): boolean {
  return a?.shedId === b?.shedId && a?.by === b?.by && a?.from === b?.from && a?.to === b?.to;
}
