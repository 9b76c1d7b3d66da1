import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import type { Site } from '@shared/contracts/sites-contract';
import { roleNames } from '../../core/role-names';
import { FieldError } from '../../ui/field-error/field-error';
import { type PersonControls, type StaffRole, toggled } from './person-controls';

const roleChoices: readonly { role: StaffRole; may: string }[] = [
  { role: 'nurse', may: 'checks in, logs vitals, books' },
  { role: 'exercise-physiologist', may: 'prescribes ranges, books' },
  { role: 'physician', may: 'signs ranges, reads charts' },
  { role: 'front-desk', may: 'referrals, bookings, payments' },
  { role: 'director', may: 'reports' },
  { role: 'administrator', may: 'accounts, sites, audit' },
];

/** Name, roles, sites and marks of an account; what else a page asks stands in its content, under the name. */
@Component({
  selector: 'app-person-form',
  imports: [FieldError, MatError, MatFormField, MatInput, MatLabel, ReactiveFormsModule],
  templateUrl: './person-form.html',
  styleUrl: './person-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PersonForm {
  readonly controls = input.required<PersonControls>();
  readonly sites = input.required<readonly Site[]>();
  /** A patient's own account has neither roles nor sites to choose. */
  readonly patientAlone = input(false);

  protected readonly roleChoices = roleChoices;
  protected readonly roleNames = roleNames;

  protected toggleRole(role: StaffRole): void {
    const { roles } = this.controls().controls;
    roles.setValue(toggled(roles.value, role));
    roles.markAsTouched();
    roles.markAsDirty();
  }

  protected toggleSite(id: string): void {
    const { siteIds } = this.controls().controls;
    siteIds.setValue(toggled(siteIds.value, id));
    siteIds.markAsDirty();
  }
}
