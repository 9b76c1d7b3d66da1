import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { type Problem, toProblem } from '../../core/problem';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { MessagesClient } from '../messages-client';

/** Asks whether to stop reminders; opening the page alone, as scanners of mail do, stops nothing. */
@Component({
  selector: 'app-unsubscribe-page',
  imports: [MatButton, PageHeader, ProblemMessage, RouterLink],
  templateUrl: './unsubscribe-page.html',
  styleUrl: './unsubscribe-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class UnsubscribePage {
  readonly #client = inject(MessagesClient);

  /** Of the address. */
  readonly token = input.required<string>();

  protected readonly stopped = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected async stop(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await this.#client.stopReminders(this.token());
      this.stopped.set(true);
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }
}
