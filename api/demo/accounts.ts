import { demoPeople, type DemoPerson } from './people.js';

/** Who can be tried in the demo, and how; these accounts are in the demo's book alone. */
export function accountWords(secrets: { readonly pin: string; readonly password: string }): string {
  const people = demoPeople();
  const first = (role: DemoPerson['role']): DemoPerson | undefined =>
    people.find((person) => person.role === role);
  const office = (role: 'manager' | 'foreman'): string => {
    const person = first(role);
    return `  ${role.padEnd(8)} ${person?.email ?? ''}   ${secrets.password}`;
  };
  const floor = (role: 'weaver' | 'tackler'): string => {
    const person = first(role);
    return `  ${role.padEnd(8)} works number ${person?.worksNumber ?? ''}, PIN ${secrets.pin}   (${person?.name ?? ''}; all others have the same PIN)`;
  };
  return [
    '',
    'Demo accounts, which exist only here:',
    office('manager'),
    office('foreman'),
    floor('weaver'),
    floor('tackler'),
    '',
    'Works numbers and PINs are for registered tablets. To make your browser one:',
    '  1. sign in as the foreman, 2. open Tablets, 3. "Make it a tablet", 4. change person.',
    '',
  ].join('\n');
}
