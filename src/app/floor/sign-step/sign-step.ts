import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { type Problem, toProblem } from '../../core/problem';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { FloorBoard } from '../floor-board';
import { clockText } from '../floor-time';
import { ReadingsList } from '../readings-list/readings-list';
import { type Visit, currentReadings } from '../visit/visit';

/** Shows all readings of a visit and signs its record in one press, once the server has everything. */
@Component({
  selector: 'app-sign-step',
  imports: [MatButton, ProblemMessage, ReadingsList],
  templateUrl: './sign-step.html',
  styleUrl: './sign-step.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignStep {
  readonly #board = inject(FloorBoard);
  readonly visit = input.required<Visit>();
  readonly timeZone = input.required<string>();
  readonly closed = output();

  protected readonly busy = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly time = computed(() => clockText(this.#board.now(), this.timeZone()));
  protected readonly unsent = computed(
    () =>
      this.visit().recordEntry !== null ||
      this.visit().workEntry !== null ||
      this.visit().readings.some(({ entry }) => entry !== null),
  );
  protected readonly exercised = computed(() =>
    currentReadings(this.visit().readings).some(({ phase }) => phase === 'exercise'),
  );

  protected async sign(exercised: boolean): Promise<void> {
    const { recordId } = this.visit();
    if (recordId === null || this.unsent()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await this.#board.sign(recordId, exercised);
      this.closed.emit();
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }
}
