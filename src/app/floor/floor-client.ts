import { HttpClient } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import {
  type AmendmentRequest,
  type BeginRecordRequest,
  type Reading,
  type ReadingRequest,
  type Roster,
  type SessionRecord,
  readingSchema,
  rosterResponseSchema,
  rosterStampSchema,
  sessionRecordSchema,
} from '@shared/contracts/floor-contract';
import { type Bout, type BoutRequest, boutSchema } from '@shared/contracts/progression-contract';
import { firstValueFrom } from 'rxjs';

/** Calls of the floor; each throws Problem when it fails. */
@Injectable({ providedIn: 'root' })
export class FloorClient {
  readonly #http = inject(HttpClient);

  async roster(classDateId: string): Promise<Roster> {
    const answer = this.#http.get<unknown>(`/api/class-dates/${classDateId}/roster`);
    return rosterResponseSchema.parse(await firstValueFrom(answer));
  }

  async stamp(classDateId: string): Promise<string> {
    const answer = this.#http.get<unknown>(`/api/class-dates/${classDateId}/roster/stamp`);
    return rosterStampSchema.parse(await firstValueFrom(answer)).stamp;
  }

  async beginRecord(id: string, body: BeginRecordRequest): Promise<SessionRecord> {
    const answer = this.#http.put<unknown>(`/api/session-records/${id}`, body);
    return sessionRecordSchema.parse(await firstValueFrom(answer));
  }

  async record(id: string, body: ReadingRequest): Promise<Reading> {
    const answer = this.#http.put<unknown>(`/api/vital-signs/${id}`, body);
    return readingSchema.parse(await firstValueFrom(answer));
  }

  async work(id: string, body: BoutRequest): Promise<Bout> {
    const answer = this.#http.put<unknown>(`/api/exercise-bouts/${id}`, body);
    return boutSchema.parse(await firstValueFrom(answer));
  }

  async amend(originalId: string, body: AmendmentRequest): Promise<Reading> {
    const answer = this.#http.post<unknown>(`/api/vital-signs/${originalId}/amendments`, body);
    return readingSchema.parse(await firstValueFrom(answer));
  }

  async missedDose(appointmentId: string, missed: boolean): Promise<void> {
    const answer = this.#http.put(`/api/appointments/${appointmentId}/missed-dose`, { missed });
    await firstValueFrom(answer);
  }

  async sign(recordId: string, exercised: boolean): Promise<SessionRecord> {
    const answer = this.#http.post<unknown>(`/api/session-records/${recordId}/sign`, { exercised });
    return sessionRecordSchema.parse(await firstValueFrom(answer));
  }
}
