import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { evaluatePrescription } from '@shared/clinical/prescribing';
import type { PrescribingInputs } from '@shared/contracts/prescribing-inputs-contract';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import { compareMain } from '../compare/compare-answers';
import { DifferenceTable } from '../compare/difference-table';
import { isSameAt, rows } from '../rests-on/rows';
import { WorksheetState } from '../worksheet/worksheet-state';

/** What the inputs tried here do to the range: by the record, as tried, and the way back to the record. */
@Component({
  selector: 'app-tried-change',
  imports: [DifferenceTable, MatButton],
  template: `
    @if (tried().length > 0) {
      <h3>What this changes</h3>
      <p>Not as in the record: {{ triedWords() }}.</p>
      @if (groups(); as both) {
        <app-difference-table
          label="What this changes"
          [groups]="both"
          [columns]="['By the record', 'As tried']"
        />
      } @else if (byRecord() === null) {
        <p class="muted">The record alone is not enough to work out a range.</p>
      }
      <button matButton="outlined" type="button" (click)="backToRecord()">
        Back to the record
      </button>
    }
  `,
  styles: `
    :host:not(:empty) {
      display: grid;
      gap: 0.5rem;
      margin-top: 0.75rem;
    }

    h3,
    p {
      margin: 0;
    }

    h3 {
      font-size: 1rem;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TriedChange {
  protected readonly state = inject(WorksheetState);
  readonly record = input.required<PrescribingInputs>();

  protected readonly tried = computed(() =>
    rows.filter((row) => !isSameAt(row, this.state.value(), this.record().inputs)),
  );
  protected readonly triedWords = computed(() =>
    this.tried()
      .map(({ label }) => label.toLowerCase())
      .join(', '),
  );
  protected readonly byRecord = computed(() => {
    const policy = this.state.policy();
    const request = prescriptionRequestSchema.safeParse(this.record().inputs);
    if (!policy || !request.success) return null;
    const evaluation = evaluatePrescription(request.data, policy);
    return evaluation.ok ? evaluation.answer : null;
  });
  protected readonly groups = computed(() => {
    const [before, after] = [this.byRecord(), this.state.answer()];
    return before && after ? [{ heading: '', rows: compareMain(before, after) }] : null;
  });

  protected backToRecord(): void {
    this.state.takeFrom(
      this.record().inputs,
      this.tried().flatMap(({ paths }) => paths),
    );
  }
}
