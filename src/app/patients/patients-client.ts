import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, type Signal, inject } from '@angular/core';
import {
  type ChangeEnrollmentRequest,
  type ChangePatientRequest,
  type Enrollment,
  type OpenEnrollmentRequest,
  type Patient,
  type PatientSearchRequest,
  type PatientSearchResponse,
  type RegisterPatientRequest,
  enrollmentSchema,
  patientSchema,
  patientSearchResponseSchema,
} from '@shared/contracts/patients-contract';
import {
  type Prescription,
  prescriptionListSchema,
} from '@shared/contracts/prescription-record-contract';
import {
  type CourseSoFar,
  type DecisionRequest,
  type Proposal,
  courseSoFarSchema,
  proposalSchema,
} from '@shared/contracts/progression-contract';
import {
  type NewRecordEntryInput,
  type PatientRecord,
  type RecordKind,
  recordBatchResponseSchema,
  recordEntrySchema,
  recordResponseSchema,
} from '@shared/contracts/record-contract';
import {
  type AppointmentItem,
  appointmentsResponseSchema,
} from '@shared/contracts/schedule-contract';
import { type Site, sitesResponseSchema } from '@shared/contracts/sites-contract';
import {
  type VitalsHistory,
  vitalsHistoryResponseSchema,
} from '@shared/contracts/vitals-history-contract';
import { type Observable, map } from 'rxjs';

/** A session is a table of its own: some fill a screen or two. */
const sessionsAPage = 8;

@Injectable({ providedIn: 'root' })
export class PatientsClient {
  readonly #http = inject(HttpClient);

  /** A page of the list; names travel in the body. */
  search(request: PatientSearchRequest): Observable<PatientSearchResponse> {
    return this.#http
      .post('/api/patients/search', request)
      .pipe(map((answer) => patientSearchResponseSchema.parse(answer)));
  }

  /** Read when there is an id, and again when it changes. */
  patient(id: Signal<string | undefined>): HttpResourceRef<Patient | undefined> {
    return httpResource(() => (id() === undefined ? undefined : `/api/patients/${id()}`), {
      parse: (answer) => patientSchema.parse(answer),
    });
  }

  courseSoFar(id: Signal<string | undefined>): HttpResourceRef<CourseSoFar | undefined> {
    return httpResource(() => id() && `/api/patients/${id()}/course-so-far`, {
      parse: (answer) => courseSoFarSchema.parse(answer),
    });
  }

  /** Decides on the next step; once. */
  decide(proposalId: string, request: DecisionRequest): Observable<Proposal> {
    return this.#http
      .post(`/api/progression-proposals/${proposalId}/decision`, request)
      .pipe(map((answer) => proposalSchema.parse(answer)));
  }

  record(id: Signal<string | undefined>): HttpResourceRef<PatientRecord | undefined> {
    return httpResource(() => (id() === undefined ? undefined : `/api/patients/${id()}/record`), {
      parse: (answer) => recordResponseSchema.parse(answer),
    });
  }

  sites(): HttpResourceRef<Site[] | undefined> {
    return httpResource(() => '/api/sites', {
      parse: (answer) => sitesResponseSchema.parse(answer).items,
    });
  }

  register(request: RegisterPatientRequest): Observable<Patient> {
    return this.#http
      .post('/api/patients', request)
      .pipe(map((answer) => patientSchema.parse(answer)));
  }

  change(id: string, request: ChangePatientRequest): Observable<Patient> {
    return this.#http
      .patch(`/api/patients/${id}`, request)
      .pipe(map((answer) => patientSchema.parse(answer)));
  }

  invite(id: string): Observable<unknown> {
    return this.#http.post(`/api/patients/${id}/invitation`, null);
  }

  openEnrollment(id: string, request: OpenEnrollmentRequest): Observable<Enrollment> {
    return this.#http
      .post(`/api/patients/${id}/enrollments`, request)
      .pipe(map((answer) => enrollmentSchema.parse(answer)));
  }

  changeEnrollment(
    id: string,
    enrollmentId: string,
    request: ChangeEnrollmentRequest,
  ): Observable<Enrollment> {
    return this.#http
      .patch(`/api/patients/${id}/enrollments/${enrollmentId}`, request)
      .pipe(map((answer) => enrollmentSchema.parse(answer)));
  }

  /** Adds entries, all or none; with ids made here, sending again enters nothing twice. */
  addEntries(id: string, entries: NewRecordEntryInput[]): Observable<{ id: string }[]> {
    return this.#http
      .post(`/api/patients/${id}/record`, { entries })
      .pipe(map((answer) => recordBatchResponseSchema.parse(answer).entries));
  }

  enterInError(id: string, kind: RecordKind, entryId: string): Observable<unknown> {
    return this.#http.post(`/api/patients/${id}/record/${kind}/${entryId}/entered-in-error`, null);
  }

  /** @param stoppedOn null takes a stop back */
  stopMedication(id: string, entryId: string, stoppedOn: string | null): Observable<unknown> {
    return this.#http
      .post(`/api/patients/${id}/record/medications/${entryId}/stop`, { stoppedOn })
      .pipe(map((answer) => recordEntrySchema.parse(answer)));
  }

  retireThreshold(id: string, entryId: string, reason: string): Observable<unknown> {
    return this.#http.post(`/api/patients/${id}/record/thresholds/${entryId}/retire`, { reason });
  }

  /** @param path the entry and what is done to it, as `restrictions/:id/lift` */
  endEntry(id: string, path: string, body: object): Observable<unknown> {
    return this.#http
      .post(`/api/patients/${id}/record/${path}`, body)
      .pipe(map((answer) => recordEntrySchema.parse(answer)));
  }

  prescriptions(id: Signal<string | undefined>): HttpResourceRef<Prescription[] | undefined> {
    return httpResource(
      () => (id() === undefined ? undefined : `/api/patients/${id()}/prescriptions`),
      { parse: (answer) => prescriptionListSchema.parse(answer).items },
    );
  }

  vitals(id: string, cursor: string | null): Observable<VitalsHistory> {
    return this.#http
      .get(`/api/patients/${id}/vital-signs`, {
        params: { limit: sessionsAPage, ...(cursor !== null && { cursor }) },
      })
      .pipe(map((answer) => vitalsHistoryResponseSchema.parse(answer)));
  }

  appointments(
    id: string,
    cursor: string | null,
  ): Observable<{ items: AppointmentItem[]; nextCursor: string | null }> {
    const params = { patientId: id, order: 'latest-first', ...(cursor !== null && { cursor }) };
    return this.#http
      .get('/api/appointments', { params })
      .pipe(map((answer) => appointmentsResponseSchema.parse(answer)));
  }
}
