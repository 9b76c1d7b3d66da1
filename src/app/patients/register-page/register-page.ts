import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { PatientListItem } from '@shared/contracts/patients-contract';
import { catchError, debounceTime, filter, firstValueFrom, map, of, switchMap } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { showFieldErrors } from '../../ui/field-error/zod-validator';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { formatLocalDate } from '../../ui/words/dates';
import { PatientForm, patientGroup, readPatientGroup } from '../patient-form/patient-form';
import { PatientsClient } from '../patients-client';
import { valueOf } from '../../core/resource-state';

const typingPauseMs = 300;

/** Registers a patient, and shows on the way who has the same name and birth date already. */
@Component({
  selector: 'app-register-page',
  imports: [MatButton, PageHeader, PatientForm, ProblemMessage, RouterLink],
  templateUrl: './register-page.html',
  styleUrl: './register-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RegisterPage {
  readonly #client = inject(PatientsClient);
  readonly #router = inject(Router);

  protected readonly group = patientGroup(inject(NonNullableFormBuilder));
  readonly #sites = this.#client.sites();
  protected readonly sites = computed(() => valueOf(this.#sites) ?? []);
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly date = formatLocalDate;

  /** Those who may be the same person; a search that fails is no reason to stop. */
  protected readonly alike = toSignal(
    this.group.valueChanges.pipe(
      debounceTime(typingPauseMs),
      map(({ familyName = '', birthDate = '' }) => `${familyName.trim()} ${birthDate}`),
      filter(() => this.group.controls.familyName.valid && this.group.controls.birthDate.valid),
      switchMap((q) =>
        this.#client.search({ q: q.slice(0, 100), limit: 5 }).pipe(
          map(({ items }) => items),
          catchError(() => of([])),
        ),
      ),
    ),
    { initialValue: [] as PatientListItem[] },
  );

  protected async register(): Promise<void> {
    this.group.markAllAsTouched();
    if (this.group.invalid || this.sending()) return this.#focusFault();
    this.sending.set(true);
    this.problem.set(null);
    try {
      const { id } = await firstValueFrom(this.#client.register(readPatientGroup(this.group)));
      await this.#router.navigate(['/patients', id, 'course']);
    } catch (error) {
      this.#tell(toProblem(error));
    } finally {
      this.sending.set(false);
    }
  }

  #tell(problem: Problem): void {
    const rest = showFieldErrors(this.group, problem.errors);
    if (rest.length > 0 || problem.errors.length === 0) this.problem.set(problem);
    else this.#focusFault();
  }

  #focusFault(): void {
    document.querySelector<HTMLElement>('main .ng-invalid:is(input, select)')?.focus();
  }
}
