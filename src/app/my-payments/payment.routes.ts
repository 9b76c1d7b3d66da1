import type { Routes } from '@angular/router';
import { allow } from '../core/access-guard';

/** Where the payment service leads back to, for patients and for the desk. */
export const paymentRoutes: Routes = [
  {
    path: 'payments/:chargeId',
    title: 'Payment',
    canMatch: [allow({ roles: ['patient', 'front-desk', 'director'] })],
    loadComponent: async () => (await import('./payment-page/payment-page')).PaymentPage,
  },
];
