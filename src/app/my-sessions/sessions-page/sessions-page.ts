import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import { addDays, localDateAt } from '@shared/scheduling/wall-time';
import { Bookings } from '../../core/bookings';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { isAhead } from '../bookable-days';
import { MySessionsClient } from '../my-sessions-client';
import { SessionCard } from '../session-card/session-card';

/** A patient's sessions to come, the next one large. */
@Component({
  selector: 'app-sessions-page',
  imports: [EmptyState, MatButton, PageHeader, ProblemMessage, RouterLink, SessionCard, Skeleton],
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

  protected async cancel(appointment: AppointmentItem): Promise<void> {
    const { id, version, localDate, classDateId } = appointment;
    await this.#try(id, async () => {
      await this.#bookings.change(id, { status: 'cancelled', version });
      await this.#notices.offerUndo(`Cancelled: ${dateInWords(localDate, 'long')}.`, () => {
        void this.#try(null, () => this.#bookings.book({ classDateId }));
      });
    });
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
