import type { Target } from '@shared/contract/reference';
import type { TargetFacts } from '@shared/contract/set-up';
import { formatPercent, formatRate } from '@shared/figures/format';
import { PERCENT, PLAIN, readWithin, textOf, type ReadValue } from '../cloths/typed';

/** A cloth's targets as typed; empty: no target. */
export interface TargetValues {
  readonly efficiency: string;
  readonly warpBreaks: string;
  readonly weftBreaks: string;
}

export interface TargetReading {
  readonly facts: TargetFacts | null;
  readonly problems: Readonly<Partial<Record<keyof TargetValues, string>>>;
}

export function targetValuesOf(facts: TargetFacts | null): TargetValues {
  const text = (value: number | null | undefined, quantity = PLAIN) =>
    value === null || value === undefined ? '' : textOf(value, quantity);
  return {
    efficiency: text(facts?.efficiency, PERCENT),
    warpBreaks: text(facts?.warpBreaks),
    weftBreaks: text(facts?.weftBreaks),
  };
}

/** What the form says; an empty field is no target, which is an answer too. */
export function readTarget(values: TargetValues, stored: TargetFacts | null = null): TargetReading {
  const problems: Partial<Record<keyof TargetValues, string>> = {};
  const take = (field: keyof TargetValues, read: () => ReadValue) => {
    if (values[field].trim() === '') return null;
    const { value, problem } = read();
    if (problem) problems[field] = `${problem} Leave it empty for no target.`;
    return value;
  };
  const breaks = (field: 'warpBreaks' | 'weftBreaks', what: string) =>
    take(field, () =>
      readWithin(values[field], BREAKS, { what, usual: 4, least: 0, most: 1_000 }, stored?.[field]),
    );
  const facts = {
    efficiency: take('efficiency', () =>
      readWithin(
        values.efficiency,
        PERCENT,
        { what: 'the loom efficiency', usual: 0.85, most: 1 },
        stored?.efficiency,
      ),
    ),
    warpBreaks: breaks('warpBreaks', 'the rate of warp breaks'),
    weftBreaks: breaks('weftBreaks', 'the rate of weft breaks'),
  };
  return { facts: Object.keys(problems).length > 0 ? null : facts, problems };
}

const BREAKS = { ...PLAIN, unit: 'per 10⁵ picks' };

/** "85.0%, at most 4.0 warp and 3.0 weft breaks per 10⁵ picks"; "no target". */
export function targetWords(target: Pick<Target, keyof TargetFacts>): string {
  const breaks = [
    ...(target.warpBreaks === null ? [] : [`${formatRate(target.warpBreaks)} warp`]),
    ...(target.weftBreaks === null ? [] : [`${formatRate(target.weftBreaks)} weft`]),
  ];
  const parts = [
    ...(target.efficiency === null ? [] : [formatPercent(target.efficiency)]),
    ...(breaks.length > 0 ? [`at most ${breaks.join(' and ')} breaks per 10⁵ picks`] : []),
  ];
  return parts.length > 0 ? parts.join(', ') : 'no target';
}
