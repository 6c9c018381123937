import type { Routes } from '@angular/router';

export const routes: Routes = [
  { path: '**', loadComponent: async () => (await import('./shell/not-found-page')).NotFoundPage },
];
