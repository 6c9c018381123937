import * as z from 'zod/mini';
import { askPinSlipsSchema, pinSlipsSchema } from '../../../shared/contract/one-time.js';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  changePersonSchema,
  newPersonSchema,
  peopleListSchema,
  personRowSchema,
} from '../../../shared/contract/session.js';
import { letterSchema } from '../../../shared/contract/set-up.js';
import { askedAddress } from '../mail/mail.routes.js';
import { route } from '../route.js';
import { invite } from './invitation.js';
import { addPerson, changePerson, listPeople } from './people.service.js';
import { makePinSlips } from './pin-slips.js';

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
      'Changes facts at once and rights from now on, disables, or sets a new PIN or password. Disabling ends sign-ins at once.',
    params: z.object({ id: refSchema }),
    body: changePersonSchema,
    answer: personRowSchema,
    errors: ['not-found', 'other-shed', 'last-manager', 'password-too-long', 'password-too-short'],
    handle: ({ deps, principal, params, body }) => changePerson(deps, principal, params.id, body),
  }),
  route({
    method: 'post',
    path: '/people/:id/invite',
    permission: 'people.manage',
    summary:
      'Sends the letter with a one-time link: an invitation, or a reset where there is a password already.',
    params: z.object({ id: refSchema }),
    answer: letterSchema,
    errors: ['not-found', 'other-shed', 'no-email'],
    handle: ({ deps, principal, params, request }) =>
      invite(deps, principal, params.id, askedAddress(request)),
  }),
  route({
    method: 'post',
    path: '/people/pin-slips',
    permission: 'people.manage',
    summary: 'New random PINs, said in this answer alone, to print. Sign-ins with the old ones end.',
    body: askPinSlipsSchema,
    answer: pinSlipsSchema,
    errors: ['not-found', 'other-shed', 'no-works-number'],
    handle: async ({ deps, principal, body }) => ({ slips: await makePinSlips(deps, principal, body.ids) }),
  }),
];
