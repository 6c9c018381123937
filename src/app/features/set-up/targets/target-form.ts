import { FormControl, FormGroup } from '@angular/forms';
import { targetFactsSchema, type TargetFacts } from '@shared/contract/set-up';
import { formatPercent, formatRate } from '@shared/figures/format';
import { field } from '../common/field';
import { plain } from '../common/quantity';

export const TARGET_LABELS = {
  efficiency: 'Loom efficiency',
  warpBreaks: 'Warp breaks',
  weftBreaks: 'Weft breaks',
} as const;

export const BREAK_RATE = plain('per 10⁵ picks');

type Num = number | null;
const facts = targetFactsSchema.shape;

/** A cloth's targets; an empty field is no target, which is an answer too. */
export function targetForm(target: TargetFacts | null) {
  return new FormGroup({
    efficiency: field<Num>(facts.efficiency, target?.efficiency ?? null),
    warpBreaks: field<Num>(facts.warpBreaks, target?.warpBreaks ?? null),
    weftBreaks: field<Num>(facts.weftBreaks, target?.weftBreaks ?? null),
    effectiveAt: new FormControl<number | null>(null),
  });
}

/** What the form says; null: something is not right yet. */
export function targetFacts(form: ReturnType<typeof targetForm>): TargetFacts | null {
  const read = targetFactsSchema.safeParse(form.getRawValue());
  return read.success && form.valid ? read.data : null;
}

/** "85.0%, at most 4.0 warp and 3.0 weft breaks per 10⁵ picks"; "no target". */
export function targetWords(target: TargetFacts): string {
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
