import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import { formatMoney } from '@shared/units/money';
import type { Problem } from '../../core/problem';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords, spanOf } from '../../ui/site-time/site-time';
import { type Own, isBookable, ownIn, placesLeft, standingCharge } from '../bookable-days';

/** A class that could not be booked, and why. */
export interface Refused {
  readonly classDateId: string;
  readonly problem: Problem;
}

/** Classes to choose from, each with its places left and what it costs, said before it is booked. */
@Component({
  selector: 'app-class-choice',
  imports: [MatButton, ProblemMessage],
  templateUrl: './class-choice.html',
  styleUrl: './class-choice.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ClassChoice {
  readonly dates = input.required<readonly ClassDate[]>();
  readonly own = input.required<Own>();
  readonly timeZone = input.required<string>();
  /** Whether each tells its day too, for a list of several days. */
  readonly withDay = input(false);
  readonly busy = input(false);
  /** What went wrong with a class of the list, told in its row. */
  readonly refused = input<Refused | null>(null);
  readonly booked = output<ClassDate>();

  protected readonly rows = computed(() => {
    const now = new Date();
    return this.dates().map((date) => {
      const left = placesLeft(date, this.own());
      return {
        date,
        day: dateInWords(date.localDate, 'long'),
        span: spanOf(date, this.timeZone()),
        ...this.#cost(date),
        bookable: isBookable(date, this.own(), this.timeZone(), now),
        why: this.#whyNot(date, left, now),
        problem: this.refused()?.classDateId === date.id ? (this.refused()?.problem ?? null) : null,
        left: left === 1 ? '1 place left' : `${left} places left`,
      };
    });
  });

  /** What is to be paid, and what was charged already for a place here that was cancelled late. */
  #cost(date: ClassDate): { readonly price: string | null; readonly charged: string | null } {
    const standing = standingCharge(date, this.own());
    const price = date.price && formatMoney(date.price.amountMinor, date.price.currency);
    if (standing === null || price === null) return { price, charged: null };
    const amount = formatMoney(standing.amountMinor, standing.currency);
    return {
      price: null,
      charged: standing.paid
        ? `You paid ${amount} already`
        : `You pay the ${amount} that you owe already`,
    };
  }

  #whyNot(date: ClassDate, left: number, now: Date): string {
    if (ownIn(date, this.own())) return 'This one is yours';
    if (date.status !== 'scheduled') return 'No class on this day';
    if (new Date(date.startsAt) <= now) return 'Already started';
    if (date.booked >= date.capacity) return 'Full';
    if (left <= 0) return 'No monitored place left';
    return 'Not open for you at this time';
  }
}
