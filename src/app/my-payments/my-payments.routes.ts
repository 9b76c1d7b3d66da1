import type { Routes } from '@angular/router';

export const myPaymentsRoutes: Routes = [
  {
    path: '',
    loadComponent: async () => (await import('./payments-page/payments-page')).PaymentsPage,
  },
];
