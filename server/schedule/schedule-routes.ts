import type { RouteDefinition } from '../http/route';
import type { AppointmentListener } from './appointment-events';
import { appointmentsRoutes } from './appointments-routes';
import { classDatesRoutes } from './class-dates-routes';
import { classTemplatesRoutes } from './class-templates-routes';
import { closuresRoutes } from './closures-routes';
import { seriesRoutes } from './series-routes';

/** @param listeners the features that act when a place is taken or given back, in the order in which they are told */
export const scheduleRoutes = (listeners: readonly AppointmentListener[]): RouteDefinition[] => [
  ...classDatesRoutes,
  ...seriesRoutes(listeners),
  ...appointmentsRoutes(listeners),
  ...classTemplatesRoutes,
  ...closuresRoutes(listeners),
];
