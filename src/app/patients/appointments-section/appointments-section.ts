import { ChangeDetectionStrategy, Component, DestroyRef, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { AppointmentItem, AppointmentStatus } from '@shared/contracts/schedule-contract';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { formatDay, formatTime } from '../../ui/words/dates';
import { PatientChart } from '../patient-chart';
import { PagedList } from '../../core/paged-list';
import { PatientsClient } from '../patients-client';

const statusWords: Readonly<Record<AppointmentStatus, string>> = {
  proposed: 'Proposed',
  pending: 'Pending',
  booked: 'Booked',
  arrived: 'Arrived',
  'checked-in': 'Checked in',
  fulfilled: 'Attended',
  cancelled: 'Cancelled',
  noshow: 'Did not come',
  waitlist: 'On the waitlist',
  'entered-in-error': 'Entered in error',
};

const tones: Readonly<Partial<Record<AppointmentStatus, Tone>>> = {
  fulfilled: 'in',
  noshow: 'due',
};

/** A patient's classes, what is ahead first at the top; booking is the schedule's. */
@Component({
  selector: 'app-appointments-section',
  imports: [EmptyState, MatButton, ProblemMessage, ShowMore, Skeleton, StateChip],
  templateUrl: './appointments-section.html',
  styles: ':host { display: grid; gap: 1rem; }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AppointmentsSection {
  readonly #client = inject(PatientsClient);
  readonly #chart = inject(PatientChart);
  protected readonly list = new PagedList<AppointmentItem>(
    (cursor) => this.#client.appointments(this.#chart.id() ?? '', cursor),
    inject(DestroyRef),
  );
  protected readonly rows = computed(() =>
    this.list.items()?.map((item) => ({
      id: item.id,
      day: formatDay(item.startsAt, item.site.timeZone),
      times: `${formatTime(item.startsAt, item.site.timeZone)} to ${formatTime(item.endsAt, item.site.timeZone)}`,
      className: item.className,
      site: item.site.name,
      reason: item.cancelledReason,
      words: statusWords[item.status],
      tone: tones[item.status] ?? 'plain',
    })),
  );

  constructor() {
    this.list.load();
  }
}
