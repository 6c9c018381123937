import * as z from 'zod/mini';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  deviceListSchema,
  deviceRowSchema,
  registerDeviceSchema,
  sessionSchema,
} from '../../../shared/contract/session.js';
import { route } from '../route.js';
import { DEVICE_COOKIE_AGE, setCookie } from '../sessions/cookies.js';
import { listDevices, registerTablet, revokeDevice } from './devices.service.js';

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
];
