import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink, type Params } from '@angular/router';
import type { DeskArrival, DeskSite } from '@shared/contracts/desk-contract';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';
import { formatMoney } from '@shared/units/money';
import { Bookings } from '../../core/bookings';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords, timeOf } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { TodayClient } from '../today-client';
import {
  classesToShow,
  dueAt,
  figuresOf,
  freePlaces,
  hasBegun,
  isAtHand,
  isHere,
  missingAt,
} from './desk-day';

function viewOf(site: DeskSite, at: string) {
  return {
    ...site,
    day: dateInWords(site.localDate, 'long'),
    figures: figuresOf(site, at),
    missing: missingAt(site, at),
    due: dueAt(site),
    shown: classesToShow(site, at).map((date) => ({
      ...date,
      time: timeOf(date.startsAt, site.timeZone),
      begun: hasBegun(date, at),
      open: date.arrivals.length > 0 && isAtHand(date, at),
      free: freePlaces(date),
      here: date.arrivals.filter(isHere).length,
    })),
  };
}

/** The front desk's first minute: who comes, who is missing, what is free and due, and what came free since yesterday. */
@Component({
  selector: 'app-desk-section',
  imports: [EmptyState, Icon, MatButton, ProblemMessage, RouterLink, Skeleton, StateChip],
  templateUrl: './desk-section.html',
  styleUrl: './desk-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DeskSection {
  readonly #bookings = inject(Bookings);
  readonly #notices = inject(Notices);

  protected readonly read = inject(TodayClient).desk();
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(() => this.#refused() ?? failureOf(this.read));
  protected readonly busy = signal(false);
  protected readonly sites = computed(() => {
    const day = valueOf(this.read);
    return day?.sites.map((site) => viewOf(site, day.at));
  });

  protected readonly isHere = isHere;
  protected readonly timeOf = timeOf;
  protected readonly dateInWords = dateInWords;

  protected stateOf({ status }: DeskArrival, begun: boolean) {
    if (isHere({ status })) return { words: 'Here', tone: 'in' as const };
    if (status === 'noshow') return { words: 'Did not come', tone: 'over' as const };
    return begun
      ? { words: 'Not here yet', tone: 'due' as const }
      : { words: 'Expected', tone: 'plain' as const };
  }

  protected amountOf({ amountMinor, currency }: NonNullable<DeskArrival['due']>): string {
    return formatMoney(amountMinor, currency);
  }

  /** The class in the schedule. */
  protected inSchedule(siteId: string, localDate: string, classDateId: string): Params {
    return { site: siteId, day: localDate, class: classDateId };
  }

  protected async arrive(arrival: DeskArrival): Promise<void> {
    const version = await this.#mark(arrival.appointmentId, 'arrived', arrival.version);
    if (version === null) return;
    void this.#notices.offerUndo(
      `${arrival.displayName} is here.`,
      () => void this.#mark(arrival.appointmentId, 'booked', version),
    );
  }

  protected refresh(): void {
    this.#refused.set(null);
    this.read.reload();
  }

  /** @returns the version that it has now, null when it was refused */
  async #mark(id: string, status: AppointmentStatus, version: number): Promise<number | null> {
    if (this.busy()) return null;
    this.busy.set(true);
    this.#refused.set(null);
    try {
      const changed = await this.#bookings.change(id, { status, version });
      return changed.version;
    } catch (error) {
      this.#refused.set(toProblem(error));
      return null;
    } finally {
      this.busy.set(false);
      this.read.reload();
    }
  }
}
