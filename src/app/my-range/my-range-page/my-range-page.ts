import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { effortSteps, effortWords, isInEffort } from '@shared/patient-range/effort-words';
import {
  cautionWords,
  changeWords,
  countWords,
  emergencyWords,
  homeWords,
  pulseSteps,
  reviewWords,
  todayWords,
} from '@shared/patient-range/range-words';
import { LiveChanges } from '../../core/live-changes';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { LoadLine } from '../../ui/load-line/load-line';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { formatDay } from '../../ui/words/dates';
import { rangeText } from '../../ui/words/prescription-words';
import { MyRangeClient } from '../my-range-client';
import { PulseTimer } from '../pulse-timer/pulse-timer';

/** What a patient needs to know of the own range: how fast, where to stop, whom to call. */
@Component({
  selector: 'app-my-range-page',
  imports: [EmptyState, LoadLine, MatButton, PageHeader, ProblemMessage, PulseTimer, Skeleton],
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

  protected readonly countWords = countWords;
  protected readonly emergencyWords = emergencyWords;
  protected readonly pulseSteps = pulseSteps;
  protected readonly reviewWords = reviewWords;
  protected readonly todayWords = todayWords;
  protected readonly changes = computed(() =>
    changeWords((this.mine()?.range?.changes ?? []).map(({ fact }) => fact)).join(' '),
  );
  protected readonly cautions = computed(() => cautionWords(this.mine()?.range?.cautions ?? []));
  protected readonly home = computed(() => {
    const home = this.mine()?.home;
    return home ? homeWords(home) : [];
  });
  protected readonly effort = computed(() => {
    const effort = this.mine()?.range?.effort;
    if (!effort) return [];
    return effortSteps.map((step) => ({
      ...step,
      numbers: rangeText(step),
      isYours: isInEffort(step, effort),
    }));
  });
  protected readonly signers = computed(() => {
    const range = this.mine()?.range;
    return [range?.setBy, range?.signedBy].filter((name) => name).join(' and ');
  });
  protected readonly setOn = computed(() => {
    const mine = this.mine();
    return mine?.range ? formatDay(mine.range.setOn, mine.site.timeZone) : null;
  });
  protected readonly ceiling = computed(() => {
    const value = this.mine()?.range?.stayUnder ?? null;
    return value === null ? null : { value, reason: '' };
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
