import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, RouterLink } from '@angular/router';
import type { CompletionPatient } from '@shared/contracts/reports-contract';
import { type Problem, toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { LocalDatePipe } from '../../ui/format/format-pipes';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
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
    LocalDatePipe,
    EmptyState,
    MatButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './completion-patients-page.html',
  styles: `
    .back {
      display: inline-block;
      margin-bottom: 0.75rem;
    }
    .more {
      margin: 1rem 0;
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
  readonly #next = signal<string | null>(null);
  protected readonly items = signal<readonly CompletionPatient[] | undefined>(undefined);
  protected readonly total = signal(0);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly loading = signal(false);
  protected readonly hasMore = computed(() => this.#next() !== null);
  protected readonly heading = headings[this.#part];
  protected readonly back = paramsOf(this.#choices);
  /** A director counts courses and opens no chart. */
  protected readonly opensCharts = this.#roles.some((role) =>
    ['physician', 'exercise-physiologist', 'nurse'].includes(role),
  );
  protected readonly states = states;
  protected readonly detail = computed(() => {
    if (this.items() === undefined) return null;
    return `${this.total()} ${this.total() === 1 ? 'course' : 'courses'}`;
  });

  constructor() {
    this.load();
  }

  protected diagnosis(code: string): string {
    return diagnosisChoices.find(({ value }) => value === code)?.label ?? code;
  }

  /** Reads the first page, or the one after what is shown. */
  protected load(): void {
    const cursor = this.#next();
    this.loading.set(true);
    this.problem.set(null);
    this.#client
      .patients({
        ...callOf(this.#choices),
        part: this.#part,
        ...(this.#group !== null && { group: this.#group }),
        ...(cursor !== null && { cursor }),
      })
      .subscribe({
        next: ({ total, items, nextCursor }) => {
          if (cursor === null) this.total.set(total);
          this.items.update((shown = []) => [...shown, ...items]);
          this.#next.set(nextCursor);
          this.loading.set(false);
        },
        error: (error: unknown) => {
          this.problem.set(toProblem(error));
          this.loading.set(false);
        },
      });
  }
}
