import { DOCUMENT, Injectable, computed, inject, signal } from '@angular/core';
import { localDateAt } from '@shared/scheduling/wall-time';
import { toProblem } from '../core/problem';
import { Timetable } from '../core/timetable';

const key = 'plimsoll.schedule.site';

/** The site whose classes the pages of the schedule show; the choice stays on this device. */
@Injectable()
export class SiteChoice {
  readonly #storage = inject(DOCUMENT).defaultView?.localStorage;
  readonly #sites = inject(Timetable).sites();
  readonly #chosen = signal(this.#storage?.getItem(key) ?? null);

  readonly sites = computed(() => (this.#sites.hasValue() ? this.#sites.value() : []));
  readonly loading = computed(() => this.#sites.isLoading());
  readonly problem = computed(() => {
    const error = this.#sites.error();
    return error ? toProblem(error) : null;
  });

  /** The chosen site, else the first; undefined before the list is there. */
  readonly site = computed(
    () => this.sites().find(({ id }) => id === this.#chosen()) ?? this.sites()[0],
  );

  /** Today's date at the site, as of now. */
  readonly today = computed(() => localDateAt(new Date(), this.site()?.timeZone ?? 'UTC'));

  choose(id: string): void {
    this.#chosen.set(id);
    this.#storage?.setItem(key, id);
  }
}
