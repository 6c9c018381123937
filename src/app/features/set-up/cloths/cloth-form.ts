import { FormArray, FormControl, FormGroup, type AbstractControl } from '@angular/forms';
import { clothFactsSchema, newClothSchema, type ClothFacts } from '@shared/contract/set-up';
import { field, says } from '../common/field';
import { nameFree } from '../common/name-taken';
import { PERCENT, textOf } from '../common/quantity';
import { COUNTS, type Count } from './cloth-quantities';

/** What the fields are called: on the form and in its sentences. */
export const CLOTH_LABELS = {
  name: 'Name',
  ends: 'Ends',
  picksPerCmOnLoom: 'Picks on the loom',
  picksPerCmLoomState: 'Picks in loom state',
  reedWidthCm: 'Reed width',
  crimp: 'Crimp',
  takeUp: 'Take-up',
  abreast: 'Cloths abreast',
} as const;
export const WEFT_LABELS = {
  name: 'Yarn',
  tex: 'Count',
  system: 'Counted in',
  share: 'Share of the picks',
  waste: 'Waste',
  pernMassG: 'Weft on a full pern',
} as const;

const facts = clothFactsSchema.shape;
const weftFacts = facts.wefts.def.element.shape;
type Num = number | null;

export type WeftForm = FormGroup<{
  name: FormControl<string>;
  tex: FormControl<Num>;
  /** How the count is shown; not stored. */
  system: FormControl<Count>;
  share: FormControl<Num>;
  waste: FormControl<Num>;
  pernMassG: FormControl<Num>;
}>;
/** "Ends" is more than one, and not every manager's word. */
const NO_ENDS = 'Say the ends: the number of warp threads, a whole number from 1 to 100,000.';
export type ClothForm = ReturnType<typeof clothForm>;

/** Percentages of shares are typed rounded: three thirds as 33.33 are a whole. */
const SHARES_TOLERANCE = 0.0005;
const MOST_WEFTS = 8;

/** A cloth's form, empty or as stored: its controls hold stored units. */
export function clothForm(
  cloth: { name: string; facts: ClothFacts } | null,
  count: Count,
  others: () => readonly string[],
) {
  const of = cloth?.facts;
  return new FormGroup({
    name: field(newClothSchema.shape.name, cloth?.name ?? '', [nameFree(others)]),
    ends: field<Num>(facts.ends, of?.ends ?? null, [
      says<Num>((ends) => (facts.ends.safeParse(ends).success ? '' : NO_ENDS)),
    ]),
    picksPerCmOnLoom: field<Num>(facts.picksPerCmOnLoom, of?.picksPerCmOnLoom ?? null),
    picksPerCmLoomState: field<Num>(facts.picksPerCmLoomState, of?.picksPerCmLoomState ?? null),
    reedWidthCm: field<Num>(facts.reedWidthCm, of?.reedWidthCm ?? null),
    crimp: field<Num>(facts.crimp, of?.crimp ?? null),
    abreast: field<Num>(facts.abreast, of?.abreast ?? 1),
    wefts: new FormArray<WeftForm>(
      of ? of.wefts.map((weft) => weftForm(weft, count)) : [weftForm(null, count)],
      [says<unknown>((_, wefts) => weftsProblem(wefts))],
    ),
    retired: new FormControl(false, { nonNullable: true }),
    effectiveAt: new FormControl<number | null>(null),
  });
}

/** One weft; a new one takes what is left of the picks. */
export function weftForm(weft: ClothFacts['wefts'][number] | null, count: Count, share: Num = 1): WeftForm {
  return new FormGroup({
    name: field(weftFacts.name, weft?.name ?? '', [
      says<string>((name, control) => weftNameProblem(name, control)),
    ]),
    tex: field<Num>(weftFacts.tex, weft?.tex ?? null, [
      says<Num>((tex, control) => countProblem(tex, control)),
    ]),
    system: new FormControl<Count>(count, { nonNullable: true }),
    share: field<Num>(weftFacts.share, weft?.share ?? share),
    waste: field<Num>(weftFacts.waste, weft?.waste ?? null),
    pernMassG: field<Num>(weftFacts.pernMassG, weft?.pernMassG ?? null),
  });
}

/** What the form says, in stored units. Null: something is not right yet. */
export function clothFacts(form: ClothForm): ClothFacts | null {
  const read = clothFactsSchema.safeParse(form.getRawValue());
  return read.success && form.controls.wefts.errors === null ? read.data : null;
}

/** What is left to a whole, for the next weft; null: nothing. */
export function shareLeft(wefts: FormArray<WeftForm>): Num {
  const left = 1 - sharesOf(wefts).reduce((sum, share) => sum + share, 0);
  return left > SHARES_TOLERANCE ? Number(left.toFixed(6)) : null;
}

/** Not wrong, but worth a second look; empty: nothing. */
export function clothAdvice(form: ClothForm): string {
  const { picksPerCmOnLoom: onLoom, picksPerCmLoomState: loomState } = form.getRawValue();
  return onLoom !== null && loomState !== null && loomState < onLoom
    ? 'Off the loom cloth draws together: loom state has usually more picks than on the loom, not fewer.'
    : '';
}

function weftsProblem(control: AbstractControl): string {
  const wefts = control as FormArray<WeftForm>;
  if (wefts.length === 0) return 'A cloth has at least one weft.';
  if (wefts.length > MOST_WEFTS) return `A cloth has at most ${MOST_WEFTS} wefts.`;
  const shares = sharesOf(wefts);
  if (shares.length < wefts.length) return '';
  const sum = shares.reduce((all, share) => all + share, 0);
  if (Math.abs(sum - 1) <= SHARES_TOLERANCE) return '';
  const off = textOf(Math.abs(1 - sum), PERCENT);
  return `The shares add up to ${textOf(sum, PERCENT)}%, not 100%: ${off}% ${sum > 1 ? 'too much' : 'is missing'}.`;
}

function sharesOf(wefts: FormArray<WeftForm>): number[] {
  return wefts.controls.flatMap((weft) => weft.controls.share.value ?? []);
}

function weftNameProblem(name: string, control: AbstractControl): string {
  const wefts = control.parent?.parent?.controls;
  const others = Array.isArray(wefts) ? wefts.filter((weft) => weft !== control.parent) : [];
  const taken = others.some((weft) => {
    const other: unknown = weft.get('name')?.value;
    return typeof other === 'string' && other.trim().toLowerCase() === name.trim().toLowerCase();
  });
  return taken && name.trim() !== '' ? `Two wefts are called ${name.trim()}. Tell them apart.` : '';
}

/** An indirect count is higher the finer the yarn: what is most in tex is least in it. */
function countProblem(tex: Num, control: AbstractControl): string {
  const system = (control.parent?.get('system')?.value ?? 'tex') as Count;
  if (system === 'tex' || tex === null || weftFacts.tex.safeParse(tex).success) return '';
  const least = COUNTS[system].shown(20_000);
  return `${WEFT_LABELS.tex} is at least ${typeof least === 'number' ? least.toFixed(3) : '0'} ${COUNTS[system].unit}.`;
}
