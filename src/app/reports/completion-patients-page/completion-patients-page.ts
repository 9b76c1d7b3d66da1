import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  inject,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, RouterLink } from '@angular/router';
import type { CompletionPatient } from '@shared/contracts/reports-contract';
import { PagedList } from '../../core/paged-list';
import { tap } from 'rxjs';
import { Session } from '../../core/session';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { LocalDatePipe } from '../../ui/format/format-pipes';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { callOf, choicesOf, diagnosisChoices, paramsOf, partOf } from '../completion-query';
import { ReportsClient } from '../reports-client';

const headings = {
  enrolled: 'Started',
  completed: 'Completed',
  ongoing: 'Still open',
  left: 'Not completed',
} as const;

const states: Readonly<Record<CompletionPatient['state'], { word: string; tone: Tone }>> = {
  completed: { word: 'completed', tone: 'in' },
  ongoing: { word: 'still open', tone: 'due' },
  left: { word: 'not completed', tone: 'plain' },
};

/** The people behind one count of the completion report. */
@Component({
  selector: 'app-completion-patients-page',
  imports: [
    EmptyState,
    LocalDatePipe,
    MatButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    ShowMore,
    Skeleton,
    StateChip,
  ],
  templateUrl: './completion-patients-page.html',
  styles: `
    .back {
      display: inline-block;
      margin-bottom: 0.75rem;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CompletionPatientsPage {
  readonly #client = inject(ReportsClient);
  readonly #query = inject(ActivatedRoute).snapshot.queryParamMap;
  readonly #roles = inject(Session).user()?.roles ?? [];
  readonly #choices = choicesOf(this.#query, new Date().toLocaleDateString('sv-SE'));
  readonly #part = partOf(this.#query);
  readonly #group = this.#query.get('group');
  protected readonly total = signal(0);
  protected readonly list = new PagedList<CompletionPatient>(
    (cursor) => this.#read(cursor),
    inject(DestroyRef),
  );
  protected readonly heading = headings[this.#part];
  protected readonly back = paramsOf(this.#choices);
  /** A director counts courses and opens no chart. */
  protected readonly opensCharts = this.#roles.some((role) =>
    ['physician', 'exercise-physiologist', 'nurse'].includes(role),
  );
  protected readonly states = states;
  protected readonly detail = computed(() => {
    if (this.list.items() === null) return null;
    return `${this.total()} ${this.total() === 1 ? 'course' : 'courses'}`;
  });

  constructor() {
    this.list.load();
  }

  protected diagnosis(code: string): string {
    return diagnosisChoices.find(({ value }) => value === code)?.label ?? code;
  }

  #read(cursor: string | null): ReturnType<ReportsClient['patients']> {
    return this.#client
      .patients({
        ...callOf(this.#choices),
        part: this.#part,
        ...(this.#group !== null && { group: this.#group }),
        ...(cursor !== null && { cursor }),
      })
      .pipe(tap(({ total }) => this.total.set(total)));
  }
}
