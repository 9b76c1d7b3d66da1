import { ChangeDetectionStrategy, Component, input, model } from '@angular/core';
import { type FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { passwordLength } from '@shared/contracts/accounts-contract';
import { FieldError } from '../../ui/field-error/field-error';

/** A password to be chosen, and a box that shows what is typed. */
@Component({
  selector: 'app-new-password-field',
  imports: [FieldError, MatError, MatFormField, MatHint, MatInput, MatLabel, ReactiveFormsModule],
  templateUrl: './new-password-field.html',
  styleUrl: './new-password-field.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NewPasswordField {
  readonly control = input.required<FormControl<string>>();
  readonly label = input('New password');
  readonly showLabel = input('Show it');
  readonly shown = model(false);

  protected readonly length = passwordLength;
}
