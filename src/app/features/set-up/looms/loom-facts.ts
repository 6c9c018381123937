import { FormControl, FormGroup, type AbstractControl, type ValidatorFn } from '@angular/forms';
import { loomFactsSchema, type LoomFacts } from '@shared/contract/set-up';
import type { Loom, LoomVersion } from '@shared/contract/reference';
import { inForceAt } from '@shared/contract/reference';
import { clockRange, isWideEnough } from '@shared/figures/pick-clock';
import { fits, says } from '../common/field';

type Kind = LoomFacts['clock']['kind'];

export const CLOCK_KIND_WORDS: Readonly<Record<Kind, string>> = {
  continuous: 'Runs on and rolls over',
  'zeroed-each-shift': 'Set to nought each shift',
  'register-a-shift': 'A register for each shift',
};

export type FactsForm = FormGroup<{
  ppm: FormControl<number | null>;
  reedSpaceCm: FormControl<number | null>;
  clock: FormGroup<{
    kind: FormControl<Kind | ''>;
    unit: FormControl<number | null>;
    digits: FormControl<number | null>;
  }>;
  shuttles: FormControl<number | null>;
  /** Yes or no; empty: the looms differ, and stay as they are. */
  battery: FormControl<'yes' | 'no' | ''>;
}>;

/** What looms have in common; what differs between them is not there. */
export function commonFacts(versions: readonly LoomVersion[]): Partial<LoomFacts> {
  const [first] = versions;
  if (!first) return {};
  const all = (same: (one: LoomVersion) => boolean) => versions.every(same);
  return {
    ...(all((one) => one.ppm === first.ppm) && { ppm: first.ppm }),
    ...(all((one) => one.reedSpaceCm === first.reedSpaceCm) && { reedSpaceCm: first.reedSpaceCm }),
    ...(all((one) => sameClock(one.clock, first.clock)) && { clock: first.clock }),
    ...(all((one) => one.shuttles === first.shuttles) && { shuttles: first.shuttles }),
    ...(all((one) => one.battery === first.battery) && { battery: first.battery }),
  };
}

/** The facts in force of each of some looms. */
export function versionsInForce(
  looms: readonly Loom[],
  versions: readonly LoomVersion[],
  at: number,
): readonly LoomVersion[] {
  return looms.flatMap((loom) => {
    const own = versions.filter((one) => one.loomId === loom.id);
    const first = own.reduce<LoomVersion | null>(
      (best, one) => (best && best.effectiveAt <= one.effectiveAt ? best : one),
      null,
    );
    const now = inForceAt(own, at) ?? first;
    return now ? [now] : [];
  });
}

const sameClock = (a: LoomFacts['clock'], b: LoomFacts['clock']) =>
  a.kind === b.kind && a.unit === b.unit && a.digits === b.digits;

/**
 * A form of a loom's facts. `partial`: for several looms at once, where what is left empty stays as it was.
 *
 * @param shiftMinutes the shed's longest shift: the clock must not come round within one
 */
export function factsForm(initial: Partial<LoomFacts>, partial: boolean, shiftMinutes: number): FactsForm {
  const { ppm, reedSpaceCm, clock, shuttles } = loomFactsSchema.shape;
  const maybe = (judge: ValidatorFn): ValidatorFn =>
    partial ? (control) => (control.value === null || control.value === '' ? null : judge(control)) : judge;
  const number = (schema: Parameters<typeof fits>[0], value: number | undefined) =>
    new FormControl<number | null>(value ?? null, maybe(fits(schema)));
  const choice = <T extends string>(schema: Parameters<typeof fits>[0], value: T) =>
    new FormControl<T>(value, { nonNullable: true, validators: maybe(fits(schema)) });
  const given = initial.battery === undefined ? '' : initial.battery ? 'yes' : 'no';
  const form: FactsForm = new FormGroup({
    ppm: number(ppm, initial.ppm),
    reedSpaceCm: number(reedSpaceCm, initial.reedSpaceCm),
    clock: new FormGroup({
      kind: choice<Kind | ''>(clock.shape.kind, initial.clock?.kind ?? ''),
      unit: number(clock.shape.unit, initial.clock?.unit),
      digits: number(clock.shape.digits, initial.clock?.digits),
    }),
    shuttles: number(shuttles, initial.shuttles),
    battery: new FormControl<'yes' | 'no' | ''>(given, {
      nonNullable: true,
      validators: partial ? [] : says<string>((value) => (value ? '' : 'Say whether it has a battery.')),
    }),
  });
  const parts: readonly AbstractControl[] = Object.values(form.controls.clock.controls);
  const isEmpty = (value: unknown) => value === null || value === '';
  // Looms whose clocks differ may keep them; a clock that is said is said whole.
  if (partial)
    for (const part of parts)
      part.addValidators(({ value }) =>
        isEmpty(value) && parts.some((other) => !isEmpty(other.value))
          ? { says: 'Say the whole clock: its kind, its step and its digits.' }
          : null,
      );
  for (const part of parts)
    part.valueChanges.subscribe(() => {
      for (const other of parts) if (other !== part) other.updateValueAndValidity({ emitEvent: false });
    });
  form.addValidators(() => {
    const words = narrowWords(form, shiftMinutes);
    return words ? { narrow: words } : null;
  });
  form.updateValueAndValidity();
  return form;
}

