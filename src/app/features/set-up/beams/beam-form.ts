import { FormControl, FormGroup, type AbstractControl } from '@angular/forms';
import { beamFormSchema, type BeamForm } from '@shared/contract/set-up';
import { field, says } from '../common/field';
import { nameFree } from '../common/name-taken';

export const BEAM_LABELS = {
  name: 'Beam',
  clothId: 'Cloth',
  lengthM: 'Warp on it',
  thrumM: 'Thrum',
} as const;

type Num = number | null;
const facts = beamFormSchema.shape;

/** What cannot be woven at a warp's end, common practice, m. */
const USUAL_THRUM = 1.5;

/** A beam's form, empty or as stored: its controls hold metres. */
export function beamForm(beam: BeamForm | null, others: () => readonly string[]) {
  return new FormGroup({
    name: field(facts.name, beam?.name ?? '', [nameFree(others)]),
    clothId: new FormControl(beam?.clothId ?? '', {
      nonNullable: true,
      validators: [says<string>((id) => (id ? '' : 'Choose the cloth that this warp is for.'))],
    }),
    lengthM: field<Num>(facts.lengthM, beam?.lengthM ?? null),
    thrumM: field<Num>(facts.thrumM, beam ? beam.thrumM : USUAL_THRUM, [
      says<Num>((thrum, control) => thrumProblem(thrum, control)),
    ]),
  });
}

/** What the form says; null: something is not right yet. */
export function beamOf(form: ReturnType<typeof beamForm>): BeamForm | null {
  const read = beamFormSchema.safeParse(form.getRawValue());
  return read.success && form.valid ? read.data : null;
}

function thrumProblem(thrum: Num, control: AbstractControl): string {
  const length: unknown = control.parent?.get('lengthM')?.value;
  return thrum !== null && typeof length === 'number' && thrum >= length
    ? 'The thrum is what is left over at the end: less than the whole warp.'
    : '';
}
