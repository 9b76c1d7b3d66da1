import { ChangeDetectionStrategy, Component, computed, input, model } from '@angular/core';
import type { PlannedDate } from '@shared/contracts/schedule-contract';
import { localDateAt } from '@shared/scheduling/wall-time';
import { dateInWords, timeOf } from '../../ui/site-time/site-time';
import { StateChip } from '../../ui/state-chip/state-chip';
import { conflictInWords } from '../class-words';
import { type SeriesChoice, freeAlternatives } from '../series-page/series-choice';

/** A planned series, a row a date: free, or what stands against it and what else there is. */
@Component({
  selector: 'app-series-plan',
  imports: [StateChip],
  templateUrl: './series-plan.html',
  styleUrl: './series-plan.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SeriesPlan {
  readonly plan = input.required<readonly PlannedDate[]>();
  readonly startTime = input.required<string>();
  readonly timeZone = input.required<string>();
  readonly choice = model.required<SeriesChoice>();

  protected readonly rows = computed(() =>
    this.plan().map((date) => ({
      localDate: date.localDate,
      day: dateInWords(date.localDate, 'long'),
      time: timeOf(date.startsAt, this.timeZone()),
      conflict: date.conflict && conflictInWords(date.conflict),
      classDateId: date.classDateId,
      chosen: this.choice()[date.localDate] ?? '',
      alternatives: freeAlternatives(date, this.choice()).map(({ classDateId, startsAt }) => ({
        classDateId,
        words: this.#alternativeInWords(startsAt, date.localDate),
      })),
    })),
  );
  protected readonly free = computed(
    () => this.plan().filter(({ conflict }) => conflict === null).length,
  );

  protected choose(localDate: string, classDateId: string): void {
    this.choice.update((choice) => ({ ...choice, [localDate]: classDateId }));
  }

  #alternativeInWords(startsAt: string, planned: string): string {
    const localDate = localDateAt(new Date(startsAt), this.timeZone());
    const day = localDate === planned ? 'Same day' : dateInWords(localDate, 'short');
    return `${day}, ${timeOf(startsAt, this.timeZone())}`;
  }
}
