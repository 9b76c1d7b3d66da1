import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { ErrorStateMatcher } from '@angular/material/core';
import { Router, RouterLink } from '@angular/router';
import { physicianCausesOf } from '@shared/clinical/plan-limits';
import { engineVersion } from '@shared/clinical/prescribing';
import type { Candidate } from '@shared/clinical/prescribing/answer';
import type { Prescription } from '@shared/contracts/prescription-record-contract';
import { firstValueFrom } from 'rxjs';
import { LiveChanges } from '../../core/live-changes';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { Cautions } from '../../ui/cautions/cautions';
import { Confirm } from '../../ui/confirm/confirm';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { showFieldErrors } from '../../ui/field-error/zod-validator';
import { LoadLine } from '../../ui/load-line/load-line';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { RangeFlags } from '../../ui/range-flags/range-flags';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { formatDay, formatTime } from '../../ui/words/dates';
import { HistoryList, signaturesOf, standingOf } from '../history-list/history-list';
import { LimitsTable } from '../limits-table/limits-table';
import { PrescriptionsClient } from '../prescriptions-client';
import { RestsOn } from '../rests-on/rests-on';
import { isSameAt, rows } from '../rests-on/rows';
import { ResultPanel } from '../result-panel/result-panel';
import { TriedChange } from '../tried-change/tried-change';
import { WaysTable } from '../ways-table/ways-table';
import { WorkloadsTable } from '../workloads-table/workloads-table';
import { WorksheetState } from '../worksheet/worksheet-state';
import { detailText } from './head-words';
import { loadLineFacts } from './load-line-facts';
import { RangeAtHand } from './range-at-hand';
import { causesText, signingQuestion } from './signing-words';

/**
 * The worksheet of a range: a new one, a draft, or a signed one to read. What it rests on, the load line and what it
 * comes to stand side by side, worked out at each keystroke.
 */
