import type { Route, Routes } from '@angular/router';
import { SetUpStore } from './common/set-up-store';
import { Unsaved, leaveGuard } from './common/unsaved';

/** A room: nobody leaves it with something typed and not saved unless they say so. */
const room = (path: string, title: string, loadComponent: NonNullable<Route['loadComponent']>): Route => ({
  path,
  title,
  canDeactivate: [leaveGuard],
  loadComponent,
});

/** Everything that a manager says of the mill: a frame, and a room a line (`rooms.ts` lists them for people). */
export const SET_UP_ROUTES: Routes = [
  {
    path: '',
    providers: [SetUpStore, Unsaved],
    loadComponent: async () => (await import('./set-up-page')).SetUpPage,
    children: [
      {
        path: '',
        pathMatch: 'full',
        title: 'Set-up',
        loadComponent: async () => (await import('./overview-page')).OverviewPage,
      },
      room('looms', 'Sheds and looms', async () => (await import('./looms/looms-page')).LoomsPage),
    ],
  },
];
