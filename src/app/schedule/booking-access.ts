import { Injectable, computed, inject } from '@angular/core';
import type { Role } from '@shared/contracts/accounts-contract';
import { Session } from '../core/session';

const bookingRoles: readonly Role[] = ['front-desk', 'nurse', 'exercise-physiologist'];
const planningRoles: readonly Role[] = ['front-desk', 'administrator'];

/** What the signed-in person is offered; the server decides again on every call. */
@Injectable({ providedIn: 'root' })
export class BookingAccess {
  readonly #roles = inject(Session).roles;
  readonly mayBook = computed(() => this.#roles().some((role) => bookingRoles.includes(role)));
  readonly maySeeRoster = computed(() => this.mayBook() || this.#roles().includes('physician'));
  readonly mayPlan = computed(() => this.#roles().some((role) => planningRoles.includes(role)));
}
