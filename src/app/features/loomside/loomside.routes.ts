import type { Routes } from '@angular/router';

/** Mounted at /loomside. */
export const LOOMSIDE_ROUTES: Routes = [
  {
    path: '',
    title: 'My looms',
    loadComponent: async () => (await import('./loomside-page')).LoomsidePage,
  },
  {
    path: 'take-over',
    title: 'Take over',
    loadComponent: async () => (await import('./take-over-page')).TakeOverPage,
  },
  {
    path: 'hand-over',
    title: 'Hand over',
    loadComponent: async () => (await import('./hand-over-page')).HandOverPage,
  },
  {
    path: ':loomId',
    title: 'Loom',
    loadComponent: async () => (await import('./loom-entries-page')).LoomEntriesPage,
  },
];
