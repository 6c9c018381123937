import type { Role } from '@shared/contract/roles';
import type { PersonRow } from '@shared/contract/session';

export const ROLE_WORDS: Readonly<Record<Role, string>> = {
  weaver: 'Weaver',
  tackler: 'Tackler',
  foreman: 'Foreman',
  manager: 'Manager',
};

/** What each role may do, in a line. */
export const ROLE_NOTES: Readonly<Record<Role, string>> = {
  weaver: 'minds looms, logs stops, reads pick clocks',
  tackler: 'takes calls, mends looms, gaits warps',
  foreman: 'sees the shed, corrects, closes shifts',
  manager: 'sees all, sets the mill up',
};

export function rolesOf(person: Pick<PersonRow, 'roles'>): string {
  return person.roles.map((role) => ROLE_WORDS[role]).join(', ');
}

/** Sheds by name; none named is all of them. */
export function shedsOf(
  person: Pick<PersonRow, 'shedIds'>,
  sheds: readonly { readonly id: string; readonly name: string }[],
): string {
  if (person.shedIds.length === 0) return 'all';
  return person.shedIds.map((id) => sheds.find((shed) => shed.id === id)?.name ?? id).join(', ');
}

/** How somebody can sign in, in a few words. */
export function signInWords(person: PersonRow, now: number): string {
  if (person.disabledAt !== null) return 'may not sign in';
  const ways = [
    person.hasPin && person.worksNumber !== null ? 'PIN' : '',
    person.hasPassword && person.email !== null ? 'password' : '',
  ].filter(Boolean);
  if (person.linkUntil !== null && person.linkUntil > now) ways.push('link sent');
  return ways.length ? ways.join(', ') : 'no way in yet';
}
