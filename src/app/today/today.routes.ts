import type { Routes } from '@angular/router';

export const todayRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./today-page/today-page')).TodayPage,
  },
];
