import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  linkedSignal,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { MatRadioButton, MatRadioGroup } from '@angular/material/radio';
import { ActivatedRoute, Router, RouterLink, type Params } from '@angular/router';
import type {
  CompletionDefinition,
  CompletionPart,
  CompletionReport,
  CompletionRow,
} from '@shared/contracts/reports-contract';
import { toProblem } from '../../core/problem';
import { Notices } from '../../core/notices';
import { Session } from '../../core/session';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { DecimalsPipe, InstantPipe, SharePipe } from '../../ui/format/format-pipes';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { CompletionChart } from '../completion-chart/completion-chart';
import { CompletionFilters } from '../completion-filters/completion-filters';
import {
  callOf,
  choicesOf,
  groupingChoices,
  paramsOf,
  type CompletionChoices,
} from '../completion-query';
import { ReportsClient } from '../reports-client';

/** A report, and the choices that it answers. */
interface Counted {
  readonly report: CompletionReport;
  readonly by: CompletionChoices;
}

const localToday = (): string => new Date().toLocaleDateString('sv-SE');

/** How many who started completed, by group, with the people behind every count one step away. */
@Component({
  selector: 'app-completion-page',
  imports: [
    CompletionChart,
    CompletionFilters,
    InstantPipe,
    DecimalsPipe,
    EmptyState,
    Icon,
    MatButton,
    MatRadioButton,
    MatRadioGroup,
    PageHeader,
    SharePipe,
    ProblemMessage,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './completion-page.html',
  styleUrl: './completion-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CompletionPage {
  readonly #client = inject(ReportsClient);
  readonly #router = inject(Router);
  readonly #route = inject(ActivatedRoute);
  readonly #notices = inject(Notices);
  readonly #session = inject(Session);
  readonly #params = toSignal(this.#route.queryParamMap, {
    initialValue: this.#route.snapshot.queryParamMap,
  });
  protected readonly today = localToday();
  protected readonly choices = computed(() => choicesOf(this.#params(), this.today));
  readonly #call = computed(() => callOf(this.choices()));
  protected readonly report = this.#client.completion(this.#call);
  readonly #sites = this.#client.sites();
  protected readonly sites = computed(() => (this.#sites.hasValue() ? this.#sites.value() : []));
  /** The last report stays on the page, with the choices it was counted by, while the next one is counted. */
  readonly #counted = linkedSignal<Counted | undefined, Counted | undefined>({
    source: () =>
      this.report.hasValue() ? { report: this.report.value(), by: this.choices() } : undefined,
    computation: (counted, previous) => counted ?? previous?.value,
  });
  protected readonly shown = computed(() => this.#counted()?.report);
  protected readonly problem = computed(() => {
    const error = this.report.error();
    return error === undefined ? null : toProblem(error.cause ?? error);
  });
  protected readonly groupWord = computed(
    () => groupingChoices.find(({ value }) => value === this.#counted()?.by.groupBy)?.label ?? '',
  );
  protected readonly csv = computed(
    () => `/api/reports/completion.csv?${new URLSearchParams(this.#call()).toString()}`,
  );
  protected readonly mayDefine = computed(() => {
    const roles = this.#session.user()?.roles ?? [];
    return roles.includes('director') || roles.includes('administrator');
  });
  protected readonly defining = signal(false);

  protected choose(change: Partial<CompletionChoices>): void {
    const queryParams = paramsOf({ ...this.choices(), ...change });
    void this.#router.navigate([], { queryParams, replaceUrl: true });
  }

  /** Where the people behind a count are listed. */
  protected listOf(part: CompletionPart, row: CompletionRow | null): Params {
    const by = this.#counted()?.by ?? this.choices();
    return { ...paramsOf(by), part, group: row?.group ?? null };
  }

  protected define(definition: CompletionDefinition): void {
    this.#client.define(definition).subscribe({
      next: () => {
        this.defining.set(false);
        this.report.reload();
        void this.#notices.say('The definition is changed for the whole program.');
      },
      error: (error: unknown) => void this.#notices.say(toProblem(error).title),
    });
  }
}
