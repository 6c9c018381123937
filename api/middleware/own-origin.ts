import type { Request } from 'express';
import type { Settings } from '../settings.js';
import { ApiError } from './api-error.js';

/**
 * Cookie routes are for our own pages. Browsers send `Origin` with every POST; it must be a public origin of ours or
 * the very address that was asked. Throws `bad-origin`.
 */
export function requireOwnOrigin(request: Request, settings: Settings): void {
  const origin = request.get('origin');
  if (origin === undefined || !isOwn(origin, request, settings)) throw new ApiError('bad-origin');
}

function isOwn(origin: string, request: Request, settings: Settings): boolean {
  return settings.publicOrigins.includes(origin) || origin === `${request.protocol}://${request.host}`;
}
