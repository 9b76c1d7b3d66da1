import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Closure, closureRequestSchema } from '@shared/contracts/class-templates-contract';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords } from '../../ui/site-time/site-time';
import { ScheduleClient } from '../schedule-client';

const rules = closureRequestSchema.shape;

/** The days on which a site holds no class. */
@Component({
  selector: 'app-closures',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './closures.html',
  styleUrl: './closures.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Closures {
  readonly #client = inject(ScheduleClient);
  readonly #notices = inject(Notices);

  readonly siteId = input.required<string>();
  readonly today = input.required<string>();

  readonly #closures = this.#client.closures(() => ({ siteId: this.siteId(), from: this.today() }));
  protected readonly rows = computed(() =>
    (this.#closures.hasValue() ? this.#closures.value() : []).map((closure) => ({
      closure,
      day: dateInWords(closure.localDate, 'full'),
    })),
  );
  protected readonly form = inject(NonNullableFormBuilder).group({
    localDate: ['', zodValidator(rules.localDate)],
    reason: ['', zodValidator(rules.reason)],
  });
  protected readonly busy = signal(false);
  readonly #failed = signal<Problem | null>(null);
  protected readonly problem = computed(() => {
    const error = this.#closures.error();
    return this.#failed() ?? (error ? toProblem(error) : null);
  });

  protected async close(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    await this.#try(async () => {
      const asked = this.form.getRawValue();
      const cancelled = await this.#client.closeSite({ ...asked, siteId: this.siteId() });
      this.form.reset();
      const people = `${cancelled} ${cancelled === 1 ? 'place was' : 'places were'} cancelled`;
      await this.#notices.say(`Closed on ${dateInWords(asked.localDate, 'full')}. ${people}.`);
    });
  }

  protected async reopen({ id }: Closure): Promise<void> {
    await this.#try(async () => {
      await this.#client.reopenSite(id);
      await this.#notices.say('Open again. Who was cancelled must be booked anew.');
    });
  }

  async #try(work: () => Promise<void>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.#failed.set(null);
    try {
      await work();
    } catch (error) {
      this.#failed.set(toProblem(error));
    } finally {
      this.busy.set(false);
      this.#closures.reload();
    }
  }
}
