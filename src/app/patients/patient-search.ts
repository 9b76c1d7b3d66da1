import { Injectable, inject } from '@angular/core';
import { Session } from '../core/session';

/** What was searched for last, so that the list stands as it was left; another person starts anew. */
@Injectable({ providedIn: 'root' })
export class PatientSearch {
  readonly #session = inject(Session);
  #kept: { userId: string; query: string } | null = null;

  get query(): string {
    return this.#kept?.userId === this.#session.user()?.id ? (this.#kept?.query ?? '') : '';
  }

  set query(query: string) {
    const userId = this.#session.user()?.id;
    this.#kept = userId === undefined ? null : { userId, query };
  }
}
