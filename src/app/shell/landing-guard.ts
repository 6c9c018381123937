import { inject } from '@angular/core';
import { type CanActivateFn, Router } from '@angular/router';
import { SessionStore } from '../core/session-store';
import { landingFor } from './navigation';

/** Sends whoever opens the bare address to their work. `signedInGuard` stands before it. */
export const landingGuard: CanActivateFn = () => {
  const session = inject(SessionStore);
  return inject(Router).parseUrl(landingFor(session.permissions(), session.person()?.roles ?? []));
};
