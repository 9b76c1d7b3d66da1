import type { Routes } from '@angular/router';

export const billingRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./charges-page/charges-page')).ChargesPage,
  },
  {
    path: 'charges/:id',
    title: 'Charge',
    loadComponent: async () => (await import('./charge-page/charge-page')).ChargePage,
  },
  {
    path: 'messages',
    title: 'Messages that did not arrive',
    loadComponent: async () => (await import('./messages-page/messages-page')).MessagesPage,
  },
];
