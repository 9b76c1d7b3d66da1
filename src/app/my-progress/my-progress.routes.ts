import type { Routes } from '@angular/router';

export const myProgressRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./progress-page/progress-page')).ProgressPage,
  },
];
