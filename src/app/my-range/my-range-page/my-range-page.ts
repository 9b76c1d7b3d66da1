import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { LiveChanges } from '../../core/live-changes';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { LoadLine } from '../../ui/load-line/load-line';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { formatDay } from '../../ui/words/dates';
import { rangeText } from '../../ui/words/prescription-words';
import { changeWords } from '../change-words';
import { effortWords } from '../effort-words';
import { MyRangeClient } from '../my-range-client';

/** What a patient needs to know of the own range: how fast, where to stop, whom to call. */
@Component({
  selector: 'app-my-range-page',
  imports: [EmptyState, LoadLine, MatButton, PageHeader, ProblemMessage, Skeleton],
  templateUrl: './my-range-page.html',
  styleUrl: './my-range-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MyRangePage {
  readonly #resource = inject(MyRangeClient).range();

  protected readonly mine = computed(() => valueOf(this.#resource));
  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly rangeText = rangeText;
  protected readonly effortWords = effortWords;

  /** "16 or 17", "16 to 18", or one number. */
  protected readonly count = computed(() => {
    const count = this.mine()?.range?.tenSecondCount;
    if (!count) return null;
    const { lower, upper } = count;
    if (lower === upper) return `${lower}`;
    return upper - lower === 1 ? `${lower} or ${upper}` : `${lower} to ${upper}`;
  });
  protected readonly setOn = computed(() => {
    const mine = this.mine();
    return mine?.range ? formatDay(mine.range.setOn, mine.site.timeZone) : null;
  });
  protected readonly ceiling = computed(() => {
    const value = this.mine()?.range?.stayUnder ?? null;
    return value === null ? null : { value, reason: '' };
  });
  /** "A heart medicine was changed, Dec 1, 2026" */
  protected readonly changes = computed(() => {
    const mine = this.mine();
    const changes = mine?.range?.changes ?? [];
    return changes.map(
      ({ fact, at }) => `${changeWords(fact)}, ${formatDay(at, mine?.site.timeZone ?? 'UTC')}`,
    );
  });
  protected readonly dial = computed(
    () => `tel:${this.mine()?.site.phone.replaceAll(/[^+\d]/g, '') ?? ''}`,
  );

  constructor() {
    inject(LiveChanges)
      .of(['range'])
      .pipe(takeUntilDestroyed())
      .subscribe(() => this.reload());
  }

  protected reload(): void {
    this.#resource.reload();
  }
}
