import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { PatientIdentifier } from '@shared/contracts/floor-contract';
import { v7 as uuidv7 } from 'uuid';
import { formatLocalDate } from '../../ui/words/dates';
import { EntryQueue } from '../entry-queue/entry-queue';
import { FloorBoard } from '../floor-board';
import type { Visit } from '../visit/visit';

/** Two identifiers stand before the first entry: who confirms them begins the record. */
@Component({
  selector: 'app-identity-step',
  imports: [MatButton],
  template: `
    <h3>Who is this?</h3>
    <p>Ask for the name and one more before the first entry.</p>
    <dl class="num">
      <div>
        <dt>Name</dt>
        <dd>{{ visit().displayName }}</dd>
      </div>
      <div>
        <dt>Date of birth</dt>
        <dd>{{ birthDate() }}</dd>
      </div>
      <div>
        <dt>Record number</dt>
        <dd>{{ visit().recordNumber }}</dd>
      </div>
    </dl>
    <button type="button" matButton="filled" (click)="confirm('birth-date')">
      Name and date of birth match
    </button>
    <button type="button" matButton="outlined" (click)="confirm('record-number')">
      Name and record number match
    </button>
  `,
  styleUrl: './identity-step.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class IdentityStep {
  readonly #board = inject(FloorBoard);
  readonly #queue = inject(EntryQueue);
  readonly visit = input.required<Visit>();
  readonly classDateId = input.required<string>();
  protected readonly birthDate = computed(() => formatLocalDate(this.visit().birthDate));

  protected confirm(second: PatientIdentifier): void {
    const { appointmentId, recordId } = this.visit();
    if (recordId !== null) return;
    this.#queue.add({
      kind: 'record',
      id: uuidv7(),
      appointmentId,
      classDateId: this.classDateId(),
      body: {
        appointmentId,
        startedAt: this.#board.instant().toISOString(),
        identityConfirmedWith: ['name', second],
      },
    });
  }
}
