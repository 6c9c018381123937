import type { Routes } from '@angular/router';
import { CallsFrame } from './calls-frame';

/** Mounted at /calls. */
export const CALLS_ROUTES: Routes = [
  {
    path: '',
    component: CallsFrame,
    children: [
      { path: '', title: 'Calls', loadComponent: async () => (await import('./calls-page')).CallsPage },
      {
        path: 'ahead',
        title: 'Coming up',
        loadComponent: async () => (await import('./ahead-page')).AheadPage,
      },
      {
        path: 'loom/:loomId',
        title: 'Loom',
        loadComponent: async () => (await import('./loom-page')).LoomPage,
      },
      {
        path: 'loom/:loomId/repair',
        title: 'Repair',
        loadComponent: async () => (await import('./repair-page')).RepairPage,
      },
      {
        path: 'loom/:loomId/warp',
        title: 'Change of warp',
        loadComponent: async () => (await import('./warp-page')).WarpPage,
      },
    ],
  },
];
