import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatAutocomplete, MatAutocompleteTrigger, MatOption } from '@angular/material/autocomplete';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { newSiteSchema } from '@shared/contracts/sites-contract';
import { firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { SettingsClient } from '../settings-client';
import { matchingZones, timeIn } from '../time-zones';

const rules = newSiteSchema.shape;
const zones = Intl.supportedValuesOf('timeZone');

/** Adds a site; its zone decides when its classes are. */
@Component({
  selector: 'app-add-site-page',
  imports: [
    FieldError,
    MatAutocomplete,
    MatAutocompleteTrigger,
    MatButton,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    MatOption,
    PageHeader,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './add-site-page.html',
  styleUrls: ['../settings-page.scss', './add-site-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AddSitePage {
  readonly #client = inject(SettingsClient);
  readonly #router = inject(Router);
  readonly #notices = inject(Notices);

  protected readonly form = inject(NonNullableFormBuilder).group({
    name: ['', zodValidator(rules.name)],
    timeZone: [Intl.DateTimeFormat().resolvedOptions().timeZone, zodValidator(rules.timeZone)],
    address: ['', zodValidator(rules.address)],
    phone: ['', zodValidator(rules.phone)],
  });
  readonly #zone = toSignal(this.form.controls.timeZone.valueChanges, {
    initialValue: this.form.controls.timeZone.value,
  });
  /** All of them again once one is chosen. */
  protected readonly zones = computed(() => {
    const typed = this.#zone();
    return matchingZones(zones, zones.includes(typed) ? '' : typed, zones.length);
  });
  protected readonly timeThere = computed(() => timeIn(this.#zone(), new Date()));
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      const site = await firstValueFrom(this.#client.addSite(this.form.getRawValue()));
      void this.#notices.say(`${site.name} is added. Choose who works there under People.`);
      await this.#router.navigateByUrl('/settings/sites');
    } catch (error) {
      this.#show(toProblem(error));
    } finally {
      this.sending.set(false);
    }
  }

  #show(problem: Problem): void {
    if (problem.code === 'already-recorded') {
      this.form.controls.name.setErrors({ server: 'Another site has this name' });
      return;
    }
    const elsewhere = showFieldErrors(this.form, problem.errors);
    if (problem.errors.length === 0 || elsewhere.length > 0) this.problem.set(problem);
  }
}
