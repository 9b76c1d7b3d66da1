import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, type Signal, inject } from '@angular/core';
import {
  type Prescription,
  prescriptionListSchema,
  prescriptionSchema,
} from '@shared/contracts/prescription-record-contract';
import type { PrescriptionRequest } from '@shared/clinical/prescribing';
import {
  type Worksheet,
  worksheetSchema,
} from '@shared/contracts/prescriptions-worksheet-contract';
import { type Observable, map } from 'rxjs';

/** Which prescription, as its caller has seen it. */
export interface Seen {
  readonly id: string;
  readonly version: number;
}

const parsed = (answer: unknown): Prescription => prescriptionSchema.parse(answer);

@Injectable({ providedIn: 'root' })
export class PrescriptionsClient {
  readonly #http = inject(HttpClient);

  /** Read when there is an id, and again when it changes. */
  worksheet(patientId: Signal<string | undefined>): HttpResourceRef<Worksheet | undefined> {
    return httpResource(() => patientId() && `/api/patients/${patientId()}/worksheet`, {
      parse: (answer) => worksheetSchema.parse(answer),
    });
  }

  worksheetNow(patientId: string): Observable<Worksheet> {
    return this.#http
      .get(`/api/patients/${patientId}/worksheet`)
      .pipe(map((answer) => worksheetSchema.parse(answer)));
  }

  prescription(id: Signal<string | undefined>): HttpResourceRef<Prescription | undefined> {
    return httpResource(() => id() && `/api/prescriptions/${id()}`, { parse: parsed });
  }

  history(patientId: Signal<string | undefined>): HttpResourceRef<Prescription[] | undefined> {
    return httpResource(() => patientId() && `/api/patients/${patientId()}/prescriptions`, {
      parse: (answer) => prescriptionListSchema.parse(answer).items,
    });
  }

  draft(patientId: string, inputs: PrescriptionRequest): Observable<Prescription> {
    return this.#http
      .post(`/api/patients/${patientId}/prescriptions`, { inputs })
      .pipe(map(parsed));
  }

  change({ id, version }: Seen, inputs: PrescriptionRequest): Observable<Prescription> {
    return this.#http.put(`/api/prescriptions/${id}`, { inputs, version }).pipe(map(parsed));
  }

  sign({ id, version }: Seen): Observable<Prescription> {
    return this.#http.post(`/api/prescriptions/${id}/sign`, { version }).pipe(map(parsed));
  }

  putAside({ id, version }: Seen): Observable<Prescription> {
    return this.#http.post(`/api/prescriptions/${id}/revoke`, { version }).pipe(map(parsed));
  }
}
