import { HttpClient } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import {
  checkoutResponseSchema,
  staffChargesResponseSchema,
  type Charge,
  type StaffCharge,
} from '@shared/contracts/billing-contract';
import { undeliveredResponseSchema, type Undelivered } from '@shared/contracts/messages-contract';
import { map, type Observable } from 'rxjs';

interface Page<T> {
  readonly items: readonly T[];
  readonly nextCursor: string | null;
}

export interface ChargesAsk {
  /** Null lists every charge. */
  readonly status: Charge['status'] | null;
  readonly cursor: string | null;
}

@Injectable({ providedIn: 'root' })
export class BillingClient {
  readonly #http = inject(HttpClient);

  /** Charges of one's sites, newest first. */
  charges({ status, cursor }: ChargesAsk): Observable<Page<StaffCharge>> {
    return this.#http
      .post<unknown>('/api/billing/charges', { ...(status && { status }), cursor })
      .pipe(map((answer) => staffChargesResponseSchema.parse(answer)));
  }

  /** Messages that reached nobody, newest first. */
  undelivered(cursor: string | null): Observable<Page<Undelivered>> {
    return this.#http
      .post<unknown>('/api/messages/undelivered', { cursor })
      .pipe(map((answer) => undeliveredResponseSchema.parse(answer)));
  }

  /** The address of the pay page; the amount that was shown goes along, and another is refused. */
  checkOut({ id, amountMinor, currency }: Charge): Observable<string> {
    return this.#http
      .post<unknown>(`/api/charges/${id}/checkout`, { amountMinor, currency })
      .pipe(map((answer) => checkoutResponseSchema.parse(answer).url));
  }
}
