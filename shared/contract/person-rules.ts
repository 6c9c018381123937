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
  readonly worksNumber: string | null;
  readonly email: string | null;
}

export type PersonField = 'worksNumber' | 'email';

/**
 * What is wrong with a person beyond each field's own shape: somebody else's number or address, no way to sign in, a
 * manager without a desk's sign-in. The form says it as one types, the server asks again. `id`: the person's own.
 */
export function personTroubles(
  facts: Pick<PersonFacts, 'worksNumber' | 'email' | 'roles'>,
  others: readonly KnownPerson[],
  id: string | null,
): Partial<Record<PersonField, string>> {
  const { worksNumber, email, roles } = facts;
  const twin = (field: PersonField): KnownPerson | undefined =>
    facts[field] === null
      ? undefined
      : others.find((other) => other.id !== id && other[field] === facts[field]);
  const troubles: Partial<Record<PersonField, string>> = {};
  const sameNumber = twin('worksNumber');
  const sameEmail = twin('email');
  if (sameNumber) troubles.worksNumber = `${sameNumber.name} has this works number. Choose another.`;
  if (sameEmail) troubles.email = `${sameEmail.name} has this e-mail address. Choose another.`;
  if (email === null && roles.includes('manager'))
    troubles.email = 'A manager signs in at a desk and needs an e-mail address, such as name@mill.example.';
  else if (email === null && worksNumber === null)
    troubles.worksNumber =
      'A works number for tablets or an e-mail address for the desk: nobody can sign in without either.';
  return troubles;
}
