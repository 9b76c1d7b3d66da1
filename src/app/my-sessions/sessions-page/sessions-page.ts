import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import { DEFAULT_BOOKING_WINDOW } from '@shared/scheduling/booking-window';
import { addDays, localDateAt } from '@shared/scheduling/wall-time';
import { Bookings } from '../../core/bookings';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { otherZoneNote } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { isAhead } from '../bookable-days';
import { CalendarLink } from '../calendar-link/calendar-link';
import { MySessionsClient } from '../my-sessions-client';
import { cancelledWords } from '../session-card/charge-words';
import { type Cancelling, SessionCard } from '../session-card/session-card';

/** A patient's sessions to come, the next one large. */
@Component({
  selector: 'app-sessions-page',
  imports: [
    CalendarLink,
    EmptyState,
    MatButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    SessionCard,
    Skeleton,
  ],
  templateUrl: './sessions-page.html',
  styleUrl: './sessions-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SessionsPage {
  readonly #bookings = inject(Bookings);
  readonly #notices = inject(Notices);

  // A day early, so that no zone's session of today is missed.
  readonly #appointments = inject(MySessionsClient).appointments(() =>
    addDays(localDateAt(new Date(), 'UTC'), -1),
  );
  readonly #ahead = computed(() => {
    const now = new Date();
    const known = this.#appointments.hasValue() ? this.#appointments.value() : [];
    return known.filter((appointment) => isAhead(appointment, now));
  });
  protected readonly next = computed(() => this.#ahead()[0]);
  protected readonly later = computed(() => this.#ahead().slice(1));
  /** Once for each site whose clock is another than the reader's. */
  protected readonly zoneNotes = computed(() => {
    const notes = this.#ahead().map(({ site, startsAt }) =>
      otherZoneNote(site, new Date(startsAt)),
    );
    return [...new Set(notes)].filter((note) => note !== null);
  });
  protected readonly pays = computed(() => this.#ahead().some(({ charge }) => charge !== null));
  protected readonly hours = DEFAULT_BOOKING_WINDOW.lateCancellationHours;
  protected readonly loading = computed(
    () => this.problem() === null && !this.#appointments.hasValue(),
  );
  protected readonly busy = signal(false);
  /** What went wrong, and with which session; null is with one that is no longer there. */
  readonly #failed = signal<{ readonly id: string | null; readonly problem: Problem } | null>(null);
  protected readonly problem = computed(() => {
    const [failed, error] = [this.#failed(), this.#appointments.error()];
    if (failed?.id === null) return failed.problem;
    return error ? toProblem(error) : null;
  });

  protected problemOf({ id }: AppointmentItem): Problem | null {
    const failed = this.#failed();
    return failed?.id === id ? failed.problem : null;
  }

  protected async cancel(appointment: AppointmentItem, { late }: Cancelling): Promise<void> {
    const { id, version } = appointment;
    await this.#try(id, async () => {
      await this.#bookings.change(id, { status: 'cancelled', version, acceptsLate: late });
      await this.#notices.offerUndo(cancelledWords(appointment, late), () => {
        void this.#try(null, () => this.#bookAgain(appointment, late));
      });
    });
  }

  /** A charge that stayed stands for the new place; a payment that is on its way back does not. */
  async #bookAgain({ classDateId, charge }: AppointmentItem, late: boolean): Promise<void> {
    await this.#bookings.book({ classDateId });
    const anew = charge?.paid === true && !late;
    await this.#notices.say(
      anew
        ? 'You are booked again. What you paid comes back, so please pay anew under Payments.'
        : 'You are booked again.',
    );
  }

  async #try(id: string | null, work: () => Promise<unknown>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.#failed.set(null);
    try {
      await work();
    } catch (error) {
      this.#failed.set({ id, problem: toProblem(error) });
    } finally {
      this.busy.set(false);
      this.#appointments.reload();
    }
  }
}
