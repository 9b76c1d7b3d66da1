import {
  bookSeriesRequestSchema,
  bookSeriesResponseSchema,
  seriesPreviewRequestSchema,
  seriesPreviewResponseSchema,
} from '@shared/contracts/schedule-contract';
import { created, ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import type { AppointmentListener } from './appointment-events';
import { presentAppointment } from './appointments-routes';
import { scheduleContext } from './schedule-context';
import { bookingRoles } from './schedule-policy';
import { bookSeries, previewSeries } from './series-service';

const preview = route({
  method: 'post',
  path: '/api/appointments/series/preview',
  summary: 'Plans a series of classes and books nothing',
  access: { roles: bookingRoles },
  patient: ({ body }) => body.patientId,
  audit: {
    action: 'series.planned',
    objectType: 'patient',
    objectId: ({ input }) => input.body.patientId,
    patientId: ({ input }) => input.body.patientId,
  },
  request: { body: seriesPreviewRequestSchema },
  response: { 200: seriesPreviewResponseSchema },
  handler: async (call) => {
    const planned = await previewSeries(call.tx, scheduleContext(call, []), call.input.body);
    if (planned === null) return fail('not-found');
    const items = planned.map(({ startsAt, alternatives, ...date }) => ({
      ...date,
      startsAt: startsAt.toISOString(),
      alternatives: alternatives.map((other) => ({
        ...other,
        startsAt: other.startsAt.toISOString(),
      })),
    }));
    return ok({ items });
  },
});

const book = (listeners: readonly AppointmentListener[]) =>
  route({
    method: 'post',
    path: '/api/appointments/series',
    summary: 'Books every class date of a series or none',
    access: { roles: bookingRoles },
    patient: ({ body }) => body.patientId,
    audit: {
      action: 'series.booked',
      objectType: 'patient',
      objectId: ({ input }) => input.body.patientId,
      patientId: ({ input }) => input.body.patientId,
      details: ({ result }) => ({ appointments: result.body.items.map(({ id }) => id) }),
    },
    request: { body: bookSeriesRequestSchema },
    response: { 201: bookSeriesResponseSchema },
    idempotent: true,
    handler: async (call) => {
      const booked = await bookSeries(call.tx, scheduleContext(call, listeners), call.input.body);
      if (booked instanceof Failure) return booked;
      return created({ items: booked.map(presentAppointment) });
    },
  });

export const seriesRoutes = (listeners: readonly AppointmentListener[]): RouteDefinition[] => [
  preview,
  book(listeners),
];
