import * as z from 'zod/mini';
import {
  newTabletCodeSchema,
  registerByCodeSchema,
  renameDeviceSchema,
  tabletCodeSchema,
} from '../../../shared/contract/one-time.js';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  deviceListSchema,
  deviceRowSchema,
  registerDeviceSchema,
  sessionSchema,
} from '../../../shared/contract/session.js';
import { askedAddress } from '../mail/mail.routes.js';
import { route } from '../route.js';
import { clearCookie, DEVICE_COOKIE_AGE, setCookie } from '../sessions/cookies.js';
import { addressOf, cookiesOf } from '../sessions/sessions.routes.js';
import { listDevices, registerTablet, renameDevice, revokeDevice } from './devices.service.js';
import { newTabletCode, registerByCode } from './tablet-codes.js';

export const deviceRoutes = [
  route({
    method: 'post',
    path: '/devices',
    permission: 'devices.register',
    cookie: true,
    summary:
      'Registers this browser as a tablet of a shed; sets the device cookie and moves the sign-in to it.',
    body: registerDeviceSchema,
    answer: sessionSchema,
    errors: ['other-shed'],
    handle: async ({ deps, principal, body, ...exchange }) => {
      const { answer, device, person } = await registerTablet(deps, principal, body);
      setCookie(exchange, 'device', device, DEVICE_COOKIE_AGE);
      setCookie(exchange, 'person', person.value, person.expiresAt - deps.now());
      return answer;
    },
  }),
  route({
    method: 'get',
    path: '/devices',
    permission: 'devices.register',
    summary: 'Tablets and office browsers, with what came from each and what is missing.',
    answer: deviceListSchema,
    handle: async ({ deps, principal }) => ({ devices: await listDevices(deps, principal) }),
  }),
  route({
    method: 'post',
    path: '/devices/:id/revoke',
    permission: 'devices.manage',
    summary: 'Withdraws a device: its sign-ins and streams end, and it may only hand in what it holds.',
    params: z.object({ id: refSchema }),
    answer: deviceRowSchema,
    errors: ['not-found', 'other-shed'],
    handle: ({ deps, principal, params }) => revokeDevice(deps, principal, params.id),
  }),
  route({
    method: 'patch',
    path: '/devices/:id',
    permission: 'devices.manage',
    summary: 'Gives a tablet or an office browser another name.',
    params: z.object({ id: refSchema }),
    body: renameDeviceSchema,
    answer: deviceRowSchema,
    errors: ['not-found', 'other-shed'],
    handle: ({ deps, principal, params, body }) => renameDevice(deps, principal, params.id, body.name),
  }),
  route({
    method: 'post',
    path: '/devices/codes',
    permission: 'devices.register',
    summary: 'A code that makes another browser a tablet of a shed: once, and for a quarter of an hour.',
    body: newTabletCodeSchema,
    answer: tabletCodeSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, body, request }) =>
      newTabletCode(deps, principal, body, askedAddress(request)),
  }),
  route({
    method: 'post',
    path: '/devices/register-by-code',
    permission: 'public',
    cookie: true,
    summary: 'Makes this browser a tablet by such a code; sets the device cookie. Nobody is signed in on it.',
    body: registerByCodeSchema,
    answer: sessionSchema,
    errors: [
      'tablet-code-wrong',
      'tablet-code-used',
      'tablet-code-expired',
      'already-tablet',
      'too-many-tries',
    ],
    handle: async ({ deps, body, ...exchange }) => {
      const { request } = exchange;
      const cookies = cookiesOf(request);
      const { answer, device } = await registerByCode(deps, body.code, cookies, addressOf(request));
      setCookie(exchange, 'device', device, DEVICE_COOKIE_AGE);
      if (cookies.person) clearCookie(exchange, 'person');
      return answer;
    },
  }),
];
