import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { changePasswordRequestSchema, passwordLength } from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { AccountsClient } from '../accounts-client';

const rules = changePasswordRequestSchema.shape;

/** Changes one's own password. */
@Component({
  selector: 'app-change-password-page',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './change-password-page.html',
  styleUrls: ['../account-page.scss', '../set-password-page/set-password-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChangePasswordPage {
  readonly #client = inject(AccountsClient);

  protected readonly length = passwordLength;
  protected readonly form = inject(NonNullableFormBuilder).group({
    currentPassword: ['', zodValidator(rules.currentPassword)],
    newPassword: ['', zodValidator(rules.newPassword)],
  });
  protected readonly shown = signal(false);
  protected readonly sending = signal(false);
  protected readonly done = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      await firstValueFrom(this.#client.changePassword(this.form.getRawValue()));
      this.done.set(true);
    } catch (error) {
      this.#show(toProblem(error));
    } finally {
      this.sending.set(false);
    }
  }

  #show(problem: Problem): void {
    if (problem.code === 'wrong-password') {
      this.form.controls.currentPassword.setErrors({ server: problem.title });
      return;
    }
    const elsewhere = showFieldErrors(this.form, problem.errors);
    if (problem.errors.length === 0 || elsewhere.length > 0) this.problem.set(problem);
  }
}
