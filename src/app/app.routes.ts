import type { Routes } from '@angular/router';
import { firstManagerGuard, permissionGuard, signedInGuard } from './core/session-guards';
import { landingGuard } from './shell/landing-guard';

/** Lazy by feature. Who may see a screen stands on its line; the server asks again for every request. */
export const routes: Routes = [
  { path: '', pathMatch: 'full', canActivate: [signedInGuard, landingGuard], children: [] },
  {
    path: 'loomside',
    title: 'Loomside',
    canActivate: [permissionGuard('entries.push')],
    loadChildren: async () => (await import('./features/loomside/loomside.routes')).LOOMSIDE_ROUTES,
  },
  // What a loom's label says.
  { path: 'l/:number', redirectTo: 'loomside/loom/:number' },
  {
    path: 'floor',
    title: 'Floor',
    canActivate: [permissionGuard('floor.read')],
    loadComponent: async () => (await import('./features/floor/floor-page')).FloorPage,
  },
  {
    path: 'calls',
    canActivate: [permissionGuard('calls.read')],
    loadChildren: async () => (await import('./features/calls/calls.routes')).CALLS_ROUTES,
  },
  {
    path: 'shift-book',
    canActivate: [permissionGuard('sheet.read')],
    loadChildren: async () => (await import('./features/shift-book/shift-book.routes')).SHIFT_BOOK_ROUTES,
  },
  {
    path: 'weeks',
    title: 'Weeks',
    canActivate: [permissionGuard('weeks.read')],
    loadComponent: async () => (await import('./features/weeks/weeks-page')).WeeksPage,
  },
  {
    path: 'sign-in',
    title: 'Sign in',
    loadComponent: async () => (await import('./features/sign-in/sign-in-page')).SignInPage,
  },
  {
    path: 'first-run',
    title: 'A new mill',
    canActivate: [firstManagerGuard],
    loadComponent: async () => (await import('./features/first-run/first-run-page')).FirstRunPage,
  },
  {
    path: 'welcome',
    title: 'Choose a password',
    loadComponent: async () => (await import('./features/welcome/welcome-page')).WelcomePage,
  },
  {
    path: 'forgotten',
    title: 'Forgotten password',
    loadComponent: async () => (await import('./features/welcome/forgotten-page')).ForgottenPage,
  },
  {
    path: 'tablet/code',
    title: 'A tablet’s code',
    loadComponent: async () => (await import('./features/tablet/tablet-code-page')).TabletCodePage,
  },
  {
    path: 'tablet',
    title: 'Tablets',
    canActivate: [permissionGuard('devices.register')],
    loadComponent: async () => (await import('./features/tablet/tablet-page')).TabletPage,
  },
  {
    path: 'set-up',
    canActivate: [permissionGuard('mill.manage')],
    loadChildren: async () => (await import('./features/set-up/set-up.routes')).SET_UP_ROUTES,
  },
  {
    path: 'not-permitted',
    title: 'Not for your role',
    loadComponent: async () => (await import('./shell/not-permitted-page')).NotPermittedPage,
  },
  {
    path: '**',
    title: 'No such page',
    loadComponent: async () => (await import('./shell/not-found-page')).NotFoundPage,
  },
];
