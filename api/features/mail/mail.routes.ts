import type { Request } from 'express';
import * as z from 'zod/mini';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  letterSchema,
  lettersSchema,
  letterTextSchema,
  mailFormSchema,
  mailSettingsSchema,
  testLetterSchema,
} from '../../../shared/contract/set-up.js';
import { route } from '../route.js';
import {
  changeMail,
  listLetters,
  mailSettings,
  readLetter,
  readLetterFile,
  sendAgain,
  sendTestLetter,
} from './mail.service.js';

const ofLetter = z.object({ id: refSchema });

export const mailRoutes = [
  route({
    method: 'get',
    path: '/set-up/mail',
    permission: 'mill.manage',
    summary: 'How letters go out. The password is never sent back.',
    answer: mailSettingsSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal }) => mailSettings(deps, principal),
  }),
  route({
    method: 'patch',
    path: '/set-up/mail',
    permission: 'mill.manage',
    summary:
      'Sets how letters go out; those that wait are tried at once. Without a host they are kept as files.',
    body: mailFormSchema,
    answer: mailSettingsSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, body, request }) => changeMail(deps, principal, body, askedAddress(request)),
  }),
  route({
    method: 'post',
    path: '/set-up/mail/test',
    permission: 'mill.manage',
    summary: 'Sends a test letter now, and says what the mail server made of it.',
    body: testLetterSchema,
    answer: letterSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, body }) => sendTestLetter(deps, principal, body),
  }),
  route({
    method: 'get',
    path: '/set-up/letters',
    permission: 'mill.manage',
    summary: 'The newest letters: waiting, sent, failed or kept.',
    answer: lettersSchema,
    errors: ['other-shed'],
    handle: async ({ deps, principal }) => ({ letters: await listLetters(deps, principal) }),
  }),
  route({
    method: 'get',
    path: '/set-up/letters/:id',
    permission: 'mill.manage',
    summary: 'What a letter says that has not gone out.',
    params: ofLetter,
    answer: letterTextSchema,
    errors: ['not-found', 'other-shed'],
    handle: ({ deps, principal, params }) => readLetter(deps, principal, params.id),
  }),
  route({
    method: 'post',
    path: '/set-up/letters/:id/again',
    permission: 'mill.manage',
    summary: 'Tries a failed letter again, now, and says what became of it.',
    params: ofLetter,
    answer: letterSchema,
    errors: ['not-found', 'other-shed'],
    handle: ({ deps, principal, params }) => sendAgain(deps, principal, params.id),
  }),
  route({
    method: 'get',
    path: '/set-up/letters/:id/file',
    permission: 'mill.manage',
    summary: 'A kept letter as a file (message/rfc822).',
    params: ofLetter,
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params, response }) => {
      const eml = await readLetterFile(deps, principal, params.id);
      response.type('message/rfc822').attachment(`${params.id}.eml`).send(eml);
    },
  }),
];

/** Under which address a signed-in manager works here: he has a bearer, which no other site has. */
export function askedAddress(request: Request): string {
  const origin = request.get('origin') ?? '';
  return /^https?:\/\//.test(origin) ? origin : `${request.protocol}://${request.host}`;
}
