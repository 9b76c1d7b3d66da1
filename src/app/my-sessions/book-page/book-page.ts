import {
  ChangeDetectionStrategy,
  Component,
  Injector,
  afterNextRender,
  computed,
  inject,
  linkedSignal,
  signal,
} from '@angular/core';
import { MatButton, MatIconButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import { DEFAULT_BOOKING_WINDOW, lastPatientDate } from '@shared/scheduling/booking-window';
import { addDays, localDateAt } from '@shared/scheduling/wall-time';
import { Bookings } from '../../core/bookings';
import { Notices } from '../../core/notices';
import { toProblem } from '../../core/problem';
import { Timetable } from '../../core/timetable';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords, otherZoneNote, spanOf } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { type Own, dayStates, isBookable } from '../bookable-days';
import { ClassChoice, type Refused } from '../class-choice/class-choice';
import { MonthGrid } from '../month-grid/month-grid';
import { MySessionsClient } from '../my-sessions-client';

const firstOf = (localDate: string) => `${localDate.slice(0, 7)}-01`;
const SOONEST = 3;

/** Booking one's own session: the soonest that are free, or a day of the month. */
@Component({
  selector: 'app-book-page',
  imports: [
    ClassChoice,
    Icon,
    MatButton,
    MatIconButton,
    MonthGrid,
    PageHeader,
    ProblemMessage,
    RouterLink,
    Skeleton,
  ],
  templateUrl: './book-page.html',
  styleUrl: './book-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BookPage {
  readonly #client = inject(MySessionsClient);
  readonly #timetable = inject(Timetable);
  readonly #bookings = inject(Bookings);
  readonly #notices = inject(Notices);
  readonly #router = inject(Router);
  readonly #injector = inject(Injector);

  readonly #record = this.#client.record();
  readonly #appointments = this.#client.appointments(() =>
    addDays(localDateAt(new Date(), 'UTC'), -1),
  );
  readonly #sites = this.#timetable.sites();
  protected readonly sites = computed(() => (this.#sites.hasValue() ? this.#sites.value() : []));
  /** Where the patient goes, until they choose another. */
  readonly #siteId = linkedSignal(() =>
    this.#record.hasValue() ? this.#record.value().site.id : undefined,
  );
  protected readonly site = computed(() => this.sites().find(({ id }) => id === this.#siteId()));
  protected readonly zoneNote = computed(() => {
    const site = this.site();
    return site ? otherZoneNote(site, new Date()) : null;
  });
  readonly #today = computed(() => localDateAt(new Date(), this.site()?.timeZone ?? 'UTC'));
  readonly #lastDate = computed(() =>
    lastPatientDate(new Date(), this.site()?.timeZone ?? 'UTC', DEFAULT_BOOKING_WINDOW),
  );

  readonly #course = computed(() =>
    this.#record.hasValue()
      ? this.#record.value().enrollments.find(({ status }) => status === 'active')
      : undefined,
  );
  protected readonly own = computed<Own>(() => ({
    appointments: this.#appointments.hasValue() ? this.#appointments.value() : [],
    dailyLimit: this.#course()?.dailyLimit ?? 1,
    monitored: this.#course()?.monitored ?? true,
  }));
  /** Sessions that may still be booked; null without a course, undefined while that is not known. */
  protected readonly courseLeft = computed(() => {
    if (!this.#record.hasValue()) return undefined;
    const course = this.#course();
    return course ? course.sessionLimit - course.booked : null;
  });

  protected readonly month = linkedSignal(() => firstOf(this.#today()));
  protected readonly monthName = computed(() => dateInWords(this.month(), 'month'));
  readonly #nextMonth = computed(() => firstOf(addDays(this.month(), 31)));
  protected readonly first = computed(() => this.month() <= this.#today());
  protected readonly last = computed(() => this.#nextMonth() > this.#lastDate());
  readonly #inMonth = this.#timetable.classDates(() => {
    const site = this.site();
    return site && { siteId: site.id, from: this.month(), to: this.#nextMonth() };
  });
  readonly #dates = computed(() => (this.#inMonth.hasValue() ? this.#inMonth.value() : []));
  protected readonly days = computed(() =>
    dayStates(this.#dates(), this.own(), this.site()?.timeZone ?? 'UTC', new Date()),
  );
  protected readonly day = linkedSignal<string, string | null>({
    source: this.month,
    computation: () => null,
  });
  protected readonly dayName = computed(() => dateInWords(this.day() ?? this.#today(), 'long'));
  protected readonly onDay = computed(() =>
    this.#dates().filter(({ localDate }) => localDate === this.day()),
  );

  readonly #soon = this.#timetable.classDates(() => {
    const site = this.site();
    return site && { siteId: site.id, from: this.#today(), to: addDays(this.#today(), 14) };
  });
  protected readonly soonest = computed(() => {
    const site = this.site();
    if (!site || !this.#soon.hasValue() || !this.#appointments.hasValue()) return [];
    const now = new Date();
    return this.#soon
      .value()
      .filter(({ kind }) => kind === 'exercise')
      .filter((date) => isBookable(date, this.own(), site.timeZone, now))
      .slice(0, SOONEST);
  });

  protected readonly busy = signal(false);
  protected readonly refused = signal<Refused | null>(null);
  protected readonly problem = computed(() => {
    const failed = [this.#record, this.#appointments, this.#sites, this.#inMonth]
      .map((resource) => resource.error())
      .find((error) => error !== undefined);
    return failed ? toProblem(failed) : null;
  });

  protected chooseSite(id: string): void {
    this.#siteId.set(id);
    this.day.set(null);
  }

  protected move(months: 1 | -1): void {
    this.month.set(months === 1 ? this.#nextMonth() : firstOf(addDays(this.month(), -1)));
  }

  protected open(day: string): void {
    this.day.set(day);
    afterNextRender(() => document.getElementById('day-heading')?.focus(), {
      injector: this.#injector,
    });
  }

  protected async book(date: ClassDate): Promise<void> {
    const site = this.site();
    if (this.busy() || !site) return;
    this.busy.set(true);
    this.refused.set(null);
    try {
      await this.#bookings.book({ classDateId: date.id });
      await this.#router.navigateByUrl('/my/sessions');
      const when = `${dateInWords(date.localDate, 'long')}, ${spanOf(date, site.timeZone)}`;
      await this.#notices.say(`You are booked: ${when}.`);
    } catch (error) {
      this.refused.set({ classDateId: date.id, problem: toProblem(error) });
      for (const resource of [this.#inMonth, this.#soon, this.#appointments]) resource.reload();
    } finally {
      this.busy.set(false);
    }
  }
}
