import { ChangeDetectionStrategy, Component, computed, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { PatientRecord } from '@shared/contracts/record-contract';
import { conditionKinds, type ConditionKind } from '@shared/contracts/record-lists';
import { Icon } from '../../ui/icon/icon';
import { StateChip } from '../../ui/state-chip/state-chip';
import { conditionAnswerWords, conditionWords } from '../../ui/words/clinical-words';
import { formatDay } from '../../ui/words/dates';
import { EntryEditor } from '../entry-editor/entry-editor';
import type { EntryForm } from '../entry-editor/entry-form';
import { conditionsForm } from '../entry-editor/entry-forms';

/** The ten conditions that decide which method applies, each with its latest answer. */
@Component({
  selector: 'app-conditions-section',
  imports: [EntryEditor, Icon, MatButton, StateChip],
  templateUrl: './conditions-section.html',
  styleUrl: '../record-section/record-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ConditionsSection {
  readonly record = input.required<PatientRecord>();
  readonly today = input.required<string>();
  readonly timeZone = input.required<string>();

  protected readonly form = signal<EntryForm | null>(null);
  protected readonly rows = computed(() =>
    conditionKinds.map((kind) => {
      const entry = this.#latest(kind);
      return {
        kind,
        label: conditionWords[kind],
        answer: entry && conditionAnswerWords(kind)[entry.values.value],
        source:
          entry &&
          `${formatDay(entry.recordedAt, this.timeZone())} · entered by ${entry.recordedBy.displayName}`,
      };
    }),
  );

  protected answer(): void {
    const current = conditionKinds.flatMap((kind) => {
      const entry = this.#latest(kind);
      return entry ? [[kind, entry.values.value] as const] : [];
    });
    this.form.set(conditionsForm(Object.fromEntries(current)));
  }

  protected close(): void {
    this.form.set(null);
    document.getElementById('conditions-answer')?.focus();
  }

  #latest(kind: ConditionKind): PatientRecord['conditions'][number] | undefined {
    return this.record().conditions.find(
      (entry) => entry.enteredInErrorAt === null && entry.values.kind === kind,
    );
  }
}
