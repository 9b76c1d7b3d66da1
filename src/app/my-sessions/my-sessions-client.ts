import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import {
  type CalendarState,
  calendarLinkSchema,
  calendarStateSchema,
} from '@shared/contracts/calendar-contract';
import { patientSchema } from '@shared/contracts/patients-contract';
import {
  type AppointmentItem,
  appointmentsResponseSchema,
} from '@shared/contracts/schedule-contract';
import { firstValueFrom } from 'rxjs';
import type * as z from 'zod';
import { Session } from '../core/session';

/** What of their own record a patient's booking needs. */
const ownRecordSchema = patientSchema.pick({ site: true, enrollments: true });
type OwnRecord = z.infer<typeof ownRecordSchema>;

/** A patient's own appointments and record. Resources need an injection context. */
@Injectable({ providedIn: 'root' })
export class MySessionsClient {
  readonly #session = inject(Session);
  readonly #http = inject(HttpClient);

  /** Earliest first. @param from local date, inclusive */
  appointments(from: () => string): HttpResourceRef<readonly AppointmentItem[] | undefined> {
    return httpResource(
      () => ({ url: '/api/appointments', params: { from: from(), limit: 100 } }),
      { parse: (body) => appointmentsResponseSchema.parse(body).items },
    );
  }

  calendar(): HttpResourceRef<CalendarState | undefined> {
    return httpResource(() => '/api/my/calendar-link', {
      parse: (body) => calendarStateSchema.parse(body),
    });
  }

  /** Makes the address of the own calendar, and ends the former. */
  async renewCalendar(): Promise<string> {
    const answer = await firstValueFrom(this.#http.post<unknown>('/api/my/calendar-link', null));
    return calendarLinkSchema.parse(answer).url;
  }

  record(): HttpResourceRef<OwnRecord | undefined> {
    return httpResource(
      () => {
        const id = this.#session.user()?.patientId;
        return id ? `/api/patients/${id}` : undefined;
      },
      { parse: (body) => ownRecordSchema.parse(body) },
    );
  }
}
