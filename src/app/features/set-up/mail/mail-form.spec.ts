import type { MailSettings } from '@shared/contract/set-up';
import { problemOfField } from '../common/field';
import { judge } from '../common/judge-together';
import { MAIL_LABELS, mailForm, mailOf } from './mail-form';

const OFF: MailSettings = {
  host: null,
  port: 587,
  security: 'starttls',
  user: '',
  hasPassword: false,
  from: '',
  baseUrl: 'https://mill.example',
};
const ON: MailSettings = {
  ...OFF,
  host: 'smtp.mill.example',
  user: 'shedbeat',
  hasPassword: true,
  from: 'shedbeat@mill.example',
};

it('says what it opened with, and keeps the password it never saw', () => {
  const { hasPassword, baseUrl, ...told } = ON;
  expect([hasPassword, baseUrl]).toEqual([true, 'https://mill.example']);
  expect(mailOf(mailForm(ON))).toEqual(told);
});

it('may be off', () => {
  const form = mailForm(OFF);
  form.controls.will.setValue('none');
  judge(form, Object.values(form.controls));
  expect(mailOf(form)).toEqual({
    host: '',
    port: 587,
    security: 'starttls',
    user: '',
    password: '',
    from: '',
  });
});

it('says a new password, or that there is none any more', () => {
  const form = mailForm(ON);
  form.controls.will.setValue('new');
  form.controls.password.setValue('another');
  expect(mailOf(form)).toMatchObject({ password: 'another' });
  form.controls.will.setValue('none');
  form.controls.user.setValue('');
  judge(form, Object.values(form.controls));
  expect(mailOf(form)).toMatchObject({ password: '', user: '' });
});

const NAME = 'A server’s name alone, such as smtp.mill.example, without https:// and without the port.';
const SENDER = 'The e-mail address that letters come from, such as shedbeat@mill.example.';
it.each<['host' | 'port' | 'user' | 'from', unknown, string]>([
  ['host', 'https://smtp.mill.example', NAME],
  ['host', 'smtp.mill.example:587', NAME],
  ['host', 'smtp mill', NAME],
  ['host', 'shedbeat@mill.example', NAME],
  ['port', 0, 'Port is a whole number between 1 and 65,535.'],
  ['port', 65_536, 'Port is a whole number between 1 and 65,535.'],
  ['port', null, 'Port is missing. Port is a whole number between 1 and 65,535.'],
  ['user', '', 'A password goes with a user. Enter the user, or empty the password.'],
  ['from', '', SENDER],
  ['from', 'The mill', SENDER],
  ['from', 'shedbeat@mill', SENDER],
])('%s: %j', (at, value, sentence) => {
  const form = mailForm(ON);
  const control = form.controls[at];
  control.setValue(value as never);
  expect(problemOfField(control, MAIL_LABELS[at])).toBe(sentence);
  expect(mailOf(form)).toBeNull();
});

it('asks for the new password that was promised', () => {
  const form = mailForm(ON);
  form.controls.will.setValue('new');
  judge(form, [form.controls.password]);
  expect(problemOfField(form.controls.password, 'Password')).toBe('Type the new password.');
});
