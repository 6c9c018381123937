import type { Role } from '../../shared/contract/roles.js';
import { demoPatterns, patternAt, workingDate } from './calendar.js';
import { demoPeople, type DemoPerson } from './people.js';
import { crewOf } from './simulator.js';
import { sure } from './sure.js';

export const DEMO_PIN = '246810';
export const DEMO_PASSWORD = 'twelve weeks of cloth';

/** Who can be tried in the demo: a manager, and of the crew that is at work now a foreman, a weaver and a tackler. */
export function demoAccounts(now: number): Readonly<Record<Role, DemoPerson>> {
  const people = demoPeople();
  const patterns = demoPatterns().map((pattern) => pattern.id);
  const crew = crewOf({ people, patterns }, { date: workingDate(now), patternId: patternAt(now) });
  const byId = (id: string | undefined): DemoPerson => sure(people.find((person) => person.id === id));
  return {
    manager: sure(people.find((person) => person.role === 'manager')),
    foreman: byId(crew.foreman),
    weaver: byId(crew.weavers[0]),
    tackler: byId(crew.tackler),
  };
}

/** How they sign in. These accounts are in the demo's book alone. */
export function accountWords(now: number): string {
  const { manager, foreman, weaver, tackler } = demoAccounts(now);
  const office = ({ role, email }: DemoPerson): string =>
    `  ${role.padEnd(8)} ${(email ?? '').padEnd(30)} password ${DEMO_PASSWORD}`;
  const floor = ({ role, worksNumber, name }: DemoPerson): string =>
    `  ${role.padEnd(8)} ${`works number ${worksNumber ?? ''}`.padEnd(30)} PIN ${DEMO_PIN}   (${name})`;
  return [
    '',
    'Demo accounts, which exist only here (everybody has the same password and PIN):',
    office(manager),
    office(foreman),
    floor(weaver),
    floor(tackler),
    '',
    'Works numbers and PINs are for registered tablets. To make your browser one:',
    '  sign in as the foreman, open Tablets, "Make it a tablet", then change person.',
    '',
  ].join('\n');
}
