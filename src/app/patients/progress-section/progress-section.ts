import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import type { DecisionRequest, Proposal } from '@shared/contracts/progression-contract';
import { firstValueFrom } from 'rxjs';
import { LiveChanges } from '../../core/live-changes';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { Session } from '../../core/session';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { type Work, WorkForm } from '../../ui/work-form/work-form';
import { formatDay, formatLocalDate } from '../../ui/words/dates';
import { actionWords, decisionWords, loadText } from '../../ui/words/load-words';
import { rangeText } from '../../ui/words/prescription-words';
import { PatientChart } from '../patient-chart';
import { PatientsClient } from '../patients-client';
import { WIDTH, drawCourse } from './course-drawing';

const tones: Readonly<Record<Proposal['action'], Tone>> = {
  hold: 'plain',
  longer: 'in',
  harder: 'in',
  easier: 'due',
  review: 'over',
};

/** How the course goes, session by session against the range, and the next step for a person to decide on. */
@Component({
  selector: 'app-progress-section',
  imports: [
    EmptyState,
    MatButton,
    MatFormField,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
    Skeleton,
    StateChip,
    WorkForm,
  ],
  templateUrl: './progress-section.html',
  styleUrl: './progress-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProgressSection {
  readonly #client = inject(PatientsClient);
  readonly #notices = inject(Notices);
  readonly #roles = inject(Session).roles;
  readonly #id = inject(PatientChart).id;
  readonly #resource = this.#client.courseSoFar(this.#id);

  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly course = computed(() => valueOf(this.#resource));
  protected readonly proposal = computed(() => this.course()?.proposal ?? null);
  protected readonly drawing = computed(() => drawCourse(this.course()?.sessions ?? []));
  protected readonly box = computed(() => `0 0 ${WIDTH} ${this.drawing().height}`);
  protected readonly rows = computed(() => [...(this.course()?.sessions ?? [])].reverse());
  protected readonly mayDecide = computed(
    () =>
      this.proposal()?.decision === null &&
      this.#roles().some((role) => role === 'exercise-physiologist' || role === 'physician'),
  );
  /** A review without an easier load is not to be accepted: something comes first. */
  protected readonly acceptable = computed(() => {
    const next = this.proposal();
    return next !== null && (next.to ?? (next.action === 'review' ? null : next.from)) !== null;
  });
  protected readonly ways = signal<'none' | 'edit' | 'dismiss'>('none');
  protected readonly reason = new FormControl('', { nonNullable: true });
  protected readonly busy = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected readonly actionWords = actionWords;
  protected readonly decisionWords = decisionWords;
  protected readonly tones = tones;
  protected readonly loadText = loadText;
  protected readonly rangeText = rangeText;
  protected readonly date = formatLocalDate;

  constructor() {
    inject(LiveChanges)
      .of(['range', 'visit'], (patientId) => patientId === this.#id())
      .pipe(takeUntilDestroyed())
      .subscribe(() => {
        if (this.ways() === 'none' && !this.busy()) this.#resource.reload();
      });
  }

  protected day(at: string): string {
    return formatDay(at, this.course()?.timeZone ?? 'UTC');
  }

  protected async accept({ id }: Proposal): Promise<void> {
    await this.#decide(id, { decision: 'accepted' }, 'Accepted. The next session starts with it.');
  }

  protected async edit({ id }: Proposal, work: Work): Promise<void> {
    const reason = this.reason.value.trim();
    await this.#decide(
      id,
      { decision: 'edited', ...work, reason },
      'The next session starts with it.',
    );
  }

  protected async dismiss({ id }: Proposal): Promise<void> {
    const reason = this.reason.value.trim();
    await this.#decide(id, { decision: 'dismissed', reason }, 'Dismissed.');
  }

  async #decide(id: string, request: DecisionRequest, said: string): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await firstValueFrom(this.#client.decide(id, request));
      this.ways.set('none');
      this.reason.reset();
      this.#resource.reload();
      void this.#notices.say(said);
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }
}
