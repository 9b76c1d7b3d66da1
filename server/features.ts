import { accountsJobs } from './accounts/accounts-jobs';
import { accountsRoutes } from './accounts/accounts-routes';
import { usersRoutes } from './accounts/users-routes';
import type { AppContext } from './app-context';
import { auditJobs } from './audit/audit-jobs';
import { billingJobs } from './billing/billing-jobs';
import { billingRoutes } from './billing/billing-routes';
import { calendarRoutes } from './calendar/calendar-routes';
import { chargeForPlaces } from './billing/charge-listener';
import { auditRoutes } from './audit/audit-routes';
import type { RouteDefinition } from './http/route';
import { serviceRoutes } from './http/service-routes';
import type { JobDefinition } from './jobs/job';
import { liveRoutes } from './live/live-routes';
import { messagesJobs } from './messages/messages-jobs';
import { messagesRoutes } from './messages/messages-routes';
import { preferencesRoutes } from './messages/preferences-routes';
import { remindOfAppointments } from './messages/reminder-listener';
import type { AppointmentListener } from './schedule/appointment-events';
import { messageOfAppointments } from './schedule/appointment-messages';
import { floorRoutes } from './floor/floor-routes';
import { myRangeRoutes } from './prescriptions/my-range-routes';
import { policyRoutes } from './prescriptions/policy-routes';
import { prescriptionsRoutes } from './prescriptions/prescriptions-routes';
import { reportsRoutes } from './reports/reports-routes';
import { scheduleJobs } from './schedule/schedule-jobs';
import { scheduleRoutes } from './schedule/schedule-routes';
import { progressionRoutes } from './progression/progression-routes';
import { myProgressRoutes } from './patients/my-progress-routes';
import { patientsRoutes } from './patients/patients-routes';
import { sitesRoutes } from './settings/sites-routes';
import { deskRoutes } from './today/desk-routes';

/** Who acts when a place is taken or given back, inside that transaction and in this order. */
const appointmentListeners: readonly AppointmentListener[] = [
  messageOfAppointments,
  remindOfAppointments,
  chargeForPlaces,
];

/** Every endpoint of the product: a feature adds its own here. */
export function featureRoutes(context: AppContext): RouteDefinition[] {
  const routes: RouteDefinition[] = [
    ...serviceRoutes(() => routes),
    ...accountsRoutes(context),
    ...usersRoutes,
    ...sitesRoutes,
    ...auditRoutes,
    ...liveRoutes,
    ...policyRoutes,
    ...prescriptionsRoutes,
    ...myRangeRoutes,
    ...scheduleRoutes(appointmentListeners),
    ...floorRoutes,
    ...patientsRoutes,
    ...progressionRoutes,
    ...myProgressRoutes,
    ...billingRoutes,
    ...calendarRoutes,
    ...messagesRoutes,
    ...preferencesRoutes,
    ...reportsRoutes,
    ...deskRoutes,
  ];
  return routes;
}

/** Every job of the product. */
export const featureJobs: readonly JobDefinition[] = [
  ...accountsJobs,
  ...auditJobs,
  ...billingJobs,
  ...messagesJobs,
  ...scheduleJobs,
];
