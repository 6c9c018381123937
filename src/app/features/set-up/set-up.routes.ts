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
      room('labels', 'Labels for looms', async () => (await import('./labels/labels-page')).LabelsPage),
      room('people', 'People', async () => (await import('./people/people-page')).PeoplePage),
      room('people/slips', 'PIN slips', async () => (await import('./people/slips-page')).SlipsPage),
      room('people/:id', 'Person', async () => (await import('./people/person-page')).PersonPage),
      room('tablets', 'Tablets', async () => (await import('./tablets/tablets-page')).TabletsPage),
      room('mail', 'Mail', async () => (await import('./mail/mail-page')).MailPage),
      room('mail/letters/:id', 'Letter', async () => (await import('./mail/letter-page')).LetterPage),
      room('figures', 'Mill and figures', async () => (await import('./mill/mill-page')).MillPage),
      room('changes', 'Change record', async () => (await import('./changes/changes-page')).ChangesPage),
      room('cloths', 'Cloths', async () => (await import('./cloths/cloths-page')).ClothsPage),
      room('cloths/:id', 'Cloth', async () => (await import('./cloths/cloth-page')).ClothPage),
      room('beams', 'Beams', async () => (await import('./beams/beams-page')).BeamsPage),
      room('beams/:id', 'Beam', async () => (await import('./beams/beam-page')).BeamPage),
      room('causes', 'Causes of stops', async () => (await import('./causes/causes-page')).CausesPage),
      room('causes/:id', 'Cause', async () => (await import('./causes/cause-page')).CausePage),
      room('targets', 'Targets', async () => (await import('./targets/targets-page')).TargetsPage),
      room(
        'targets/:id',
        'Targets of a cloth',
        async () => (await import('./targets/target-page')).TargetPage,
      ),
      room('shifts', 'Shift patterns', async () => (await import('./shifts/patterns-page')).PatternsPage),
      room('shifts/:id', 'Shift pattern', async () => (await import('./shifts/pattern-page')).PatternPage),
      room('calendar', 'Calendar', async () => (await import('./calendar/calendar-page')).CalendarPage),
      room('parts-and-jobs', 'Parts and jobs', async () => {
        const { PartsAndJobsPage } = await import('./parts-and-jobs/parts-and-jobs-page');
        return PartsAndJobsPage;
      }),
    ],
  },
];
