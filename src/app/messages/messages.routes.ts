import type { Routes } from '@angular/router';

/** Pages that a message leads to; whoever has its link may open them. */
export const messagesRoutes: Routes = [
  {
    path: 'unsubscribe/:token',
    title: 'Stop reminders',
    loadComponent: async () =>
      (await import('./unsubscribe-page/unsubscribe-page')).UnsubscribePage,
  },
];
