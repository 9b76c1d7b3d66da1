import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import {
  firstAdministratorRequestSchema,
  passwordLength,
} from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { AccountsClient } from '../accounts-client';

const rules = firstAdministratorRequestSchema.shape;

/** Where the one-time link leads that an empty program prints at its start. */
@Component({
  selector: 'app-first-administrator-page',
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
  templateUrl: './first-administrator-page.html',
  styleUrls: ['../account-page.scss', '../set-password-page/set-password-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FirstAdministratorPage {
  readonly #client = inject(AccountsClient);
  readonly #route = inject(ActivatedRoute);
  readonly #router = inject(Router);
  readonly #token = new URLSearchParams(this.#route.snapshot.fragment ?? '').get('token');

  protected readonly linkIsWhole = this.#token !== null;
  protected readonly length = passwordLength;
  protected readonly form = inject(NonNullableFormBuilder).group({
    displayName: ['', zodValidator(rules.displayName)],
    email: ['', zodValidator(rules.email)],
    password: ['', zodValidator(rules.password)],
  });
  protected readonly shown = signal(false);
  protected readonly sending = signal(false);
  protected readonly done = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  constructor() {
    // The token leaves the address bar and the history at once.
    if (this.linkIsWhole) void this.#router.navigate([], { replaceUrl: true });
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending() || this.#token === null) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      const request = { token: this.#token, ...this.form.getRawValue() };
      await firstValueFrom(this.#client.makeFirstAdministrator(request));
      this.done.set(true);
    } catch (error) {
      const problem = toProblem(error);
      showFieldErrors(this.form, problem.errors);
      this.problem.set(problem);
    } finally {
      this.sending.set(false);
    }
  }
}
