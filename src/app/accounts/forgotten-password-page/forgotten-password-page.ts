import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { emailSchema } from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { AccountsClient } from '../accounts-client';

@Component({
  selector: 'app-forgotten-password-page',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './forgotten-password-page.html',
  styleUrl: '../account-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ForgottenPasswordPage {
  readonly #client = inject(AccountsClient);

  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', zodValidator(emailSchema)],
  });
  protected readonly sending = signal(false);
  protected readonly sent = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      await firstValueFrom(this.#client.askForLink(this.form.getRawValue()));
      this.sent.set(true);
    } catch (error) {
      const problem = toProblem(error);
      showFieldErrors(this.form, problem.errors);
      this.problem.set(problem);
    } finally {
      this.sending.set(false);
    }
  }
}