@Component({
  selector: 'app-worksheet-page',
  imports: [
    Cautions,
    EmptyState,
    HistoryList,
    LimitsTable,
    LoadLine,
    MatButton,
    PageHeader,
    ProblemMessage,
    RangeFlags,
    RestsOn,
    ResultPanel,
    RouterLink,
    Skeleton,
    StateChip,
    TriedChange,
    WaysTable,
    WorkloadsTable,
  ],
  templateUrl: './worksheet-page.html',
  styleUrl: './worksheet-page.scss',
  providers: [
    WorksheetState,
    // A fault shows at once: the picture beside it stands still because of it.
    { provide: ErrorStateMatcher, useValue: { isErrorState: isInvalid } },
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorksheetPage {
  /** Of a new range. */
  readonly patientId = input<string>();
  /** Of a draft or a signed one. */
  readonly prescriptionId = input<string>();

  readonly #client = inject(PrescriptionsClient);
  readonly #confirm = inject(Confirm);
  readonly #notices = inject(Notices);
  readonly #router = inject(Router);
  readonly #session = inject(Session);
  protected readonly state = inject(WorksheetState);
  protected readonly range = new RangeAtHand(this.#client, this.patientId, this.prescriptionId);

  /** What is shown: the stored result, or what the fields come to, or the last that they came to. */
  protected readonly answer = computed(
    () => this.range.fixed()?.result ?? this.state.answer() ?? this.state.lastAnswer(),
  );
  protected readonly stale = computed(
    () => !this.range.fixed() && this.state.answer() === null && this.state.lastAnswer() !== null,
  );
  protected readonly loadLine = computed(() => {
    const answer = this.answer();
    const inputs = this.range.fixed()?.inputs ?? this.state.lastRequest();
    if (!answer || !inputs) return null;
    const lastPeak = this.range.fixed()
      ? null
      : (this.range.worksheet()?.lastPeak?.heartRate ?? null);
    return loadLineFacts(answer, inputs.resting.seated, lastPeak);
  });
  protected readonly chosen = computed(() => {
    const { choice } = this.range.fixed()?.inputs ?? this.state.lastRequest() ?? {};
    return choice !== undefined && (choice.method !== null || choice.maximum !== null);
  });

  protected readonly problem = signal<Problem | null>(null);
  protected readonly busy = signal(false);
  readonly #signs = computed(() =>
    this.#session.roles().some((role) => role === 'exercise-physiologist' || role === 'physician'),
  );
  readonly #asPhysician = computed(
    () => this.#session.roles().includes('physician') && this.range.worksheet()?.student === false,
  );
  protected readonly maySign = computed(() => {
    const fixed = this.range.fixed();
    if (fixed) return fixed.awaiting === 'physician' && this.#asPhysician();
    return this.#signs();
  });
  protected readonly mayPutAside = computed(
    () => this.range.stored()?.status === 'draft' && this.#signs(),
  );
  /** Why a physician signs too, as the fields stand. */
  protected readonly causes = computed(() => {
    const worksheet = this.range.worksheet();
    const answer = this.answer();
    const inputs = this.range.fixed()?.inputs ?? this.state.request();
    if (!worksheet || !answer || !inputs) return [];
    const { first, student, policy } = worksheet;
    return physicianCausesOf({ inputs, result: answer, first, student }, policy);
  });
  protected readonly physicianToo = computed(() =>
    !this.range.fixed() && !this.#asPhysician() && this.causes().length > 0
      ? causesText(this.causes())
      : null,
  );
  readonly #tried = computed(() => {
    const record = this.range.worksheet()?.record;
    if (!record || this.range.fixed()) return 0;
    return rows.filter((row) => !isSameAt(row, this.state.value(), record.inputs)).length;
  });

  protected readonly detail = computed(() => {
    const worksheet = this.range.worksheet();
    const inputs = this.range.fixed()?.inputs ?? this.state.request();
    return worksheet ? detailText(worksheet, inputs?.risk) : null;
  });
  protected readonly flags = computed(() => this.range.inForce()?.flags ?? []);
  protected readonly standing = computed(() => {
    const stored = this.range.stored();
    return stored && standingOf(stored);
  });
  protected readonly zone = computed(() => this.range.worksheet()?.patient.site.timeZone ?? 'UTC');
  protected readonly signatures = computed(() => {
    const stored = this.range.stored();
    return stored ? signaturesOf(stored, (at) => this.when(at)) : [];
  });

  constructor() {
    inject(LiveChanges)
      .of(['range'], (patientId) => patientId === this.range.worksheet()?.patient.id)
      .pipe(takeUntilDestroyed())
      .subscribe(() => {
        if (!this.busy()) void this.range.recordChanged(this.state.changed());
      });
    effect(() => {
      const worksheet = this.range.worksheet();
      const inputs = this.range.inputs();
      if (!worksheet || !inputs) return;
      untracked(() => {
        this.state.start(inputs, worksheet.policy);
      });
    });
  }

  /** Whether leaving would lose what was typed. */
  hasUnkept(): boolean {
    return !this.range.fixed() && this.range.ready() && this.state.changed() && !this.busy();
  }

  protected when(at: string): string {
    return `${formatDay(at, this.zone())}, ${formatTime(at, this.zone())}`;
  }

  protected choose(way: Pick<Candidate, 'method' | 'maximum'> | null): void {
    this.state.choose(way?.method ?? null, way?.maximum ?? null);
  }

  protected async keep(): Promise<void> {
    await this.#doing(async () => {
      const draft = await this.#keep();
      void this.#notices.say('The draft is kept.');
      if (!this.prescriptionId()) await this.#show(draft);
    });
  }

  protected async sign(): Promise<void> {
    const worksheet = this.range.worksheet();
    const answer = this.answer();
    if (!worksheet || !answer || this.stale() || this.busy()) return;
    const question = signingQuestion({
      worksheet,
      answer,
      asPhysician: this.#asPhysician(),
      causes: this.causes(),
      tried: this.#tried(),
    });
    if (!(await this.#confirm.ask(question))) return;
    await this.#doing(async () => {
      const seen = this.range.fixed() ?? (await this.#keep());
      const signed = await firstValueFrom(this.#client.sign(seen));
      this.range.wrote(signed);
      void this.#notices.say(
        signed.status === 'active'
          ? 'Signed. The range is in force.'
          : 'Signed. A physician signs next; the range is not in force yet.',
      );
      if (this.prescriptionId()) this.range.reload();
      else await this.#show(signed);
    });
  }

  protected async putAside(): Promise<void> {
    const stored = this.range.stored();
    if (!stored) return;
    const yes = await this.#confirm.ask({
      heading: 'Put this range aside?',
      lines: ['It stays in the list of versions, and nobody can sign it any more.'],
      yes: 'Put aside',
      no: 'Keep it',
    });
    if (!yes) return;
    await this.#doing(async () => {
      this.range.wrote(await firstValueFrom(this.#client.putAside(stored)));
      this.range.reload();
    });
  }

  /** The draft as it stands here, written where it is not yet. */
  async #keep(): Promise<Prescription> {
    const stored = this.range.stored();
    const policy = this.range.worksheet()?.policy;
    const upToDate =
      stored?.policyVersion === policy?.version && stored?.engineVersion === engineVersion;
    if (stored && upToDate && !this.state.changed()) return stored;
    const inputs = this.state.request();
    if (inputs === null) throw new Error('There is nothing to keep yet');
    const draft = await firstValueFrom(
      stored
        ? this.#client.change(stored, inputs)
        : this.#client.draft(this.patientId() ?? '', inputs),
    );
    this.range.wrote(draft);
    this.state.keep();
    this.range.reloadHistory();
    return draft;
  }

  /** A new draft has its own address from now on. */
  async #show({ id }: Prescription): Promise<void> {
    this.state.keep();
    await this.#router.navigate(['/prescriptions', id], { replaceUrl: true });
  }

  async #doing(work: () => Promise<void>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await work();
    } catch (error) {
      const problem = toProblem(error);
      const ofInputs = problem.errors.map(({ path, ...rest }) => ({
        ...rest,
        path: path.replace(/^inputs\./, ''),
      }));
      showFieldErrors(this.state.form, ofInputs);
      this.problem.set(problem);
    } finally {
      this.busy.set(false);
    }
  }
}

function isInvalid(control: { readonly invalid: boolean } | null): boolean {
  return control?.invalid ?? false;
}
