import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import type { Problem } from '../../core/problem';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords, spanOf } from '../../ui/site-time/site-time';
import { isLate, mayCancel } from '../bookable-days';
import { cancellationWords, costWords } from './charge-words';

/** How a patient was told that they cancel. */
export interface Cancelling {
  readonly late: boolean;
}

/** One session to come: when, where, what it costs, and giving the place back. */
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
  readonly cancelled = output<Cancelling>();

  /** What the question on the page says of the hour, as of when it was asked. */
  protected readonly asking = signal<Cancelling | null>(null);
  protected readonly day = computed(() => dateInWords(this.appointment().localDate, 'long'));
  protected readonly span = computed(() =>
    spanOf(this.appointment(), this.appointment().site.timeZone),
  );
  protected readonly cost = computed(() => costWords(this.appointment(), new Date()));
  protected readonly cancellable = computed(() => mayCancel(this.appointment(), new Date()));
  protected readonly question = computed(() =>
    cancellationWords(this.appointment(), this.asking()?.late ?? false),
  );

  protected ask(): void {
    this.asking.set({ late: isLate(this.appointment(), new Date()) });
  }

  protected cancel(told: Cancelling): void {
    this.asking.set(null);
    this.cancelled.emit(told);
  }
}
