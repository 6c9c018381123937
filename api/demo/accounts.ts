import type { Role } from '../../shared/contract/roles.js';
import { demoPatterns, patternAt, workingDate } from './calendar.js';
import { demoPeople, type DemoPerson } from './people.js';
import { crewOf } from './simulator.js';

/**
 * Who can be tried in the demo, and how: a manager, and of the crew that is at work now a foreman, a weaver and a
 * tackler. These accounts are in the demo's book alone.
 */
export function accountWords(
  secrets: { readonly pin: string; readonly password: string },
  now: number,
): string {
  const people = demoPeople();
  const patterns = demoPatterns().map((pattern) => pattern.id);
  const crew = crewOf({ people, patterns }, { date: workingDate(now), patternId: patternAt(now) });
  const one = (role: Role, id?: string): DemoPerson | undefined =>
    people.find((person) => person.role === role && (id === undefined || person.id === id));
  const office = (person: DemoPerson | undefined): string =>
    `  ${person?.role.padEnd(8)} ${(person?.email ?? '').padEnd(30)} password ${secrets.password}`;
  const floor = (person: DemoPerson | undefined): string =>
    `  ${person?.role.padEnd(8)} ${`works number ${person?.worksNumber ?? ''}`.padEnd(30)} PIN ${secrets.pin}   (${person?.name ?? ''})`;
  return [
    '',
    'Demo accounts, which exist only here (everybody has the same password and PIN):',
    office(one('manager')),
    office(one('foreman', crew.foreman)),
    floor(one('weaver', crew.weavers[0])),
    floor(one('tackler', crew.tackler)),
    '',
    'Works numbers and PINs are for registered tablets. To make your browser one:',
    '  sign in as the foreman, open Tablets, "Make it a tablet", then change person.',
    '',
  ].join('\n');
}
