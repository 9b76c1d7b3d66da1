import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { PatientRecord } from '@shared/contracts/record-contract';
import { v7 as uuidv7 } from 'uuid';
import { type Problem, toProblem } from '../../core/problem';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { StateChip } from '../../ui/state-chip/state-chip';
import { formatDay } from '../../ui/words/dates';
import { PatientChart } from '../patient-chart';

/** When the list was last gone through with the patient, and the button that says so today. */
@Component({
  selector: 'app-medication-review',
  imports: [Icon, MatButton, ProblemMessage, StateChip],
  template: `
    <app-problem-message [problem]="problem()" />
    <div class="review">
      @if (last(); as entry) {
        <p class="num">
          List verified {{ day(entry.recordedAt) }} by {{ entry.recordedBy.displayName }}.
        </p>
      } @else {
        <app-state-chip tone="due">Never verified: drugs count as not known</app-state-chip>
      }
      <button
        type="button"
        matButton="tonal"
        (click)="verify()"
        [disabled]="sending()"
        disabledInteractive
      >
        <app-icon name="check" /> List verified today
      </button>
    </div>
  `,
  styles: `
    .review {
      display: flex;
      flex-wrap: wrap;
      gap: 0.5rem 1rem;
      align-items: center;
      margin-bottom: 0.5rem;
    }
    p {
      margin: 0;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MedicationReview {
  readonly #chart = inject(PatientChart);

  readonly record = input.required<PatientRecord>();
  readonly timeZone = input.required<string>();

  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly last = computed(() =>
    this.record()['medication-reviews'].find((entry) => entry.enteredInErrorAt === null),
  );
  protected readonly day = (instant: string) => formatDay(instant, this.timeZone());

  protected async verify(): Promise<void> {
    if (this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      const review = { kind: 'medication-reviews' as const, id: uuidv7(), values: {} };
      await this.#chart.add([review], 'List of drugs verified.');
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.sending.set(false);
    }
  }
}
