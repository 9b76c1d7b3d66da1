import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, type Signal, inject } from '@angular/core';
import {
  type MessagePreferences,
  messagePreferencesSchema,
} from '@shared/contracts/messages-contract';
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

  preferences(id: Signal<string | undefined>): HttpResourceRef<MessagePreferences | undefined> {
    return httpResource(() => (id() === undefined ? undefined : '/api/my/message-preferences'), {
      parse: (answer) => messagePreferencesSchema.parse(answer),
    });
  }

  changePreferences(preferences: MessagePreferences): Observable<MessagePreferences> {
    return this.#http
      .put<unknown>('/api/my/message-preferences', preferences)
      .pipe(map((answer) => messagePreferencesSchema.parse(answer)));
  }

  /** @param timeZone null for that of the program's site */
  changeTimeZone(id: string, version: number, timeZone: string | null): Observable<Patient> {
    return this.#http
      .patch(`/api/patients/${id}`, { version, timeZone })
      .pipe(map((answer) => patientSchema.parse(answer)));
  }
}
