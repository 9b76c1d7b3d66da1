import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { type NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Patient, registerPatientRequestSchema } from '@shared/contracts/patients-contract';
import type { Site } from '@shared/contracts/sites-contract';
import { sexes } from '@shared/clinical/prescribing/request';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { sexWords } from '../../ui/words/clinical-words';

const rules = registerPatientRequestSchema.shape;

/** An empty field of the form stands for nothing. */
const orNothing = (text: string): string | null => (text.trim() === '' ? null : text);

function optional(rule: Parameters<typeof zodValidator>[0]) {
  const check = zodValidator(rule);
  return (control: Parameters<typeof check>[0]) =>
    orNothing(String(control.value)) === null ? null : check(control);
}

/** The controls of who a patient is and how to reach them; `patient` fills them. */
export function patientGroup(builder: NonNullableFormBuilder, patient?: Patient) {
  return builder.group({
    familyName: [patient?.familyName ?? '', zodValidator(rules.familyName)],
    givenName: [patient?.givenName ?? '', zodValidator(rules.givenName)],
    birthDate: [patient?.birthDate ?? '', zodValidator(rules.birthDate)],
    sexAtBirth: [patient?.sexAtBirth ?? '', zodValidator(rules.sexAtBirth)],
    recordNumber: [patient?.recordNumber ?? '', zodValidator(rules.recordNumber)],
    siteId: [patient?.site.id ?? '', zodValidator(rules.siteId)],
    phone: [patient?.phone ?? '', optional(rules.phone)],
    email: [patient?.email ?? '', optional(rules.email)],
  });
}

export type PatientGroup = ReturnType<typeof patientGroup>;

/** What the form says, as the contract takes it. */
export function readPatientGroup(group: PatientGroup) {
  const { sexAtBirth, phone, email, ...rest } = group.getRawValue();
  return {
    ...rest,
    sexAtBirth: sexAtBirth as Patient['sexAtBirth'],
    phone: orNothing(phone),
    email: orNothing(email),
  };
}

/** The fields of a patient's name, number, site and contact, for registering and for changing. */
@Component({
  selector: 'app-patient-form',
  imports: [FieldError, MatError, MatFormField, MatHint, MatInput, MatLabel, ReactiveFormsModule],
  templateUrl: './patient-form.html',
  styleUrl: './patient-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PatientForm {
  readonly group = input.required<PatientGroup>();
  readonly sites = input.required<readonly Site[]>();
  protected readonly sexes = sexes.map((value) => ({ value, label: sexWords[value] }));
}
