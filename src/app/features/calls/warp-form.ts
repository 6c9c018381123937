import { FormControl, FormGroup, Validators } from '@angular/forms';
import { LIMITS } from '@shared/contract/limits';
import type { Warp } from '@shared/contract/reference';
import type { EntryOf } from '@shared/entries/entry';

/** The beam is not on the mill's list. */
export const UNLISTED = 'unlisted';

export type WarpForm = ReturnType<typeof warpForm>;

/** Numbers are kept as typed: what is none stays in the field, with a sentence. */
export function warpForm() {
  const name = () =>
    new FormControl('', { nonNullable: true, validators: Validators.maxLength(LIMITS.nameLength) });
  const metres = () => new FormControl('', { nonNullable: true });
  return new FormGroup({
    how: new FormControl<'gaiting' | 'knotting' | null>(null),
    beam: new FormControl('', { nonNullable: true }),
    clothId: new FormControl('', { nonNullable: true }),
    lengthM: metres(),
    thrumM: metres(),
    sizeSet: name(),
    weftLot: name(),
    runs: new FormControl<boolean | null>(null),
  });
}

/** Metres as typed, a point or a comma before the decimals; null: nothing typed; NaN: no such length. */
export function metresTyped(text: string): number | null {
  const said = text.trim().replace(/\s*m$/i, '');
  if (said === '') return null;
  return /^\d{1,6}([.,]\d{1,2})?$/.test(said) ? Number(said.replace(',', '.')) : NaN;
}

/** What is still wanting, as a sentence; empty: nothing. */
export function wantingIn(form: WarpForm, stands: boolean): string {
  const { how, beam, clothId, lengthM, thrumM, runs } = form.getRawValue();
  if (how === null) return 'Say whether the warp was gaited or knotted.';
  if (beam === '') return 'Say which beam went in.';
  if (clothId === '') return 'Say which cloth is woven from it.';
  const [length, thrum] = [metresTyped(lengthM), metresTyped(thrumM)];
  if (length !== null && !(length > 0 && length <= 100_000))
    return `“${lengthM}” is no length of a warp. Say metres, e.g. 480 or 480,5, or leave it empty.`;
  if (thrum !== null && !(thrum >= 0 && thrum <= 1_000))
    return `“${thrumM}” is no length of a thrum. Say metres, e.g. 1,5, or leave it empty.`;
  return stands && runs === null ? 'Say whether the loom runs.' : '';
}

/** What the form says, as the entry says it. A form that wants nothing. */
export function saidIn(
  form: WarpForm,
  listed: Pick<Warp, 'lengthM'> | undefined,
): Pick<EntryOf<'warp-change'>, 'how' | 'warpId' | 'clothId' | 'lengthM' | 'thrumM' | 'sizeSet' | 'weftLot'> {
  const { how, beam, clothId, lengthM, thrumM, sizeSet, weftLot } = form.getRawValue();
  const [length, thrum] = [metresTyped(lengthM), metresTyped(thrumM)];
  return {
    how: how ?? 'gaiting',
    warpId: beam === UNLISTED ? null : beam,
    clothId,
    ...(length !== null && length !== listed?.lengthM && { lengthM: length }),
    ...(thrum !== null && { thrumM: thrum }),
    ...(sizeSet.trim() && { sizeSet: sizeSet.trim() }),
    ...(weftLot.trim() && { weftLot: weftLot.trim() }),
  };
}
