import type { LoomVersion } from '@shared/contract/reference';
import { problemOfField } from '../common/field';
import { QUANTITIES, plain } from '../common/quantity';
import { changedFacts, commonFacts, factsForm, factsOf, longestShift, newFacts } from './loom-facts';

const FACTS = {
  ppm: 200,
  reedSpaceCm: 190.5,
  clock: { kind: 'continuous', unit: 100, digits: 5 },
  shuttles: 1,
  battery: false,
} as const;
const version = (id: string, more: Partial<LoomVersion> = {}): LoomVersion => ({
  id,
  loomId: id,
  effectiveAt: 0,
  ...FACTS,
  ...more,
});

describe('bad facts of a loom', () => {
  const { ppm, reedSpaceCm, shuttles, clock } = factsForm(FACTS, false, 480).controls;
  it.each([
    [ppm, 0, 'Speed', 'Speed is more than 0 and at most 2,000 picks/min.'],
    [ppm, 2_001, 'Speed', 'Speed is more than 0 and at most 2,000 picks/min.'],
    [ppm, null, 'Speed', 'Speed is missing. Speed is more than 0 and at most 2,000 picks/min.'],
    [shuttles, 1.5, 'Shuttles', 'Shuttles is a whole number between 1 and 16 picks/min.'],
    [clock.controls.unit, 0, 'One step', 'One step is a whole number between 1 and 100,000 picks/min.'],
    [clock.controls.digits, 1, 'Digits', 'Digits is a whole number between 2 and 9 picks/min.'],
    [clock.controls.digits, 10, 'Digits', 'Digits is a whole number between 2 and 9 picks/min.'],
  ])('%#', (control, value, label, sentence) => {
    control.setValue(value);
    expect(problemOfField(control, label, plain('picks/min'))).toBe(sentence);
  });

  it('gives the reed space’s limits in inches where inches are shown', () => {
    reedSpaceCm.setValue(1_001);
    expect(problemOfField(reedSpaceCm, 'Reed space', QUANTITIES.width.imperial)).toBe(
      'Reed space is more than 0 and at most 393.701 in.',
    );
  });

  it('says when a clock comes round within the shed’s longest shift', () => {
    const form = factsForm(FACTS, false, 480);
    expect(form.valid).toBe(true);
    form.controls.clock.controls.digits.setValue(2);
    expect(form.errors?.['narrow']).toBe(
      'This clock comes round after 10,000 picks, but a shift of 8 h can have 96,000. Give it more digits or a larger unit.',
    );
  });
});

describe('facts of several looms at once', () => {
  const versions = [
    version('a'),
    version('b', { ppm: 210, clock: { kind: 'continuous', unit: 1, digits: 7 } }),
  ];

  it('leaves empty what differs, and sends only what somebody changed', () => {
    const common = commonFacts(versions);
    expect(common).toEqual({ reedSpaceCm: 190.5, shuttles: 1, battery: false });
    const form = factsForm(common, true, 480);
    expect(form.valid).toBe(true);
    expect(newFacts(changedFacts(form), common)).toEqual({});
    form.controls.ppm.setValue(220);
    form.controls.battery.setValue('yes');
    expect(newFacts(changedFacts(form), common)).toEqual({ ppm: 220, battery: true });
  });

  it('sends no half a clock', () => {
    const form = factsForm(commonFacts(versions), true, 480);
    form.controls.clock.controls.digits.setValue(6);
    expect(form.valid).toBe(false);
    expect(problemOfField(form.controls.clock.controls.unit, 'One step')).not.toBe('');
    form.controls.clock.setValue({ kind: 'continuous', unit: 100, digits: 6 });
    expect(form.valid).toBe(true);
    expect(changedFacts(form)).toMatchObject({ clock: { kind: 'continuous', unit: 100, digits: 6 } });
  });
});

it('takes a whole form’s facts as they are stored', () => {
  expect(factsOf(factsForm(FACTS, false, 480))).toEqual(FACTS);
  expect(factsOf(factsForm({}, false, 480))).toBeNull();
});

it('knows the longest shift by the clock on the wall, over midnight too', () => {
  const pattern = (startsLocal: string, endsLocal: string) => ({ shedId: 'a', startsLocal, endsLocal });
  expect(longestShift([], 'a')).toBe(480);
  expect(longestShift([pattern('06:00', '14:00'), pattern('20:00', '06:00')], 'a')).toBe(600);
  expect(longestShift([pattern('06:00', '06:00')], 'a')).toBe(1_440);
});
