import type { Request, Response } from 'express';
import type * as z from 'zod/mini';
import type { ErrorCode } from '../../shared/contract/errors.js';
import type { Permission } from '../../shared/contract/roles.js';
import type { Deps } from '../deps.js';
import type { Principal } from '../middleware/principal.js';

type Shape = z.ZodMiniType;
type Out<S> = S extends Shape ? z.infer<S> : undefined;

export interface RouteContext<B, Q, P> {
  readonly deps: Deps;
  readonly principal: Principal;
  /** Validated. */
  readonly body: B;
  readonly query: Q;
  readonly params: P;
  readonly request: Request;
  readonly response: Response;
}

/**
 * A line of a route table: what is asked, who may, what comes back. The application mounts these, the OpenAPI
 * document is made from these, and the generated permission test walks these.
 */
export interface Route {
  readonly method: 'get' | 'post' | 'patch' | 'delete';
  /** Express 5 path below /api, e.g. `/devices/:id/revoke`. */
  readonly path: string;
  readonly permission: Permission;
  readonly summary: string;
  readonly body?: Shape;
  readonly query?: Shape;
  readonly params?: Shape;
  /** Absent: an event stream or a file, described by `summary`. */
  readonly answer?: Shape;
  readonly errors?: readonly ErrorCode[];
  /** Cookie routes need an Origin of our own. */
  readonly cookie?: boolean;
  /** Answers with JSON; undefined where it has answered itself. */
  readonly handle: (context: RouteContext<never, never, never>) => Promise<unknown>;
}

/** Types a route's handler by its schemas. */
export function route<B extends Shape | undefined, Q extends Shape | undefined, P extends Shape | undefined>(
  line: Omit<Route, 'handle' | 'body' | 'query' | 'params'> & {
    body?: B;
    query?: Q;
    params?: P;
    handle: (context: RouteContext<Out<B>, Out<Q>, Out<P>>) => Promise<unknown>;
  },
): Route {
  return line as unknown as Route;
}
