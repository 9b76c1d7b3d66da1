import type { Routes } from '@angular/router';

export const mySessionsRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./sessions-page/sessions-page')).SessionsPage,
  },
  {
    path: 'book',
    title: 'Book a session',
    loadComponent: async () => (await import('./book-page/book-page')).BookPage,
  },
];
