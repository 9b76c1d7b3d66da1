import { Injectable, computed, inject } from '@angular/core';
import type { Role } from '@shared/contracts/accounts-contract';
import { Session } from '../core/session';

const chartRoles: readonly Role[] = ['nurse', 'exercise-physiologist', 'physician'];

/** What the signed-in person may do on these pages, to show no dead ends; the server decides again. */
@Injectable({ providedIn: 'root' })
export class PatientAccess {
  readonly #session = inject(Session);

  /** Reads and writes the chart, opens and ends courses. */
  readonly chart = computed(() => this.#holds(chartRoles));
  readonly registrar = computed(() => this.#holds([...chartRoles, 'front-desk', 'administrator']));
  readonly physician = computed(() => this.#holds(['physician']));

  #holds(roles: readonly Role[]): boolean {
    return this.#session.roles().some((role) => roles.includes(role));
  }
}
