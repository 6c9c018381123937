import { passwordTrouble } from './password-words';

it.each([
  ['', 'At least 10 characters. A few words are easy to keep.'],
  ['nine char', '1 more character: at least 10.'],
  ['short', '5 more characters: at least 10.'],
  ['ü'.repeat(37), 'Shorter, please: this is 74 bytes, and 72 are read.'],
  ['ten chars!', ''],
  ['€'.repeat(24), ''],
])('of the password %j says %j', (password, words) => {
  expect(passwordTrouble(password)).toBe(words);
});
