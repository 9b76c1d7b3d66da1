import { HttpClient, httpResource, type HttpResourceRef } from '@angular/common/http';
import { Injectable, inject, type Signal } from '@angular/core';
import {
  chargeHistorySchema,
  checkoutResponseSchema,
  staffChargesResponseSchema,
  type Charge,
  type ChargeHistory,
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
  /** A name or a record number; '' for everybody. It travels in the body. */
  readonly q: string;
  readonly cursor: string | null;
}

@Injectable({ providedIn: 'root' })
export class BillingClient {
  readonly #http = inject(HttpClient);

  /** Charges of one's sites, newest first. */
  charges({ status, q, cursor }: ChargesAsk): Observable<Page<StaffCharge>> {
    const asked = { ...(status && { status }), ...(q !== '' && { q }), cursor };
    return this.#http
      .post<unknown>('/api/billing/charges', asked)
      .pipe(map((answer) => staffChargesResponseSchema.parse(answer)));
  }

  /** One charge with every attempt to pay it and what went back. */
  history(id: Signal<string>): HttpResourceRef<ChargeHistory | undefined> {
    return httpResource(() => `/api/billing/charges/${id()}`, {
      parse: (answer) => chargeHistorySchema.parse(answer),
    });
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
