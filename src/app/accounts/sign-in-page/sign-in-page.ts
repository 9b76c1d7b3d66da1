import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { type DemoAccount, signInRequestSchema } from '@shared/contracts/accounts-contract';
import { Problem, toProblem } from '../../core/problem';
import { safeReturnPath } from '../../core/return-path';
import { Session } from '../../core/session';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { Mark } from '../../ui/mark/mark';
import { ProblemMessage } from '../../ui/problem-message/problem-message';

const rules = signInRequestSchema.shape;

const cookieRefused = new Problem(
  'unauthenticated',
  'The browser did not keep the sign-in. Allow cookies for this site, then try again.',
  401,
);

@Component({
  selector: 'app-sign-in-page',
  imports: [
    FieldError,
    Mark,
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './sign-in-page.html',
  styleUrls: ['../account-page.scss', './sign-in-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignInPage {
  readonly #router = inject(Router);
  protected readonly session = inject(Session);

  /** Where to go afterwards, from the address. */
  readonly return = input<string>();
  /** Set when the session ended while a page was open. */
  readonly ended = input<string>();

  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', zodValidator(rules.email)],
    password: ['', zodValidator(rules.password)],
  });
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected use(account: DemoAccount): void {
    this.form.setValue({ email: account.email, password: account.password });
    void this.signIn();
  }

  protected async signIn(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      await this.session.signIn(this.form.getRawValue());
      if (this.session.user() === null) throw this.session.problem() ?? cookieRefused;
      await this.#router.navigateByUrl(safeReturnPath(this.return(), location.origin) ?? '/');
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.sending.set(false);
    }
  }
}
