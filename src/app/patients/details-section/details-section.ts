import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NonNullableFormBuilder } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Patient } from '@shared/contracts/patients-contract';
import { firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { Fact } from '../../ui/fact/fact';
import { showFieldErrors } from '../../ui/field-error/zod-validator';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { sexWords } from '../../ui/words/clinical-words';
import { formatLocalDate } from '../../ui/words/dates';
import { PatientAccess } from '../patient-access';
import { PatientChart } from '../patient-chart';
import {
  PatientForm,
  type PatientGroup,
  patientGroup,
  readPatientGroup,
} from '../patient-form/patient-form';
import { PatientsClient } from '../patients-client';
import { valueOf } from '../../core/resource-state';

const accountWords: Readonly<Record<Patient['account'], string>> = {
  none: 'None',
  invited: 'Invited, not used yet',
  active: 'In use',
};

/** Who the patient is and how to reach them, changed in place; the invitation to an account. */
@Component({
  selector: 'app-details-section',
  imports: [Fact, Icon, MatButton, PatientForm, ProblemMessage],
  templateUrl: './details-section.html',
  styleUrl: './details-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DetailsSection {
  readonly #client = inject(PatientsClient);
  readonly #chart = inject(PatientChart);
  readonly #notices = inject(Notices);
  readonly #builder = inject(NonNullableFormBuilder);
  protected readonly access = inject(PatientAccess);

  protected readonly patient = computed(() => valueOf(this.#chart.patient));
  readonly #sites = this.#client.sites();
  protected readonly sites = computed(() => valueOf(this.#sites) ?? []);
  /** The form and the patient that it was filled from, while it is open. */
  protected readonly editing = signal<{ group: PatientGroup; version: number } | null>(null);
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly sexWords = sexWords;
  protected readonly accountWords = accountWords;
  protected readonly date = formatLocalDate;

  protected edit(patient: Patient): void {
    this.problem.set(null);
    this.editing.set({ group: patientGroup(this.#builder, patient), version: patient.version });
  }

  protected async save(id: string): Promise<void> {
    const edited = this.editing();
    if (edited === null || this.sending()) return;
    const { group, version } = edited;
    group.markAllAsTouched();
    if (group.invalid) return;
    await this.#try(group, async () => {
      await firstValueFrom(this.#client.change(id, { version, ...readPatientGroup(group) }));
      this.editing.set(null);
      await this.#notices.say('Details saved.');
    });
  }

  protected async invite(id: string): Promise<void> {
    await this.#try(null, async () => {
      await firstValueFrom(this.#client.invite(id));
      await this.#notices.say('Invitation sent.');
    });
  }

  async #try(group: PatientGroup | null, work: () => Promise<void>): Promise<void> {
    if (this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      await work();
      this.#chart.reload();
    } catch (error) {
      const problem = toProblem(error);
      const rest = group ? showFieldErrors(group, problem.errors) : problem.errors;
      if (rest.length > 0 || problem.errors.length === 0) this.problem.set(problem);
    } finally {
      this.sending.set(false);
    }
  }
}
