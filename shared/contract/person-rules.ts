import type { Role } from './roles.js';

/** What of a person the rules look at. */
export interface PersonFacts {
  readonly name: string;
  readonly shortName: string;
  readonly worksNumber: string | null;
  readonly email: string | null;
  readonly roles: readonly Role[];
}

export interface KnownPerson {
  readonly id: string;
  readonly name: string;
  readonly shortName: string;
  readonly worksNumber: string | null;
  readonly email: string | null;
}

export type PersonField = 'shortName' | 'worksNumber' | 'email';

export const EASY_PIN = 'This PIN is one of those that are guessed first. Take digits without such an order.';

/** Whether a PIN is one that is guessed first: one digit six times, or digits in a row. */
export function isEasyPin(pin: string): boolean {
  const steps = new Set(
    [...pin].slice(1).map((digit, index) => (Number(digit) - Number(pin[index]) + 10) % 10),
  );
  return steps.size === 1 && (steps.has(0) || steps.has(1) || steps.has(9));
}

/**
 * What is wrong with a person beyond each field's own shape: somebody else's number or address, no way to sign in, a
 * manager without a desk's sign-in, a short name that two would answer to. The form says it as one types, the server
 * asks again. `id`: the person's own; a number and a short name that were theirs before stay theirs.
 */
export function personTroubles(
  facts: PersonFacts,
  others: readonly KnownPerson[],
  id: string | null,
): Partial<Record<PersonField, string>> {
  const { worksNumber, email, roles } = facts;
  const own = others.find((other) => other.id === id);
  const rest = others.filter((other) => other.id !== id);
  const twin = (field: PersonField): KnownPerson | undefined => {
    const said = alike(field, facts[field]);
    if (said === null || own?.[field] === facts[field]) return undefined;
    return rest.find((other) => alike(field, other[field]) === said);
  };
  const troubles: Partial<Record<PersonField, string>> = {};
  const sameNumber = twin('worksNumber');
  const sameEmail = twin('email');
  const sameShort = twin('shortName');
  if (sameShort) troubles.shortName = sameShortWords(facts, sameShort, rest);
  if (sameNumber)
    troubles.worksNumber =
      sameNumber.worksNumber === worksNumber
        ? `${sameNumber.name} has this works number. Choose another.`
        : `${sameNumber.name} has ${sameNumber.worksNumber ?? ''}, which is the same at the PIN pad. Choose another.`;
  if (sameEmail) troubles.email = `${sameEmail.name} has this e-mail address. Choose another.`;
  if (email === null && roles.includes('manager'))
    troubles.email = 'A manager signs in at a desk and needs an e-mail address, such as name@mill.example.';
  else if (email === null && worksNumber === null)
    troubles.worksNumber =
      'A works number for tablets or an e-mail address for the desk: nobody can sign in without either.';
  return troubles;
}

/** What two people's facts are compared by: 101 and 0101 are one number to whoever taps it, Mary and mary one name. */
function alike(field: PersonField, value: string | null): string | null {
  if (value === null || value.trim() === '') return null;
  if (field === 'worksNumber') return value.trim().replace(/^0+(?=\d)/, '');
  return value.trim().toLowerCase();
}

/** "There is a Mary already: say which, e.g. Mary K." with as much of the family name as tells them apart. */
function sameShortWords(facts: PersonFacts, twin: KnownPerson, rest: readonly KnownPerson[]): string {
  const taken = new Set(rest.map(({ shortName }) => alike('shortName', shortName)));
  const [first = '', ...more] = facts.name.trim().split(/\s+/);
  const family = more.at(-1) ?? '';
  const longer = [...family].map((_, index) => {
    const part = [...family].slice(0, index + 1).join('');
    return part === family ? `${first} ${part}` : `${first} ${part}.`;
  });
  const free = longer.find((words) => !taken.has(alike('shortName', words)));
  const there = `There is ${/^[aeiou]/i.test(twin.shortName) ? 'an' : 'a'} ${twin.shortName} already`;
  return `${there}: say which${free === undefined ? '.' : `, e.g. ${free.endsWith('.') ? free : `${free}.`}`}`;
}
