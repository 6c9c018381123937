import { inject } from '@angular/core';
import { type CanActivateFn, Router } from '@angular/router';
import { SessionStore } from '../core/session-store';
import { landingFor } from './navigation';

/**
 * Sends whoever opens the bare address to their work. `signedInGuard` stands before it and decides first, but the
 * router asks both at once: so this one waits for the session too, or it would judge while nobody is known yet.
 */
export const landingGuard: CanActivateFn = async () => {
  const session = inject(SessionStore);
  const router = inject(Router);
  await session.start();
  return router.parseUrl(landingFor(session.permissions(), session.person()?.roles ?? []));
};
