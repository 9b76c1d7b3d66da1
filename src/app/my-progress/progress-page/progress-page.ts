import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { AttendedSession } from '@shared/contracts/my-progress-contract';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { dateInWords } from '../../ui/site-time/site-time';
import { formatLocalDate } from '../../ui/words/dates';
import { rangeText } from '../../ui/words/prescription-words';
import { MyProgressClient } from '../my-progress-client';
import { nextMilestone } from '../next-milestone';
import { RatePicture } from '../rate-picture/rate-picture';
import { walkWords } from '../walk-words';

type Compared = AttendedSession & {
  readonly heartRate: number;
  readonly target: NonNullable<AttendedSession['target']>;
};

const isCompared = (session: AttendedSession): session is Compared =>
  session.heartRate !== null && session.target !== null;

/** How many sessions had their mean within that day's range, or null where none had both. */
function inRangeWords(sessions: readonly AttendedSession[]): string | null {
  const compared = sessions.filter(isCompared);
  if (compared.length === 0) return null;
  const within = compared.filter(
    ({ heartRate, target }) => heartRate >= target.lower && heartRate <= target.upper,
  );
  return `Your average was in your range in ${within.length} of ${compared.length} sessions.`;
}

/** How far a patient has come: sessions, heart rates, the walk, and what comes next. */
@Component({
  selector: 'app-progress-page',
  imports: [EmptyState, MatButton, PageHeader, ProblemMessage, RatePicture, RouterLink, Skeleton],
  templateUrl: './progress-page.html',
  styleUrl: './progress-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProgressPage {
  readonly #resource = inject(MyProgressClient).progress();

  protected readonly mine = computed(() => valueOf(this.#resource));
  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly course = computed(() => this.mine()?.course ?? null);
  protected readonly share = computed(() => {
    const course = this.course();
    return course ? Math.min(1, course.done / course.planned) * 100 : 0;
  });
  protected readonly isOver = computed(() =>
    ['completed', 'discontinued'].includes(this.course()?.status ?? ''),
  );
  protected readonly next = computed(() => {
    const course = this.course();
    return course && !this.isOver() ? nextMilestone(course.done, course.planned) : null;
  });
  protected readonly measured = computed(
    () => this.course()?.sessions.some(({ heartRate }) => heartRate !== null) ?? false,
  );
  protected readonly inRange = computed(() => inRangeWords(this.course()?.sessions ?? []));
  protected readonly description = computed(() => {
    const rates = (this.course()?.sessions ?? []).flatMap(({ heartRate }) => heartRate ?? []);
    const span = `from ${Math.min(...rates)} to ${Math.max(...rates)} beats a minute`;
    const told = `Your average heart rate in ${rates.length} sessions, ${span}.`;
    return [told, this.inRange() ?? '', 'All numbers stand in the table below.'].join(' ');
  });
  protected readonly newestFirst = computed(() => [...(this.course()?.sessions ?? [])].reverse());
  protected readonly walk = computed(() => {
    const walks = this.course()?.walks;
    return walks ? walkWords(walks) : null;
  });
  protected readonly dial = computed(
    () => `tel:${this.mine()?.site.phone.replaceAll(/[^+\d]/g, '') ?? ''}`,
  );
  protected readonly dateOf = formatLocalDate;
  /** Sat, Nov 28 */
  protected readonly dayOf = (localDate: string): string => dateInWords(localDate, 'short');
  protected readonly rangeText = rangeText;

  protected reload(): void {
    this.#resource.reload();
  }
}
