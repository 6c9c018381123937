import type { ErrorRequestHandler, Response } from 'express';
import { codeOfDatabaseError } from '../database/database-errors.js';
import type { Deps } from '../deps.js';
import { ApiError } from './api-error.js';

/** The one error handler: every failure of a route becomes problem+json with a stable code. */
export function problemHandler(deps: Pick<Deps, 'log'>): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    const known = asApiError(error);
    if (known.status >= 500) deps.log.error({ err: error, url: request.originalUrl }, known.code);
    if (response.headersSent) return next(error);
    sendProblem(response, known);
  };
}

export function sendProblem(response: Response, error: ApiError): void {
  const wait = error.more.retryAfter ?? (error.status === 503 ? 5 : undefined);
  if (wait !== undefined) response.set('Retry-After', String(wait));
  if (error.status === 401) response.set('WWW-Authenticate', 'Bearer');
  response
    .status(error.status)
    .set('Cache-Control', 'no-store')
    .type('application/problem+json')
    .send(JSON.stringify(error.toProblem()));
}

function asApiError(error: unknown): ApiError {
  if (error instanceof ApiError) return error;
  const code = codeOfDatabaseError(error);
  if (code) return new ApiError(code);
  // Express and its body parser throw errors that carry a status and, for bodies, a type.
  const { type, status } = (error ?? {}) as { type?: string; status?: number };
  if (type === 'entity.too.large') return new ApiError('too-large');
  if (type === 'entity.parse.failed' || type === 'encoding.unsupported' || type === 'charset.unsupported')
    return new ApiError('bad-json');
  if (status !== undefined && status >= 400 && status < 500) return new ApiError('bad-request');
  return new ApiError('internal');
}
