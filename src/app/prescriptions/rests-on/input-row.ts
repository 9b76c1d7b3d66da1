import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton, MatIconButton } from '@angular/material/button';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { PrescribingInputs } from '@shared/contracts/prescribing-inputs-contract';
import { Icon } from '../../ui/icon/icon';
import { StateChip } from '../../ui/state-chip/state-chip';
import { formatLocalDate } from '../../ui/words/dates';
import { InputField } from '../input-field/input-field';
import { WorksheetState } from '../worksheet/worksheet-state';
import { DrugChoice } from './drug-choice';
import { ageWords } from './age-words';
import { thresholdFields, zoneFields } from './field-specs';
import { rowWords } from './row-words';
import { type Row, isSameAt, valueAt } from './rows';
import { RowsEditor } from './rows-editor';

/** A fact that the range rests on: its value, where it comes from, and in place another to try. */
@Component({
  selector: 'app-input-row',
  imports: [DrugChoice, Icon, InputField, MatButton, MatIconButton, RowsEditor, StateChip],
  templateUrl: './input-row.html',
  styleUrl: './input-row.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class InputRow {
  protected readonly state = inject(WorksheetState);
  readonly row = input.required<Row>();
  /** What the record says; null beside a signed range, which stands as it is. */
  readonly record = input.required<PrescribingInputs | null>();
  /** The inputs of a signed range; null: those of the worksheet. */
  readonly signed = input<PrescriptionRequest | null>(null);
  readonly answer = input.required<PrescriptionAnswer | null>();
  /** The site's date of today. */
  readonly today = input.required<string>();

  protected readonly open = signal(false);
  protected readonly thresholdFields = thresholdFields;
  protected readonly zoneFields = zoneFields;
  protected readonly addThreshold = (): void => {
    this.state.addThreshold();
  };
  protected readonly addZone = (): void => {
    this.state.addZone();
  };

  readonly #inputs = computed(() => this.signed() ?? this.state.value());
  protected readonly words = computed(() => rowWords(this.row().id, this.#inputs(), this.answer()));
  protected readonly origin = computed(() => {
    const { origins } = this.record() ?? {};
    return this.row()
      .origins.map((path) => origins?.[path])
      .find((origin) => origin !== undefined);
  });
  protected readonly source = computed(() => {
    const origin = this.origin();
    if (!origin) return null;
    return origin.date === null ? origin.text : `${origin.text} · ${formatLocalDate(origin.date)}`;
  });
  /** How old the entry is, in words. */
  protected readonly age = computed(() => {
    const { date, old } = this.origin() ?? { date: null, old: false };
    const validDays = this.row().id === 'test' ? this.state.policy()?.test.validDays : undefined;
    return date === null ? null : ageWords(date, this.today(), old, validDays);
  });
  /** Whether another value is tried here than the record's. */
  protected readonly differs = computed(() => {
    const record = this.record();
    return record !== null && !isSameAt(this.row(), this.state.value(), record.inputs);
  });
  protected readonly recordWords = computed(() => {
    const record = this.record();
    if (record === null || !this.differs()) return null;
    const { value, unit } = rowWords(this.row().id, record.inputs, this.answer());
    return unit ? `${value} ${unit}` : value;
  });
  protected readonly errors = computed(() =>
    this.signed()
      ? []
      : this.state
          .errors()
          .filter(({ path }) =>
            this.row().paths.some((own) => path === own || path.startsWith(`${own}.`)),
          ),
  );
  protected readonly present = computed(() => {
    const { part } = this.row();
    return !part || valueAt(this.state.value(), part.name) !== null;
  });

  protected togglePart(): void {
    const { part } = this.row();
    if (part) this.state.setPart(part.name, !this.present(), part.initial);
  }

  protected takeFromRecord(): void {
    const record = this.record();
    if (record) this.state.takeFrom(record.inputs, this.row().paths);
  }
}
