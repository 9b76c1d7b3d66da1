import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { changePasswordRequestSchema } from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { FormSending } from '../../ui/form-sending/form-sending';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { AccountsClient } from '../accounts-client';
import { NewPasswordField } from '../new-password-field/new-password-field';

const rules = changePasswordRequestSchema.shape;

/** Changes one's own password. */
@Component({
  selector: 'app-change-password-page',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    NewPasswordField,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './change-password-page.html',
  styleUrl: '../account-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChangePasswordPage {
  readonly #client = inject(AccountsClient);

  protected readonly form = inject(NonNullableFormBuilder).group({
    currentPassword: ['', zodValidator(rules.currentPassword)],
    newPassword: ['', zodValidator(rules.newPassword)],
  });
  protected readonly sending = new FormSending(this.form, {
    'wrong-password': { field: 'currentPassword' },
  });
  protected readonly shown = signal(false);
  protected readonly done = signal(false);

  protected async save(): Promise<void> {
    const call = () => firstValueFrom(this.#client.changePassword(this.form.getRawValue()));
    if (await this.sending.send(call)) this.done.set(true);
  }
}
