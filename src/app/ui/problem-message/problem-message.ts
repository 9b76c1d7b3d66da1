import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { Icon } from '../icon/icon';

/** What a failed call gives to show: `Problem` of core fits. */
interface ShownProblem {
  readonly title: string;
  readonly id: string | null;
  readonly retryAfter: number | null;
}

/** The one place of a page where a failure is told; a way out, such as "Try again", is its content. */
@Component({
  selector: 'app-problem-message',
  imports: [Icon],
  template: `
    <div role="alert">
      @if (problem(); as shown) {
        <div class="box">
          <app-icon name="error" />
          <div>
            <p class="title">{{ shown.title }}</p>
            @if (shown.retryAfter; as seconds) {
              <p>Try again in {{ seconds }} {{ seconds === 1 ? 'second' : 'seconds' }}.</p>
            }
            @if (shown.id; as id) {
              <p class="reference">Reference {{ id }}</p>
            }
            <ng-content />
          </div>
        </div>
      }
    </div>
  `,
  styleUrl: './problem-message.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProblemMessage {
  readonly problem = input.required<ShownProblem | null>();
}
