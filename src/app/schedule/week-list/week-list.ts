import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import { clockOf, dateInWords } from '../../ui/site-time/site-time';
import { StateChip } from '../../ui/state-chip/state-chip';
import { classState, monitorsInWords, placesInWords } from '../class-words';
import { byDay } from '../weeks';

/** The classes of a week as a list by day: for phones, for screen readers, and for who prefers it. */
@Component({
  selector: 'app-week-list',
  imports: [StateChip],
  templateUrl: './week-list.html',
  styleUrl: './week-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WeekList {
  /** A Monday. */
  readonly week = input.required<string>();
  readonly dates = input.required<readonly ClassDate[]>();
  readonly today = input.required<string>();
  readonly selectedId = input<string | undefined>();
  readonly chosen = output<string>();

  protected readonly days = computed(() =>
    byDay(this.week(), this.dates()).map(({ localDate, dates }) => ({
      localDate,
      name: dateInWords(localDate, 'long'),
      dates: dates.map((date) => ({
        id: date.id,
        name: date.name,
        start: clockOf(date.localStart),
        places: placesInWords(date),
        monitors: monitorsInWords(date),
        state: classState(date),
      })),
    })),
  );
}
