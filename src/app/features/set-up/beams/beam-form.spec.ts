import type { AbstractControl } from '@angular/forms';
import type { BeamForm } from '@shared/contract/set-up';
import { problemOfField } from '../common/field';
import { QUANTITIES } from '../common/quantity';
import { BEAM_LABELS, beamForm, beamOf } from './beam-form';

const BEAM: BeamForm = { name: 'B 118', clothId: 'sorrel', lengthM: 799.9999, thrumM: 1.3716 / 3 };

it('says what it opened with, to the bit', () => {
  expect(beamOf(beamForm(BEAM, () => []))).toEqual(BEAM);
});

it.each<[keyof typeof BEAM_LABELS, unknown, string, ('metric' | 'imperial')?]>([
  ['name', '', 'Beam is missing.'],
  ['name', 'b 117', 'There is one called b 117 already. Choose another name.'],
  ['clothId', '', 'Choose the cloth that this warp is for.'],
  ['lengthM', null, 'Warp on it is missing. Warp on it is more than 0 and at most 100,000 m.'],
  ['lengthM', 0, 'Warp on it is more than 0 and at most 100,000 m.'],
  ['lengthM', 100_001, 'Warp on it is more than 0 and at most 109,361.33 yd.', 'imperial'],
  ['thrumM', 1001, 'The thrum is what is left over at the end: less than the whole warp.'],
  ['thrumM', 800, 'The thrum is what is left over at the end: less than the whole warp.'],
  ['thrumM', null, 'Thrum is missing. Thrum is between 0 and 1,000 m.'],
])('%s: %j', (at, value, sentence, units = 'metric') => {
  const form = beamForm(BEAM, () => ['B 117']);
  const control: AbstractControl | null = form.get(at);
  control?.setValue(value);
  expect(control && problemOfField(control, BEAM_LABELS[at], QUANTITIES.length[units])).toBe(sentence);
  expect(beamOf(form)).toBeNull();
});
