import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import { formatMoney } from '@shared/units/money';
import type { Problem } from '../../core/problem';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords, otherZoneNote, spanOf } from '../../ui/site-time/site-time';
import { isLate, mayCancel } from '../bookable-days';

/** One session to come: when, where, and giving the place back. */
@Component({
  selector: 'app-session-card',
  imports: [MatButton, ProblemMessage],
  templateUrl: './session-card.html',
  styleUrl: './session-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SessionCard {
  readonly appointment = input.required<AppointmentItem>();
  readonly busy = input(false);
  /** Why it could not be cancelled. */
  readonly problem = input<Problem | null>(null);
  readonly cancelled = output();

  protected readonly asking = signal(false);
  protected readonly day = computed(() => dateInWords(this.appointment().localDate, 'long'));
  protected readonly span = computed(() =>
    spanOf(this.appointment(), this.appointment().site.timeZone),
  );
  protected readonly zoneNote = computed(() =>
    otherZoneNote(this.appointment().site, new Date(this.appointment().startsAt)),
  );
  protected readonly price = computed(() => {
    const price = this.appointment().price;
    return price && formatMoney(price.amountMinor, price.currency);
  });
  protected readonly cancellable = computed(() => mayCancel(this.appointment(), new Date()));
  protected readonly late = computed(() => isLate(this.appointment(), new Date()));

  protected cancel(): void {
    this.asking.set(false);
    this.cancelled.emit();
  }
}
