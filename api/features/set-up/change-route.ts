import * as z from 'zod/mini';
import type { ErrorCode } from '../../../shared/contract/errors.js';
import { refSchema } from '../../../shared/contract/primitives.js';
import { changedSchema, type Changed } from '../../../shared/contract/set-up.js';
import { route, type Route } from '../route.js';
import { changeSetUp, type SetUpChange } from './set-up-change.js';

type Shape = z.ZodMiniType;
const ofThing = z.object({ id: refSchema });

interface Line<B extends Shape> {
  readonly method: 'post' | 'patch';
  /** Below /set-up. */
  readonly path: string;
  readonly summary: string;
  readonly body: B;
  readonly errors?: readonly ErrorCode[];
}

/** A line of set-up that changes the whole mill, or what its body names. */
export function changeRoute<B extends Shape>(
  { path, errors = [], ...line }: Line<B>,
  work: (change: SetUpChange, body: z.infer<B>) => Promise<Changed>,
): Route {
  return route({
    ...line,
    path: `/set-up${path}`,
    permission: 'mill.manage',
    answer: changedSchema,
    errors: ['bad-request', 'other-shed', ...errors],
    handle: ({ deps, principal, body }) =>
      changeSetUp(deps, principal, (change) => work(change, body as z.infer<B>)),
  });
}

/** A line of set-up that changes the thing that its path names. */
export function changeThingRoute<B extends Shape>(
  { path, errors = [], ...line }: Line<B>,
  work: (change: SetUpChange, id: string, body: z.infer<B>) => Promise<Changed>,
): Route {
  return route({
    ...line,
    path: `/set-up${path}`,
    permission: 'mill.manage',
    params: ofThing,
    answer: changedSchema,
    errors: ['bad-request', 'not-found', 'other-shed', ...errors],
    handle: ({ deps, principal, params, body }) =>
      changeSetUp(deps, principal, (change) => work(change, params.id, body as z.infer<B>)),
  });
}
