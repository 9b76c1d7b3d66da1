import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors } from '../../ui/field-error/zod-validator';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { emailControl, personControls } from '../person-form/person-controls';
import { PersonForm } from '../person-form/person-form';
import { SettingsClient } from '../settings-client';

/** Invites a member of staff; patients are invited from their record. */
@Component({
  selector: 'app-invite-page',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    PageHeader,
    PersonForm,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './invite-page.html',
  styleUrl: '../settings-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class InvitePage {
  readonly #client = inject(SettingsClient);
  readonly #router = inject(Router);
  readonly #notices = inject(Notices);
  readonly #sites = this.#client.sites();
  readonly #refused = signal<Problem | null>(null);

  protected readonly sites = computed(() => valueOf(this.#sites) ?? []);
  protected readonly person = personControls();
  protected readonly email = emailControl();
  protected readonly sending = signal(false);
  protected readonly problem = computed(() => this.#refused() ?? failureOf(this.#sites));

  protected async send(): Promise<void> {
    this.person.markAllAsTouched();
    this.email.markAsTouched();
    if (this.person.invalid || this.email.invalid || this.sending()) return;
    this.sending.set(true);
    this.#refused.set(null);
    try {
      const { roles, siteIds, ...rest } = this.person.getRawValue();
      const request = {
        ...rest,
        email: this.email.value,
        roles: [...roles],
        siteIds: [...siteIds],
      };
      const made = await firstValueFrom(this.#client.invite(request));
      void this.#notices.say(`${made.displayName} is invited: the link is on its way by e-mail.`);
      await this.#router.navigateByUrl('/settings/people');
    } catch (error) {
      this.#show(toProblem(error));
    } finally {
      this.sending.set(false);
    }
  }

  #show(problem: Problem): void {
    if (problem.code === 'email-taken') {
      this.email.setErrors({ server: problem.title });
      return;
    }
    const elsewhere = showFieldErrors(this.person, problem.errors).filter(({ path, message }) => {
      if (path === 'email') this.email.setErrors({ server: message });
      return path !== 'email';
    });
    if (problem.errors.length === 0 || elsewhere.length > 0) this.#refused.set(problem);
  }
}
