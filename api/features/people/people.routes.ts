import * as z from 'zod/mini';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  changePersonSchema,
  newPersonSchema,
  peopleListSchema,
  personRowSchema,
} from '../../../shared/contract/session.js';
import { route } from '../route.js';
import { addPerson, changePerson, listPeople } from './people.service.js';

export const peopleRoutes = [
  route({
    method: 'get',
    path: '/people',
    permission: 'people.read',
    summary: 'Everybody of the mill with the rights in force.',
    answer: peopleListSchema,
    handle: async ({ deps }) => ({ people: await listPeople(deps) }),
  }),
  route({
    method: 'post',
    path: '/people',
    permission: 'people.manage',
    summary: 'A new person, with rights from now on.',
    body: newPersonSchema,
    answer: personRowSchema,
    errors: ['other-shed', 'password-too-long', 'password-too-short'],
    handle: ({ deps, principal, body }) => addPerson(deps, principal, body),
  }),
  route({
    method: 'patch',
    path: '/people/:id',
    permission: 'people.manage',
    summary:
      'Changes rights from now on, disables, or sets a new PIN or password. Disabling ends sign-ins at once.',
    params: z.object({ id: refSchema }),
    body: changePersonSchema,
    answer: personRowSchema,
    errors: ['not-found', 'other-shed', 'last-manager', 'password-too-long', 'password-too-short'],
    handle: ({ deps, principal, params, body }) => changePerson(deps, principal, params.id, body),
  }),
];
