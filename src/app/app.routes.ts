import type { LoadChildrenCallback, Route, Routes } from '@angular/router';
import type { Role } from '@shared/contracts/accounts-contract';
import { accountsRoutes } from './accounts/accounts.routes';
import { allow, landing } from './core/access-guard';
import { type AreaPath, areaOf, staff } from './core/navigation';
import { messagesRoutes } from './messages/messages.routes';
import { paymentRoutes } from './my-payments/payment.routes';

/** Who works out and reads ranges; the server decides again on every call. */
const prescribingRoles: readonly Role[] = ['exercise-physiologist', 'physician', 'nurse'];

/** The lazy routes of an area, open to the roles that navigation.ts names; the rail shows it from then on. */
export function area(path: AreaPath, loadChildren: LoadChildrenCallback): Route {
  const { label, roles } = areaOf(path);
  return { path, title: label, canMatch: [allow({ roles })], loadChildren };
}

export const routes: Routes = [
  { path: '', pathMatch: 'full', redirectTo: landing },
  ...accountsRoutes,
  {
    path: 'patients/:patientId/prescriptions',
    canMatch: [allow({ roles: prescribingRoles })],
    loadChildren: async () =>
      (await import('./prescriptions/prescriptions.routes')).newPrescriptionRoutes,
  },
  {
    path: 'prescriptions',
    canMatch: [allow({ roles: prescribingRoles })],
    loadChildren: async () =>
      (await import('./prescriptions/prescriptions.routes')).prescriptionRoutes,
  },
  area('today', async () => (await import('./today/today.routes')).todayRoutes),
  area('my/range', async () => (await import('./my-range/my-range.routes')).myRangeRoutes),
  area(
    'my/progress',
    async () => (await import('./my-progress/my-progress.routes')).myProgressRoutes,
  ),
  area('schedule', async () => (await import('./schedule/schedule.routes')).scheduleRoutes),
  area(
    'my/sessions',
    async () => (await import('./my-sessions/my-sessions.routes')).mySessionsRoutes,
  ),
  area('floor', async () => (await import('./floor/floor.routes')).floorRoutes),
  area('reports', async () => (await import('./reports/reports.routes')).reportsRoutes),
  area('patients', async () => (await import('./patients/patients.routes')).patientsRoutes),
  area('my/details', async () => (await import('./my-details/my-details.routes')).myDetailsRoutes),
  area('billing', async () => (await import('./billing/billing.routes')).billingRoutes),
  area(
    'my/payments',
    async () => (await import('./my-payments/my-payments.routes')).myPaymentsRoutes,
  ),
  ...paymentRoutes,
  ...messagesRoutes,
  area('settings', async () => (await import('./settings/settings.routes')).settingsRoutes),
  {
    path: 'api-reference',
    title: 'API reference',
    canMatch: [allow({ roles: staff })],
    loadComponent: async () => (await import('./settings/api-page/api-page')).ApiPage,
  },
  {
    path: 'not-allowed',
    title: 'Not allowed',
    loadComponent: async () => (await import('./core/refusals/not-allowed-page')).NotAllowedPage,
  },
  {
    path: '**',
    title: 'Not found',
    loadComponent: async () => (await import('./core/refusals/not-found-page')).NotFoundPage,
  },
];
