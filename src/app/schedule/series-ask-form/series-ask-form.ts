import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  linkedSignal,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import {
  CLASS_DATES_SPAN_DAYS,
  type SeriesPreviewRequest,
} from '@shared/contracts/schedule-contract';
import { seriesDates } from '@shared/scheduling/series-plan';
import { addDays } from '@shared/scheduling/wall-time';
import { Timetable } from '../../core/timetable';
import { clockOf } from '../../ui/site-time/site-time';
import { hasRoom } from '../class-words';
import { startTimes, weekdays } from '../weeks';

export type SeriesAsk = Pick<SeriesPreviewRequest, 'weekdays' | 'startTime' | 'from' | 'count'>;

const isDate = (text: string) => /^\d{4}-\d{2}-\d{2}$/.test(text);

/** Which days, from when, how many, at what hour: each hour says on how many of the dates there is a place. */
@Component({
  selector: 'app-series-ask-form',
  imports: [MatButton, MatFormField, MatInput, MatLabel],
  templateUrl: './series-ask-form.html',
  styleUrl: './series-ask-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SeriesAskForm {
  readonly siteId = input.required<string>();
  readonly today = input.required<string>();
  /** Places that the course may still hold. */
  readonly most = input.required<number>();
  readonly busy = input(false);
  readonly asked = output<SeriesAsk>();

  protected readonly weekdays = weekdays;
  protected readonly chosen = signal<readonly number[]>([1, 3, 5]);
  protected readonly from = linkedSignal(() => addDays(this.today(), 1));
  protected readonly count = linkedSignal(() => this.most());
  protected readonly startTime = signal<string | null>(null);

  readonly #days = computed(() => {
    const sound = this.chosen().length > 0 && isDate(this.from()) && this.count() >= 1;
    if (!sound) return [];
    return seriesDates({
      weekdays: this.chosen(),
      startTime: '00:00',
      from: this.from(),
      count: Math.min(this.count(), 72),
    });
  });
  readonly #dates = inject(Timetable).classDates(() => {
    const last = this.#days().at(-1);
    if (last === undefined) return undefined;
    const [end, limit] = [addDays(last, 1), addDays(this.from(), CLASS_DATES_SPAN_DAYS)];
    return { siteId: this.siteId(), from: this.from(), to: end < limit ? end : limit };
  });
  protected readonly times = computed(() => {
    const dates = this.#dates.hasValue() ? this.#dates.value() : [];
    return startTimes(dates, this.chosen(), hasRoom).map((time) => ({
      ...time,
      words: clockOf(time.localStart),
    }));
  });
  protected readonly loading = computed(() => this.#dates.isLoading());
  /** What is missing before places can be looked for. */
  protected readonly missing = computed(() => {
    if (this.chosen().length === 0) return 'Choose at least one day of the week.';
    if (!isDate(this.from())) return 'Enter the first date.';
    if (!(this.count() >= 1 && this.count() <= this.most())) {
      return `Enter 1 to ${this.most()} sessions.`;
    }
    return this.startTime() === null ? 'Choose an hour.' : null;
  });
  protected readonly told = signal(false);

  constructor() {
    // An hour that the chosen days don't have can't stay chosen unseen.
    effect(() => {
      const known = this.times().some(({ localStart }) => localStart === this.startTime());
      if (!known && !this.loading() && this.startTime() !== null) this.startTime.set(null);
    });
  }

  protected toggle(day: number): void {
    this.chosen.update((days) =>
      days.includes(day) ? days.filter((one) => one !== day) : [...days, day].sort(),
    );
  }

  protected ask(): void {
    this.told.set(true);
    const startTime = this.startTime();
    if (this.missing() !== null || startTime === null) return;
    const weekdaysAsked = [...this.chosen()];
    this.asked.emit({
      weekdays: weekdaysAsked,
      startTime,
      from: this.from(),
      count: this.count(),
    });
  }
}
