import { Clipboard } from '@angular/cdk/clipboard';
import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { browserZone } from '../../ui/site-time/site-time';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { formatDay } from '../../ui/words/dates';
import { MySessionsClient } from '../my-sessions-client';

/** Makes the link by which a calendar program shows one's sessions, and replaces it. */
@Component({
  selector: 'app-calendar-link',
  imports: [MatButton, ProblemMessage],
  templateUrl: './calendar-link.html',
  styleUrl: './calendar-link.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CalendarLink {
  readonly #client = inject(MySessionsClient);
  readonly #clipboard = inject(Clipboard);
  readonly #notices = inject(Notices);

  readonly #state = this.#client.calendar();
  /** The link that was just made: only its hash is kept, so it is shown this once. */
  protected readonly url = signal<string | null>(null);
  /** What programs know a calendar by that they read again by themselves. */
  protected readonly subscription = computed(
    () => this.url()?.replace(/^https?:/, 'webcal:') ?? null,
  );
  protected readonly known = computed(() => valueOf(this.#state));
  protected readonly madeOn = computed(() => {
    const madeAt = this.known()?.madeAt;
    return madeAt ? formatDay(madeAt, browserZone()) : null;
  });
  protected readonly asking = signal(false);
  protected readonly busy = signal(false);
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(() => this.#refused() ?? failureOf(this.#state));

  protected async make(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.#refused.set(null);
    try {
      this.url.set(await this.#client.renewCalendar());
      this.asking.set(false);
      this.#state.reload();
    } catch (error) {
      this.#refused.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }

  protected async copy(url: string): Promise<void> {
    const copied = this.#clipboard.copy(url);
    await this.#notices.say(
      copied ? 'Link copied.' : 'It could not be copied. Press and hold the link to copy it.',
    );
  }
}
