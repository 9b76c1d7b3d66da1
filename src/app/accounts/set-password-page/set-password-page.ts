import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { newPasswordSchema } from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { FormSending } from '../../ui/form-sending/form-sending';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { AccountsClient } from '../accounts-client';
import { takeLinkToken } from '../link-token';
import { NewPasswordField } from '../new-password-field/new-password-field';

/** Where reset and invitation links lead: a new password against the link's token. */
@Component({
  selector: 'app-set-password-page',
  imports: [MatButton, NewPasswordField, ProblemMessage, ReactiveFormsModule, RouterLink],
  templateUrl: './set-password-page.html',
  styleUrl: '../account-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SetPasswordPage {
  readonly #client = inject(AccountsClient);

  protected readonly token = takeLinkToken();
  protected readonly form = inject(NonNullableFormBuilder).group({
    password: ['', zodValidator(newPasswordSchema)],
  });
  protected readonly sending = new FormSending(this.form);
  protected readonly done = signal(false);

  protected async save(token: string): Promise<void> {
    const { password } = this.form.getRawValue();
    const call = () => firstValueFrom(this.#client.setPassword({ token, password }));
    if (await this.sending.send(call)) this.done.set(true);
  }
}
