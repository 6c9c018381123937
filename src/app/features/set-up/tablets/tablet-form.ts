import { FormControl, FormGroup } from '@angular/forms';
import { newTabletCodeSchema } from '@shared/contract/one-time';
import { field, says } from '../common/field';
import { nameFree } from '../common/name-taken';

export const TABLET_LABELS = { name: 'Name of the tablet', shedId: 'Shed' } as const;

/** A tablet to be: a name by which it is found again, and its shed. `names`: of the tablets in use. */
export function tabletForm(shedId: string, names: () => readonly string[]) {
  return new FormGroup({
    name: field(newTabletCodeSchema.shape.name, '', [nameFree(names)]),
    shedId: new FormControl(shedId, {
      nonNullable: true,
      validators: [says<string>((id) => (id ? '' : 'Choose the shed whose looms it logs for.'))],
    }),
  });
}

/** A tablet's other name. */
export function renameForm(name: string, others: () => readonly string[]) {
  return new FormGroup({ name: field(newTabletCodeSchema.shape.name, name, [nameFree(others)]) });
}
