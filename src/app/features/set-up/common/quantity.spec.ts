import { millFormSchema, loomFactsSchema, loomPlaceSchema } from '@shared/contract/set-up';
import { FormControl, FormGroup } from '@angular/forms';
import { field, problemOfField } from './field';
import { markFields } from './form-saver';
import { momentOf } from './moments';
import { PERCENT, QUANTITIES, numberProblem, plain, readNumber, readQuantity, textOf } from './quantity';

describe('a typed number', () => {
  it.each([
    ['1250', 1250],
    ['1 250', 1250],
    ['1,250.5', 1250.5],
    ['1,250,000', 1_250_000],
    ['22,5', 22.5],
    ['0,125', 0.125],
    [',5', 0.5],
    ['.5', 0.5],
    ['3.', 3],
  ])('%s is %d', (text, value) => expect(readNumber(text)).toBe(value));

  it.each(['1,250', '', 'many', '1.2.3', '-4', '1,2,3', '12e3'])('“%s” is no number', (text) =>
    expect(readNumber(text)).toBeNull(),
  );

  it('says what could be meant where a comma could be either', () => {
    expect(numberProblem('1,250')).toBe('“1,250” could be 1250 or 1.250: type one of them.');
    expect(numberProblem('0,125')).toBe('');
    expect(numberProblem('-4')).toContain('without a minus');
  });
});

describe('a stored value in a form', () => {
  it('stays the very one while its text is left alone, in either units', () => {
    const stored = 181.123456789;
    for (const units of ['metric', 'imperial'] as const) {
      const text = textOf(stored, QUANTITIES.width[units]);
      expect(readQuantity(text, QUANTITIES.width[units], stored)).toBe(stored);
    }
    expect(textOf(stored, QUANTITIES.width.imperial)).toBe('71.308');
  });

  it('is read in the units it is shown in', () => {
    expect(readQuantity('100', QUANTITIES.width.imperial)).toBe(254);
    expect(readQuantity('12,5', PERCENT)).toBe(0.125);
  });
});

describe('what is wrong with a field', () => {
  it.each([
    [field(loomFactsSchema.shape.ppm, 0), 'Speed', 'Speed is more than 0 and at most 2,000 picks a minute.'],
    [
      field(loomFactsSchema.shape.ppm, null),
      'Speed',
      'Speed is missing. Speed is more than 0 and at most 2,000 picks a minute.',
    ],
    [
      field(loomPlaceSchema.shape.number, 1.5),
      'Number',
      'Number is a whole number between 1 and 99,999 picks a minute.',
    ],
    [field(millFormSchema.shape.name, ' '), 'Name', 'Name is missing.'],
    [field(millFormSchema.shape.name, 'x'.repeat(81)), 'Name', 'Name has 1 to 80 characters.'],
  ])('%#', (control, label, sentence) =>
    expect(problemOfField(control, label, plain('picks a minute'))).toBe(sentence),
  );

  it('gives limits in the units that are shown', () => {
    const control = field(loomFactsSchema.shape.reedSpaceCm, 2_000);
    expect(problemOfField(control, 'Reed space', QUANTITIES.width.imperial)).toBe(
      'Reed space is more than 0 and at most 393.701 in.',
    );
  });

  it('takes the server’s sentences to their fields, and says when one has none', () => {
    const form = new FormGroup({
      name: new FormControl('a'),
      clock: new FormGroup({ unit: new FormControl(1) }),
    });
    const problem = (path: string) => ({
      type: '',
      title: '',
      status: 400,
      code: 'bad-request' as const,
      fields: [{ path, message: 'No.' }],
    });
    expect(markFields(form, problem('facts.clock.unit'), { under: 'facts' })).toEqual([]);
    expect(form.controls.clock.controls.unit.errors).toEqual({ server: 'No.' });
    expect(markFields(form, problem('name'))).toEqual([]);
    expect(markFields(form, problem('elsewhere'))).toEqual(['No.']);
  });
});

describe('a moment by the mill’s clock', () => {
  const london = 'Europe/London';
  it.each([
    ['2026-01-05', '06:00', '2026-01-05T06:00Z'],
    ['2026-07-05', '6:00', '2026-07-05T05:00Z'],
    ['2026-10-25', '01:30', '2026-10-25T00:30Z'],
    ['2026-03-29', '03:00', '2026-03-29T02:00Z'],
  ])('%s %s', (date, time, moment) => expect(momentOf(date, time, london)).toBe(Date.parse(moment)));

  it.each([
    ['2026-03-29', '01:30'],
    ['2026-02-30', '06:00'],
    ['2026-01-05', '6'],
    ['', '06:00'],
  ])('%s %s is none', (date, time) => expect(momentOf(date, time, london)).toBeNull());
});
