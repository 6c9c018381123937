import {
  pushDoneSchema,
  pushEndSchema,
  pushKeySchema,
  pushSubscriptionSchema,
} from '../../../shared/contract/calls.js';
import { vapidKeys } from '../../push/vapid-keys.js';
import { route, type Route } from '../route.js';
import { endSubscription, subscribe } from './push.service.js';

export const pushRoutes: Route[] = [
  route({
    method: 'get',
    path: '/push/key',
    permission: 'calls.read',
    summary: 'The public key that a browser subscribes to calls by (VAPID).',
    answer: pushKeySchema,
    handle: async ({ deps }) => ({ publicKey: (await vapidKeys(deps)).publicKey }),
  }),
  route({
    method: 'post',
    path: '/push/subscriptions',
    permission: 'calls.read',
    summary: 'Tells this browser of calls for as long as this sign-in lasts: loom and alley, nothing else.',
    body: pushSubscriptionSchema,
    answer: pushDoneSchema,
    errors: ['push-address-refused'],
    handle: async ({ deps, principal, body }) => {
      await subscribe(deps, principal, body);
      return { subscribed: true };
    },
  }),
  route({
    method: 'post',
    path: '/push/subscriptions/end',
    permission: 'calls.read',
    summary: 'Tells this browser of calls no more.',
    body: pushEndSchema,
    answer: pushDoneSchema,
    handle: async ({ deps, principal, body }) => {
      await endSubscription(deps, principal, body.endpoint);
      return { subscribed: false };
    },
  }),
];
