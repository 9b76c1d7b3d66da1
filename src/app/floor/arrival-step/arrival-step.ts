import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';
import { type Problem, toProblem } from '../../core/problem';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { FloorBoard } from '../floor-board';
import type { Visit } from '../visit/visit';

interface Choice {
  readonly label: string;
  /** The statuses on the way, in order. */
  readonly to: readonly AppointmentStatus[];
}

const choices: Partial<Record<AppointmentStatus, readonly Choice[]>> = {
  booked: [
    { label: 'Check in', to: ['arrived', 'checked-in'] },
    { label: 'Arrived, not checked in', to: ['arrived'] },
    { label: 'No-show', to: ['noshow'] },
  ],
  arrived: [
    { label: 'Check in', to: ['checked-in'] },
    { label: 'Undo arrival', to: ['booked'] },
  ],
  noshow: [{ label: 'Undo no-show', to: ['booked'] }],
  'checked-in': [{ label: 'Undo check-in', to: ['booked'] }],
};

/** Where a patient stands before the first entry: here, checked in, or not coming; each step can be undone. */
@Component({
  selector: 'app-arrival-step',
  imports: [MatButton, ProblemMessage],
  template: `
    @for (choice of choices(); track choice.label) {
      <button
        type="button"
        [matButton]="$first && visit().status !== 'checked-in' ? 'filled' : 'outlined'"
        [disabled]="busy()"
        (click)="take(choice)"
      >
        {{ choice.label }}
      </button>
    }
    @if (visit().leadBy !== null && visit().status !== 'noshow') {
      <button
        type="button"
        matButton="outlined"
        [disabled]="busy()"
        (click)="missed(!doseMissed())"
      >
        {{ doseMissed() ? 'Undo: today’s dose was taken' : 'Missed today’s heart-rate drug' }}
      </button>
    }
    <app-problem-message [problem]="problem()" />
  `,
  styleUrl: './arrival-step.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ArrivalStep {
  readonly #board = inject(FloorBoard);
  readonly visit = input.required<Visit>();
  protected readonly busy = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly choices = computed(() => choices[this.visit().status] ?? []);

  protected readonly doseMissed = computed(() =>
    this.visit().rangeFlags.some(({ effect }) => effect === 'effort-today'),
  );

  protected async take({ to }: Choice): Promise<void> {
    await this.#doing(() => this.#board.changeStatus(this.visit().appointmentId, ...to));
  }

  protected async missed(missed: boolean): Promise<void> {
    await this.#doing(() => this.#board.missedDose(this.visit().appointmentId, missed));
  }

  async #doing(work: () => Promise<void>): Promise<void> {
    this.busy.set(true);
    this.problem.set(null);
    try {
      await work();
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }
}
