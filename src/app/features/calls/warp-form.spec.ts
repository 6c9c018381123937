import { metresTyped, saidIn, UNLISTED, wantingIn, warpForm } from './warp-form';

const filled = (over: Partial<ReturnType<ReturnType<typeof warpForm>['getRawValue']>> = {}) => {
  const form = warpForm();
  form.patchValue({ how: 'gaiting', beam: 'beam-7', clothId: 'calico', ...over });
  return form;
};

describe('a change of warp', () => {
  it.each([
    ['480', 480],
    ['480,5', 480.5],
    ['1.25 m', 1.25],
    ['', null],
  ])('%s is %s metres', (text, metres) => {
    expect(metresTyped(text)).toBe(metres);
  });
  it.each(['4 80', '-3', '1,234,5', 'long', '1.234'])('%s is none', (text) => {
    expect(metresTyped(text)).toBeNaN();
  });

  it('says what the ticket says, and nothing that the list says already', () => {
    const form = filled({ lengthM: '480', thrumM: '1,5', sizeSet: ' S 118 ', weftLot: '' });
    expect(saidIn(form, { lengthM: 480 })).toEqual({
      how: 'gaiting',
      warpId: 'beam-7',
      clothId: 'calico',
      thrumM: 1.5,
      sizeSet: 'S 118',
    });
    expect(saidIn(form, undefined)).toMatchObject({ lengthM: 480 });
  });

  it('a beam that is not listed has no id', () => {
    expect(saidIn(filled({ beam: UNLISTED }), undefined).warpId).toBeNull();
  });

  it('says what is wanting, one thing after the other', () => {
    expect(wantingIn(warpForm(), true)).toContain('gaited or knotted');
    expect(wantingIn(filled({ beam: '' }), true)).toContain('which beam');
    expect(wantingIn(filled({ clothId: '' }), true)).toContain('which cloth');
    expect(wantingIn(filled({ lengthM: '0' }), true)).toContain('no length of a warp');
    expect(wantingIn(filled({ lengthM: 'much' }), true)).toContain('“much”');
    expect(wantingIn(filled({ thrumM: '-1' }), true)).toContain('no length of a thrum');
    expect(wantingIn(filled(), true)).toContain('whether the loom runs');
    expect(wantingIn(filled(), false)).toBe('');
    expect(wantingIn(filled({ runs: false }), true)).toBe('');
  });
});
