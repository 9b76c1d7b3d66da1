import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { PrescribingInputs } from '@shared/contracts/prescribing-inputs-contract';
import { InputRow } from './input-row';
import { rows } from './rows';

/** Everything that a range rests on. */
@Component({
  selector: 'app-rests-on',
  imports: [InputRow],
  template: `
    @for (row of rows; track row.id) {
      <app-input-row
        [row]="row"
        [record]="record()"
        [signed]="signed()"
        [answer]="answer()"
        [today]="today()"
      />
    }
  `,
  styles: ':host { display: block }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RestsOn {
  readonly record = input.required<PrescribingInputs | null>();
  readonly signed = input<PrescriptionRequest | null>(null);
  readonly answer = input.required<PrescriptionAnswer | null>();
  /** The site's date of today. */
  readonly today = input.required<string>();
  protected readonly rows = rows;
}