/** Why the clock as typed is too narrow for the shed's shifts; empty: it is not, or is not typed yet. */
function narrowWords(form: FactsForm, minutes: number): string {
  const { ppm } = form.getRawValue();
  const { unit, digits } = form.controls.clock.getRawValue();
  if (ppm === null || unit === null || digits === null || !form.controls.clock.valid) return '';
  if (isWideEnough({ unit, digits }, ppm, minutes)) return '';
  const [range, possible] = [clockRange({ digits }) * unit, Math.round(ppm * minutes)].map((one) =>
    one.toLocaleString('en-GB'),
  );
  return `This clock comes round after ${range} picks, but a shift of ${Number((minutes / 60).toFixed(2))} h can have ${possible}. Give it more digits or a larger unit.`;
}

/** What the form says, whole; call it only where it is valid and not partial. */
export function factsOf(form: FactsForm): LoomFacts | null {
  const said = changedFacts(form);
  const whole = loomFactsSchema.safeParse(said);
  return whole.success ? whole.data : null;
}

/** The facts that the form says: of a partial one, only what is not left empty. */
export function changedFacts(form: FactsForm): Partial<LoomFacts> {
  const { ppm, reedSpaceCm, clock, shuttles, battery } = form.getRawValue();
  return {
    ...(ppm !== null && { ppm }),
    ...(reedSpaceCm !== null && { reedSpaceCm }),
    ...(clock.kind !== '' &&
      clock.unit !== null &&
      clock.digits !== null && { clock: { kind: clock.kind, unit: clock.unit, digits: clock.digits } }),
    ...(shuttles !== null && { shuttles }),
    ...(battery !== '' && { battery: battery === 'yes' }),
  };
}

/** Of what a form says, what is not so already. */
export function newFacts(said: Partial<LoomFacts>, common: Partial<LoomFacts>): Partial<LoomFacts> {
  const different = Object.entries(said).filter(
    ([key, value]) => JSON.stringify(value) !== JSON.stringify(pick(common, key)),
  );
  return Object.fromEntries(different) as Partial<LoomFacts>;
}

/** By the order of our own fields: a stored clock may name its fields in another. */
function pick(common: Partial<LoomFacts>, key: string): unknown {
  if (key !== 'clock' || !common.clock) return common[key as keyof LoomFacts];
  const { kind, unit, digits } = common.clock;
  return { kind, unit, digits };
}

/** Minutes of a shed's longest pattern by the clock on the wall; eight hours while it has none. */
export function longestShift(
  patterns: readonly { shedId: string; startsLocal: string; endsLocal: string }[],
  shedId: string,
): number {
  const minutes = (time: string) => Number(time.slice(0, 2)) * 60 + Number(time.slice(3, 5));
  const lengths = patterns
    .filter((one) => one.shedId === shedId)
    .map((one) => (minutes(one.endsLocal) - minutes(one.startsLocal) + 1_440) % 1_440 || 1_440);
  return lengths.length ? Math.max(...lengths) : 480;
}
