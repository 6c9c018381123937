import type { BeamForm } from '@shared/contract/set-up';
import { beamValuesOf, readBeam, type BeamValues } from './beam-form';

const BEAM: BeamForm = { name: 'B 118', clothId: 'sorrel', lengthM: 799.9999, thrumM: 1.3716 / 3 };
const values: BeamValues = { name: 'B 118', clothId: 'sorrel', length: '800', thrum: '1.5' };

it.each(['metric', 'imperial'] as const)('stores what it opened with, to the bit, in %s', (units) => {
  expect(readBeam(beamValuesOf(BEAM, units), units, BEAM).beam).toEqual(BEAM);
});

it('reads yards', () => {
  expect(readBeam({ ...values, length: '1,000', thrum: '2' }, 'imperial').beam).toMatchObject({
    lengthM: 914.4,
    thrumM: 1.8288,
  });
});

it.each<[keyof BeamValues, Partial<BeamValues>, string]>([
  ['name', { name: '' }, 'Give the beam a name.'],
  ['name', { name: 'b 117' }, 'There is one called b 117 already. Choose another name.'],
  ['clothId', { clothId: '' }, 'Choose the cloth that this warp is for.'],
  ['length', { length: '' }, 'Type the length of the warp, such as 800 m.'],
  ['length', { length: '0' }, 'The length of the warp is more than 0 and at most 100,000 m.'],
  ['length', { length: 'long' }, '“long” is no number. Type the length of the warp, such as 800 m.'],
  ['thrum', { thrum: '1001' }, 'The thrum is at least 0 and at most 1,000 m.'],
  ['thrum', { thrum: '800' }, 'The thrum is what is left over at the end: less than the whole warp.'],
  ['thrum', { thrum: '1,5' }, 'Type the decimals after a point: 1.5.'],
])('%s: %j', (field, change, sentence) => {
  const reading = readBeam({ ...values, ...change }, 'metric', null, ['B 117']);
  expect(reading.problems).toEqual({ [field]: sentence });
  expect(reading.beam).toBeNull();
});
