import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { firstAdministratorRequestSchema } from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { FormSending } from '../../ui/form-sending/form-sending';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { AccountsClient } from '../accounts-client';
import { takeLinkToken } from '../link-token';
import { NewPasswordField } from '../new-password-field/new-password-field';

const rules = firstAdministratorRequestSchema.shape;

/** Where the one-time link leads that an empty program prints at its start. */
@Component({
  selector: 'app-first-administrator-page',
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
  templateUrl: './first-administrator-page.html',
  styleUrl: '../account-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FirstAdministratorPage {
  readonly #client = inject(AccountsClient);

  protected readonly token = takeLinkToken();
  protected readonly form = inject(NonNullableFormBuilder).group({
    displayName: ['', zodValidator(rules.displayName)],
    email: ['', zodValidator(rules.email)],
    password: ['', zodValidator(rules.password)],
  });
  protected readonly sending = new FormSending(this.form);
  protected readonly done = signal(false);

  protected async save(token: string): Promise<void> {
    const request = { token, ...this.form.getRawValue() };
    const call = () => firstValueFrom(this.#client.makeFirstAdministrator(request));
    if (await this.sending.send(call)) this.done.set(true);
  }
}
