import type { Request, Response } from 'express';
import { ipKeyGenerator } from 'express-rate-limit';
import {
  floorSignInSchema,
  officeSignInSchema,
  refreshSchema,
  sessionSchema,
  type Session,
} from '../../../shared/contract/session.js';
import {
  forgottenAnswerSchema,
  forgottenSchema,
  linkSchema,
  lookAtLinkSchema,
  redeemLinkSchema,
} from '../../../shared/contract/one-time.js';
import { route } from '../route.js';
import type { Cookies } from './cookie-owners.js';
import { clearCookie, DEVICE_COOKIE_AGE, readCookie, setCookie } from './cookies.js';
import { askForLink, lookAtLink, redeemLink } from './one-time-links.js';
import { refreshSession } from './session-refresh.js';
import { endOwnSession, signInAtOffice, signInOnFloor, type SignedIn } from './sessions.service.js';

interface Exchange {
  readonly request: Request;
  readonly response: Response;
}

const LINK_ERRORS = ['link-wrong', 'link-used', 'link-replaced', 'link-expired', 'too-many-tries'] as const;

export const sessionRoutes = [
  route({
    method: 'post',
    path: '/sessions/office',
    permission: 'public',
    cookie: true,
    summary: 'Signs in with e-mail and password; sets the person cookie.',
    body: officeSignInSchema,
    answer: sessionSchema,
    errors: ['wrong-sign-in', 'too-many-tries', 'password-too-long', 'device-revoked'],
    handle: async ({ deps, body, ...exchange }) => {
      const { request } = exchange;
      return keep(
        exchange,
        deps.now(),
        await signInAtOffice(deps, body, cookiesOf(request), addressOf(request)),
      );
    },
  }),
  route({
    method: 'post',
    path: '/sessions/floor',
    permission: 'public',
    cookie: true,
    summary: 'Signs in with works number and PIN on a registered tablet; sets the person cookie.',
    body: floorSignInSchema,
    answer: sessionSchema,
    errors: ['wrong-sign-in', 'too-many-tries', 'device-unknown', 'device-revoked', 'other-shed'],
    handle: async ({ deps, body, ...exchange }) =>
      keep(exchange, deps.now(), await signInOnFloor(deps, body, cookiesOf(exchange.request))),
  }),
  route({
    method: 'post',
    path: '/sessions/refresh',
    permission: 'public',
    cookie: true,
    summary:
      'A new access token for the tablet and the person that the cookies name; nobody is an answer too.',
    body: refreshSchema,
    answer: sessionSchema,
    handle: async ({ deps, ...exchange }) => {
      const cookies = cookiesOf(exchange.request);
      const { answer, refresh, tablet } = await refreshSession(deps, cookies);
      if (tablet && cookies.device) setCookie(exchange, 'device', cookies.device, DEVICE_COOKIE_AGE);
      if (refresh) setCookie(exchange, 'person', refresh.value, refresh.expiresAt - deps.now());
      else if (cookies.person) clearCookie(exchange, 'person');
      return answer;
    },
  }),
  route({
    method: 'post',
    path: '/sessions/end',
    permission: 'public',
    cookie: true,
    summary: 'Signs the person out of this browser. A tablet stays registered and keeps what it holds.',
    answer: sessionSchema,
    handle: async ({ deps, ...exchange }) => {
      const cookies = cookiesOf(exchange.request);
      await endOwnSession(deps, cookies);
      clearCookie(exchange, 'person');
      return (await refreshSession(deps, { ...cookies, person: null })).answer;
    },
  }),
  route({
    method: 'post',
    path: '/sessions/forgotten',
    permission: 'public',
    summary: 'Sends a letter with a link for a new password. The answer is the same for an unknown address.',
    body: forgottenSchema,
    answer: forgottenAnswerSchema,
    errors: ['too-many-tries'],
    handle: async ({ deps, body, request }) => {
      await askForLink(deps, body.email, addressOf(request));
      return { asked: true };
    },
  }),
  route({
    method: 'post',
    path: '/sessions/one-time/look',
    permission: 'public',
    summary: 'Whose one-time link this is, or why it does not work. Uses nothing up.',
    body: lookAtLinkSchema,
    answer: linkSchema,
    errors: LINK_ERRORS,
    handle: ({ deps, body, request }) => lookAtLink(deps, body.token, addressOf(request)),
  }),
  route({
    method: 'post',
    path: '/sessions/one-time/redeem',
    permission: 'public',
    cookie: true,
    summary:
      'Sets the password by a one-time link and signs in here; the person’s other sign-ins end. Works once.',
    body: redeemLinkSchema,
    answer: sessionSchema,
    errors: [...LINK_ERRORS, 'password-too-short', 'password-too-long', 'device-revoked'],
    handle: async ({ deps, body, ...exchange }) => {
      const { request } = exchange;
      return keep(exchange, deps.now(), await redeemLink(deps, body, cookiesOf(request), addressOf(request)));
    },
  }),
];

/** Sets the person cookie and passes on the answer. */
export function keep(exchange: Exchange, now: number, signedIn: SignedIn): Session {
  setCookie(exchange, 'person', signedIn.refresh, signedIn.expiresAt - now);
  return signedIn.answer;
}

export function cookiesOf(request: Request): Cookies {
  return { device: readCookie(request, 'device'), person: readCookie(request, 'person') };
}

/** The network address, or for IPv6 its network: one subscriber has many addresses there. */
export function addressOf(request: Request): string {
  return ipKeyGenerator(request.ip ?? '::');
}
