import { OTHER_PART, repairForm, saidIn, wantingIn } from './repair-form';

const names: Record<string, string> = { band: 'Picking band' };
const filled = (over: Partial<ReturnType<ReturnType<typeof repairForm>['getRawValue']>> = {}) => {
  const form = repairForm();
  form.patchValue({ cause: 'picking', found: ' Weak ', ran: 'well', ...over });
  return form;
};
const said = (over: Parameters<typeof filled>[0] = {}) => saidIn(filled(over), (id) => names[id]);

describe('what is said of a repair', () => {
  it('is trimmed, and says nothing where nothing was said', () => {
    expect(said()).toEqual({ cause: 'picking', found: 'Weak', ran: 'well' });
  });

  it('names the part of the list with its name, another in words', () => {
    expect(said({ partId: 'band' })).toMatchObject({ partId: 'band', part: 'Picking band' });
    expect(said({ partId: OTHER_PART, part: ' Bolt ' })).toMatchObject({ part: 'Bolt' });
    expect(said({ partId: OTHER_PART, part: ' Bolt ' })).not.toHaveProperty('partId');
    // Words that were typed and then not chosen are not said.
    expect(said({ partId: '', part: 'Bolt' })).not.toHaveProperty('part');
  });

  it('a near miss is said only where there was one', () => {
    expect(said({ nearMiss: 'To the wall' })).not.toHaveProperty('nearMiss');
    expect(said({ flew: true, nearMiss: 'To the wall' })).toMatchObject({ nearMiss: 'To the wall' });
  });

  it('says what is wanting, one thing after the other', () => {
    expect(wantingIn(repairForm())).toBe('Say what kind of fault it was.');
    expect(wantingIn(filled({ found: ' ' }))).toBe('Say in a few words what you found, or what you did.');
    expect(wantingIn(filled({ ran: null }))).toBe('Say how the loom ran afterwards.');
    expect(wantingIn(filled({ flew: true }))).toBe('Say in a few words what nearly happened.');
    expect(filled({ flew: true }).valid).toBe(false);
    expect(wantingIn(filled({ found: '', done: 'Greased' }))).toBe('');
    expect(filled().valid).toBe(true);
  });
});
