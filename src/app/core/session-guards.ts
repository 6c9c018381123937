import { inject } from '@angular/core';
import { Router, type CanActivateFn, type UrlTree } from '@angular/router';
import type { Permission } from '@shared/contract/roles';
import { SessionStore } from './session-store';

/** Lets in whoever is signed in or unlocked offline; others go to first run or sign-in and come back after. */
export const signedInGuard: CanActivateFn = async (_route, state) => {
  const session = inject(SessionStore);
  const router = inject(Router);
  await session.start();
  return session.somebody() ? true : door(session, router, state.url);
};

/** Lets in whoever holds a permission. Signed in without it: `/not-permitted`. */
export function permissionGuard(permission: Permission): CanActivateFn {
  return async (_route, state) => {
    const session = inject(SessionStore);
    const router = inject(Router);
    await session.start();
    if (session.may(permission)) return true;
    return session.somebody() ? router.parseUrl('/not-permitted') : door(session, router, state.url);
  };
}

/** Lets nobody set up a mill that is set up: they go to their work, or to sign-in. */
export const firstManagerGuard: CanActivateFn = async () => {
  const session = inject(SessionStore);
  const router = inject(Router);
  await session.start();
  return session.needsFirstManager() ? true : router.parseUrl(session.somebody() ? '/' : '/sign-in');
};

function door(session: SessionStore, router: Router, url: string): UrlTree {
  if (session.needsFirstManager()) return router.parseUrl('/first-run');
  return router.createUrlTree(['/sign-in'], { queryParams: url === '/' ? {} : { next: url } });
}
