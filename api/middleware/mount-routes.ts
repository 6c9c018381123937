import { json, Router, type Request, type Response } from 'express';
import * as z from 'zod/mini';
import { LIMITS } from '../../shared/contract/limits.js';
import type { Deps } from '../deps.js';
import type { Route } from '../features/route.js';
import { ApiError } from './api-error.js';
import { authenticate, requirePermission } from './authenticate.js';
import { requireOwnOrigin } from './own-origin.js';

// zod/mini says only "Invalid input" unless a language is set.
z.config(z.locales.en());

export interface MountOptions {
  /** In tests: an answer that is not exactly what its schema says is a failure. */
  readonly checkAnswers?: boolean;
}

/** Mounts a table of routes. The order is the same for all: origin, who asks, permission, body, shapes, handler. */
export function mountRoutes(deps: Deps, routes: readonly Route[], options: MountOptions = {}): Router {
  const router = Router({ caseSensitive: true });
  for (const line of routes)
    router[line.method](line.path, async (request, response) => {
      response.set('Cache-Control', 'no-store');
      if (line.cookie) requireOwnOrigin(request, deps.settings);
      const asked = await authenticate(deps, request);
      requirePermission(asked, line.permission);
      if (line.body) await readBody(request, response);
      const context = {
        deps,
        principal: asked.principal,
        params: parsed(line.params, request.params),
        query: parsed(line.query, request.query),
        body: parsed(line.body, request.body),
        request,
        response,
      };
      const answer = await line.handle(context as never);
      if (answer === undefined) return;
      if (options.checkAnswers) checkAnswer(line, answer);
      response.json(answer);
    });
  return router;
}

const parseBody = json({ limit: LIMITS.bodyBytes });

/** Only after the permission: a stranger's two megabytes are not worth parsing. */
async function readBody(request: Request, response: Response): Promise<void> {
  const hasBody =
    request.headers['transfer-encoding'] !== undefined || Number(request.get('content-length')) > 0;
  if (hasBody && request.is('json') === false) throw new ApiError('bad-json');
  await new Promise<void>((resolve, reject) => {
    parseBody(request, response, (error?: unknown) => (error === undefined ? resolve() : reject(error)));
  });
}

function parsed(shape: z.ZodMiniType | undefined, value: unknown): unknown {
  if (!shape) return undefined;
  const result = shape.safeParse(value ?? {});
  if (result.success) return result.data;
  throw new ApiError('bad-request', {
    fields: result.error.issues.map(({ path, message }) => ({ path: path.join('.'), message })),
  });
}

function checkAnswer(line: Route, answer: unknown): void {
  const plain: unknown = JSON.parse(JSON.stringify(answer));
  const result = line.answer?.safeParse(plain);
  const where = `${line.method} ${line.path}`;
  if (!result) throw new Error(`${where} answers with JSON but its line names no answer`);
  if (!result.success)
    throw new Error(`${where} does not answer as its line says: ${z.prettifyError(result.error)}`);
  if (sorted(result.data) !== sorted(plain)) throw new Error(`${where} answers with more than its line says`);
}

/** JSON with sorted keys, for comparing. */
function sorted(value: unknown): string {
  return JSON.stringify(value, (_key, each: unknown) =>
    each !== null && typeof each === 'object' && !Array.isArray(each)
      ? Object.fromEntries(Object.entries(each).sort(([a], [b]) => (a < b ? -1 : 1)))
      : each,
  );
}
