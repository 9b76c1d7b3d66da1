import type { Routes } from '@angular/router';

export const myDetailsRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./my-details-page/my-details-page')).MyDetailsPage,
  },
];
