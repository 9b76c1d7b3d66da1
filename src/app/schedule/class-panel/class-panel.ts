import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { PatientListItem } from '@shared/contracts/patients-contract';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import type { Site } from '@shared/contracts/sites-contract';
import { isUndoable } from '@shared/scheduling/booking-window';
import { formatMoney } from '@shared/units/money';
import { Bookings } from '../../core/bookings';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { clockOf, dateInWords, spanOf } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { BookingAccess } from '../booking-access';
import { classState, monitorsInWords, placesInWords } from '../class-words';
import { PatientSearch } from '../patient-search/patient-search';
import { type RosterAction, RosterRow } from '../roster-row/roster-row';
import { ScheduleClient } from '../schedule-client';
import { nextWithRoom } from './next-with-room';

/** One class date: who is in it, and taking and giving back places. */
@Component({
  selector: 'app-class-panel',
  imports: [EmptyState, MatButton, PatientSearch, ProblemMessage, RosterRow, Skeleton, StateChip],
  templateUrl: './class-panel.html',
  styleUrl: './class-panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ClassPanel {
  readonly #bookings = inject(Bookings);
  readonly #notices = inject(Notices);
  protected readonly access = inject(BookingAccess);

  readonly date = input.required<ClassDate>();
  readonly site = input.required<Site>();
  /** The classes that are at hand, among which another with a place is looked for. */
  readonly others = input.required<readonly ClassDate[]>();
  /** Places changed: the numbers of the week are old. */
  readonly changed = output();
  readonly chosen = output<string>();
  readonly closed = output();

  readonly #roster = inject(ScheduleClient).classAppointments(() =>
    this.access.maySeeRoster() ? this.date().id : undefined,
  );
  protected readonly loading = computed(() => this.#roster.isLoading() && !this.#roster.hasValue());
  readonly #appointments = computed(() => (this.#roster.hasValue() ? this.#roster.value() : []));
  protected readonly present = computed(() =>
    this.#appointments().filter(({ status }) => status !== 'cancelled'),
  );
  protected readonly cancelled = computed(() =>
    this.#appointments().filter(({ status }) => status === 'cancelled'),
  );

  protected readonly patient = signal<PatientListItem | null>(null);
  protected readonly busy = signal(false);
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(() => {
    const failed = this.#roster.error();
    return this.#refused() ?? (failed ? toProblem(failed) : null);
  });
  /** Where there is still a place, told beside the refusal. */
  protected readonly instead = computed(() => {
    const code = this.#refused()?.code;
    if (code !== 'class-full' && code !== 'monitors-full') return null;
    const next = nextWithRoom(this.date(), this.others());
    const when = next && `${dateInWords(next.localDate, 'long')}, ${clockOf(next.localStart)}`;
    return next && { id: next.id, words: when };
  });

  protected readonly day = computed(() => dateInWords(this.date().localDate, 'long'));
  protected readonly span = computed(() => spanOf(this.date(), this.site().timeZone));
  protected readonly places = computed(() => placesInWords(this.date()));
  protected readonly monitors = computed(() => monitorsInWords(this.date()));
  protected readonly state = computed(() => classState(this.date()));
  protected readonly price = computed(() => {
    const price = this.date().price;
    return price && formatMoney(price.amountMinor, price.currency);
  });
  protected readonly begun = computed(() => new Date(this.date().startsAt) <= new Date());
  protected readonly undoable = computed(() =>
    isUndoable(this.date().localDate, new Date(), this.site().timeZone),
  );
  protected readonly open = computed(
    () => this.date().status === 'scheduled' && new Date() < new Date(this.date().endsAt),
  );

  protected pick(person: PatientListItem | null): void {
    this.#refused.set(null);
    this.patient.set(person);
  }

  protected async book(person: PatientListItem): Promise<void> {
    await this.#try(async () => {
      await this.#bookings.book({ classDateId: this.date().id, patientId: person.id });
      this.patient.set(null);
      await this.#notices.say(`${person.displayName} is booked: ${this.day()}, ${this.span()}.`);
    });
  }

  protected async act({ appointment, status, reason }: RosterAction): Promise<void> {
    const { id, version, patientId, displayName } = appointment;
    await this.#try(async () => {
      await this.#bookings.change(id, { status, version, ...(reason && { reason }) });
      if (status !== 'cancelled') return;
      await this.#notices.offerUndo(`The place of ${displayName} is cancelled.`, () => {
        void this.#try(() => this.#bookings.book({ classDateId: this.date().id, patientId }));
      });
    });
  }

  /** Does one thing at a time, tells a refusal, and reads the roster and the numbers anew either way. */
  async #try(work: () => Promise<unknown>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.#refused.set(null);
    try {
      await work();
    } catch (error) {
      this.#refused.set(toProblem(error));
    } finally {
      this.busy.set(false);
      this.#roster.reload();
      this.changed.emit();
    }
  }
}
