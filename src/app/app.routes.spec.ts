import { computed, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { permissionsOf, type Permission, type Role } from '@shared/contract/roles';
import { routes } from './app.routes';
import { SessionStore } from './core/session-store';

const NOBODYS: ReadonlySet<Permission> = new Set<Permission>(['public']);

/**
 * Stands for who is here, known only once the session has started, as in a page just opened. Without an outlet the
 * router runs guards and loads features, and shows nothing.
 */
function routerFor(roles: readonly Role[] | null, needsFirstManager = false): Router {
  const known = signal(false);
  const permissions = computed(() => (roles && known() ? permissionsOf(roles) : NOBODYS));
  const started = new Promise<void>((resolve) => setTimeout(resolve)).then(() => known.set(true));
  TestBed.configureTestingModule({
    providers: [
      provideRouter(routes),
      {
        provide: SessionStore,
        useValue: {
          start: () => started,
          person: computed(() => (known() && roles ? { roles } : null)),
          permissions,
          somebody: () => known() && roles !== null,
          needsFirstManager: computed(() => known() && needsFirstManager),
          may: (permission: Permission) => permissions().has(permission),
        },
      },
    ],
  });
  return TestBed.inject(Router);
}

async function landsAt(
  url: string,
  roles: readonly Role[] | null,
  needsFirstManager = false,
): Promise<string> {
  TestBed.resetTestingModule();
  const router = routerFor(roles, needsFirstManager);
  await router.navigateByUrl(url);
  return router.url;
}

describe('routes', () => {
  it('land each role at its work', async () => {
    expect(await landsAt('/', ['weaver'])).toBe('/loomside');
    expect(await landsAt('/', ['manager'])).toBe('/weeks');
    expect(await landsAt('/', ['foreman', 'manager'])).toBe('/weeks');
  });

  it('ask whoever is nobody to sign in, and remember where they wanted to go', async () => {
    expect(await landsAt('/', null)).toBe('/sign-in');
    expect(await landsAt('/weeks?metric=warp-breaks', null)).toBe(
      '/sign-in?next=%2Fweeks%3Fmetric%3Dwarp-breaks',
    );
    expect(await landsAt('/loomside', null)).toBe('/sign-in?next=%2Floomside');
  });

  it('lead to the first run while the mill has no manager', async () => {
    expect(await landsAt('/', null, true)).toBe('/first-run');
    expect(await landsAt('/shift-book', null, true)).toBe('/first-run');
  });

  it.each(['/weeks', '/shift-book', '/shift-book/shed-1:2026-05-11:night', '/tablet'])(
    'keep a weaver out of %s',
    async (url) => {
      expect(await landsAt(url, ['weaver'])).toBe('/not-permitted');
      expect(await landsAt(url, ['foreman'])).toBe(url);
      expect(await landsAt(url, ['manager'])).toBe(url);
    },
  );

  it('have a page for an address that leads nowhere', async () => {
    const router = routerFor(['weaver']);
    await router.navigateByUrl('/looms/of/yore');
    expect(router.url).toBe('/looms/of/yore');
    expect(router.routerState.snapshot.root.firstChild?.title).toBe('No such page');
  });
});
