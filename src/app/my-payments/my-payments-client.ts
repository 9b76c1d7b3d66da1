import { HttpClient } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import {
  chargeSchema,
  chargesResponseSchema,
  checkoutResponseSchema,
  type Charge,
} from '@shared/contracts/billing-contract';
import { map, type Observable } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class MyPaymentsClient {
  readonly #http = inject(HttpClient);

  /** One's own charges, newest first. */
  list(): Observable<readonly Charge[]> {
    return this.#http
      .get<unknown>('/api/charges')
      .pipe(map((answer) => chargesResponseSchema.parse(answer).items));
  }

  read(id: string): Observable<Charge> {
    return this.#http
      .get<unknown>(`/api/charges/${id}`)
      .pipe(map((answer) => chargeSchema.parse(answer)));
  }

  /** The address of the pay page; the amount that was shown goes along, and another is refused. */
  checkOut({ id, amountMinor, currency }: Charge): Observable<string> {
    return this.#http
      .post<unknown>(`/api/charges/${id}/checkout`, { amountMinor, currency })
      .pipe(map((answer) => checkoutResponseSchema.parse(answer).url));
  }
}
