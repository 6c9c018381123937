import type { Routes } from '@angular/router';

/** One shift: its sheet, a loom line with its record, what is held, closing. */
export const SHIFT_BOOK_ROUTES: Routes = [
  {
    path: '',
    pathMatch: 'full',
    title: 'Shift book',
    loadComponent: async () => (await import('./shift-book-page')).ShiftBookPage,
  },
  {
    path: ':key',
    pathMatch: 'full',
    title: 'Shift sheet',
    loadComponent: async () => (await import('./shift-sheet-page')).ShiftSheetPage,
  },
  {
    path: ':key/loom/:loomId',
    title: 'Loom line',
    loadComponent: async () => (await import('./loom-line-page')).LoomLinePage,
  },
  {
    path: ':key/held',
    title: 'Held entries',
    loadComponent: async () => (await import('./held-page')).HeldPage,
  },
  {
    path: ':key/handover',
    title: 'Handover',
    loadComponent: async () => (await import('./handover/handover-page')).HandoverPage,
  },
  {
    path: ':key/weavers',
    title: 'Weavers to looms',
    loadComponent: async () => (await import('./weavers/weavers-page')).WeaversPage,
  },
  {
    path: ':key/paper',
    title: 'From paper',
    loadComponent: async () => (await import('./paper/paper-page')).PaperPage,
  },
  {
    path: ':key/cards',
    title: 'Blank log cards',
    loadComponent: async () => (await import('./paper/log-cards-page')).LogCardsPage,
  },
  {
    path: ':key/close',
    title: 'Close the shift',
    loadComponent: async () => (await import('./close-page')).ClosePage,
  },
];
