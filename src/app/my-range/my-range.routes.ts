import type { Routes } from '@angular/router';

export const myRangeRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./my-range-page/my-range-page')).MyRangePage,
  },
];
