import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, type Signal, inject } from '@angular/core';
import { type Patient, patientSchema } from '@shared/contracts/patients-contract';
import { type Observable, map } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class MyDetailsClient {
  readonly #http = inject(HttpClient);

  /** The signed-in patient's own record, without what only staff read. */
  details(id: Signal<string | undefined>): HttpResourceRef<Patient | undefined> {
    return httpResource(() => (id() === undefined ? undefined : `/api/patients/${id()}`), {
      parse: (answer) => patientSchema.parse(answer),
    });
  }

  /** @param timeZone null for that of the program's site */
  changeTimeZone(id: string, version: number, timeZone: string | null): Observable<Patient> {
    return this.#http
      .patch(`/api/patients/${id}`, { version, timeZone })
      .pipe(map((answer) => patientSchema.parse(answer)));
  }
}
