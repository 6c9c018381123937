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
    path: 'my-shift',
    title: 'My shift',
    loadComponent: async () => (await import('./my-shift-page')).MyShiftPage,
  },
  {
    path: 'my-picks',
    title: 'My picks',
    loadComponent: async () => (await import('./my-picks-page')).MyPicksPage,
  },
  {
    path: 'find',
    title: 'Find a loom',
    loadComponent: async () => (await import('./find-loom-page')).FindLoomPage,
  },
  {
    path: 'loom/:number',
    title: 'Loom',
    loadComponent: async () => (await import('./one-loom-page')).OneLoomPage,
  },
  {
    path: ':loomId',
    title: 'Loom',
    loadComponent: async () => (await import('./loom-entries-page')).LoomEntriesPage,
  },
];
