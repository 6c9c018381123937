import { LIMITS } from '@shared/contract/limits';

/** What is wrong with a password as it is typed, and what would be right; empty: nothing. */
export function passwordTrouble(password: string): string {
  if (password.length < LIMITS.passwordLength) {
    const missing = LIMITS.passwordLength - password.length;
    return password === ''
      ? `At least ${LIMITS.passwordLength} characters. A few words are easy to keep.`
      : `${missing} more ${missing === 1 ? 'character' : 'characters'}: at least ${LIMITS.passwordLength}.`;
  }
  const bytes = new TextEncoder().encode(password).length;
  return bytes > LIMITS.passwordBytes
    ? `Shorter, please: this is ${bytes} bytes, and ${LIMITS.passwordBytes} are read.`
    : '';
}
