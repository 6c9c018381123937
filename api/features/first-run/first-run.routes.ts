import { firstManagerSchema, sessionSchema } from '../../../shared/contract/session.js';
import { route } from '../route.js';
import { addressOf, cookiesOf, keep } from '../sessions/sessions.routes.js';
import { setUpMill } from './first-run.service.js';

export const firstRunRoutes = [
  route({
    method: 'post',
    path: '/first-run',
    permission: 'public',
    cookie: true,
    summary: 'Sets up the mill and its first manager, by the one-time code that the server prints.',
    body: firstManagerSchema,
    answer: sessionSchema,
    errors: ['bad-code', 'already-set-up', 'password-too-short', 'password-too-long', 'too-many-tries'],
    handle: async ({ deps, body, ...exchange }) => {
      const { request } = exchange;
      return keep(exchange, deps.now(), await setUpMill(deps, body, cookiesOf(request), addressOf(request)));
    },
  }),
];
