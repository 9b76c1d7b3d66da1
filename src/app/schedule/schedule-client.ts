import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import {
  type ClassTemplate,
  type ClassTemplateChange,
  type ClassTemplates,
  type Closure,
  type ClosureRequest,
  type NewClassTemplate,
  type SavedClassTemplate,
  classTemplatesResponseSchema,
  closedResponseSchema,
  closuresResponseSchema,
  savedClassTemplateSchema,
} from '@shared/contracts/class-templates-contract';
import {
  type PatientListItem,
  type PatientSearchRequest,
  patientSchema,
  patientSearchResponseSchema,
} from '@shared/contracts/patients-contract';
import {
  type ClassAppointment,
  type PlannedDate,
  type SeriesPreviewRequest,
  classAppointmentsResponseSchema,
  seriesPreviewResponseSchema,
} from '@shared/contracts/schedule-contract';
import { firstValueFrom } from 'rxjs';
import type * as z from 'zod';

/** What of a patient's record a booking needs. */
const bookedPatientSchema = patientSchema.pick({
  id: true,
  displayName: true,
  recordNumber: true,
  birthDate: true,
  enrollments: true,
});
type BookedPatient = z.infer<typeof bookedPatientSchema>;

/** What staff read and plan; the timetable itself is core's `Timetable`, taking and giving back places its `Bookings`. */
@Injectable({ providedIn: 'root' })
export class ScheduleClient {
  readonly #http = inject(HttpClient);

  /** Who is in a class date. */
  classAppointments(
    classDateId: () => string | undefined,
  ): HttpResourceRef<readonly ClassAppointment[] | undefined> {
    return httpResource(
      () => {
        const id = classDateId();
        return id === undefined ? undefined : `/api/class-dates/${id}/appointments`;
      },
      { parse: (body) => classAppointmentsResponseSchema.parse(body).items },
    );
  }

  classTemplates(siteId: () => string | undefined): HttpResourceRef<ClassTemplates | undefined> {
    return httpResource(
      () => {
        const id = siteId();
        return id === undefined
          ? undefined
          : { url: '/api/class-templates', params: { siteId: id } };
      },
      { parse: (body) => classTemplatesResponseSchema.parse(body) },
    );
  }

  closures(
    query: () => { siteId: string; from: string } | undefined,
  ): HttpResourceRef<readonly Closure[] | undefined> {
    return httpResource(
      () => {
        const asked = query();
        return asked && { url: '/api/closures', params: asked };
      },
      { parse: (body) => closuresResponseSchema.parse(body).items },
    );
  }

  patient(id: () => string | undefined): HttpResourceRef<BookedPatient | undefined> {
    return httpResource(
      () => {
        const patientId = id();
        return patientId === undefined ? undefined : `/api/patients/${patientId}`;
      },
      { parse: (body) => bookedPatientSchema.parse(body) },
    );
  }

  /** People by name or record number; the words stay out of the address. */
  async searchPatients(request: PatientSearchRequest): Promise<readonly PatientListItem[]> {
    const answer = await firstValueFrom(this.#http.post<unknown>('/api/patients/search', request));
    return patientSearchResponseSchema.parse(answer).items;
  }

  async previewSeries(request: SeriesPreviewRequest): Promise<readonly PlannedDate[]> {
    const path = '/api/appointments/series/preview';
    const answer = await firstValueFrom(this.#http.post<unknown>(path, request));
    return seriesPreviewResponseSchema.parse(answer).items;
  }

  async addClass(given: NewClassTemplate): Promise<SavedClassTemplate> {
    const answer = await firstValueFrom(this.#http.post<unknown>('/api/class-templates', given));
    return savedClassTemplateSchema.parse(answer);
  }

  async changeClass(
    { id }: Pick<ClassTemplate, 'id'>,
    change: ClassTemplateChange,
  ): Promise<SavedClassTemplate> {
    const path = `/api/class-templates/${id}`;
    const answer = await firstValueFrom(this.#http.put<unknown>(path, change));
    return savedClassTemplateSchema.parse(answer);
  }

  /** @returns how many patients were cancelled and told */
  async closeSite(request: ClosureRequest): Promise<number> {
    const answer = await firstValueFrom(this.#http.post<unknown>('/api/closures', request));
    return closedResponseSchema.parse(answer).cancelled;
  }

  async reopenSite(closureId: string): Promise<void> {
    await firstValueFrom(this.#http.delete(`/api/closures/${closureId}`));
  }
}
