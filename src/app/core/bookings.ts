import { HttpClient, HttpHeaders } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import {
  type Appointment,
  type BookRequest,
  type BookSeriesRequest,
  type ChangeAppointmentRequest,
  appointmentSchema,
  bookSeriesResponseSchema,
} from '@shared/contracts/schedule-contract';
import { firstValueFrom } from 'rxjs';
import { Problem } from './problem';

/** Takes and gives back places in classes, for every page that does. */
@Injectable({ providedIn: 'root' })
export class Bookings {
  readonly #http = inject(HttpClient);

  /** @throws Problem with the first reason against it */
  async book(request: BookRequest): Promise<Appointment> {
    return appointmentSchema.parse(await this.#postOnce('/api/appointments', request));
  }

  /**
   * Books every date or none.
   * @throws Problem whose `errors` name each date that failed, as `classDateIds.3`
   */
  async bookSeries(request: BookSeriesRequest): Promise<readonly Appointment[]> {
    const answer = await this.#postOnce('/api/appointments/series', request);
    return bookSeriesResponseSchema.parse(answer).items;
  }

  /** @throws Problem `illegal-transition`, `stale-version`, or another */
  async change(id: string, change: ChangeAppointmentRequest): Promise<Appointment> {
    const answer = await firstValueFrom(
      this.#http.patch<unknown>(`/api/appointments/${id}`, change),
    );
    return appointmentSchema.parse(answer);
  }

  /** When no answer came, asks once more with the same key: what was booked already is answered, not booked again. */
  async #postOnce(path: string, body: object): Promise<unknown> {
    const headers = new HttpHeaders({ 'Idempotency-Key': crypto.randomUUID() });
    const send = () => firstValueFrom(this.#http.post<unknown>(path, body, { headers }));
    try {
      return await send();
    } catch (error) {
      if (!(error instanceof Problem) || error.code !== 'unreachable') throw error;
      return await send();
    }
  }
}
