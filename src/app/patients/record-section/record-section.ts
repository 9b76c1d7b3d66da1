import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { PatientRecord, RecordEntry } from '@shared/contracts/record-contract';
import { Icon } from '../../ui/icon/icon';
import type { EntryForm, Line } from '../entry-editor/entry-form';
import { EntryEditor } from '../entry-editor/entry-editor';
import { supersedingForm } from '../entry-editor/test-forms';
import { changedMedicationForm } from '../entry-editor/treatment-forms';
import type { LineContext } from '../lines/line-context';
import { supersedingTest } from '@shared/clinical/thresholds/threshold-proposal';
import { type CleanTest, EntryRow } from './entry-row';
import { PatientChart } from '../patient-chart';
import { type ListedKind, type SectionWords, sectionWords } from './section-words';

const shownAtFirst = 5;

/** One kind of entry: its list, the form that adds to it, and what may be done with each. */
@Component({
  selector: 'app-record-section',
  imports: [EntryEditor, EntryRow, Icon, MatButton],
  templateUrl: './record-section.html',
  styleUrl: './record-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RecordSection {
  readonly #chart = inject(PatientChart);

  readonly kind = input.required<ListedKind>();
  readonly record = input.required<PatientRecord>();
  readonly today = input.required<string>();
  readonly timeZone = input.required<string>();
  /** Whose record it is; without it nothing is computed from age or sex. */
  readonly patient = input<LineContext['patient']>(null);

  protected readonly words = computed(() => sectionWords[this.kind()]);
  protected readonly form = signal<EntryForm | null>(null);
  protected readonly showsAll = signal(false);
  protected readonly showsErrors = signal(false);

  readonly #entries = computed<readonly RecordEntry[]>(() => this.record()[this.kind()]);
  protected readonly errors = computed(() =>
    this.#entries().filter((entry) => entry.enteredInErrorAt !== null),
  );
  readonly #standing = computed(() => {
    const entries = this.#entries().filter((entry) => entry.enteredInErrorAt === null);
    // What still counts comes first: drugs that are taken, limits that bind.
    return [...entries.filter(isCurrent), ...entries.filter((entry) => !isCurrent(entry))];
  });
  protected readonly hidden = computed(() =>
    this.showsAll() ? 0 : Math.max(0, this.#standing().length - shownAtFirst),
  );
  protected readonly shown = computed(() => [
    ...this.#standing().slice(0, this.#standing().length - this.hidden()),
    ...(this.showsErrors() ? this.errors() : []),
  ]);
  protected readonly headingId = computed(() => `section-${this.kind()}`);

  readonly #context = computed<LineContext>(() => ({
    patient: this.patient(),
    record: this.record(),
    today: this.today(),
  }));

  protected add(adding: Pick<SectionWords, 'form'> = this.words()): void {
    this.form.set(adding.form(this.#context()));
  }

  protected lines({ values }: RecordEntry): readonly Line[] {
    return this.words().lines?.(values, this.#context()) ?? [];
  }

  /** The later clean test that may take a limit's place, with the words to ask by; null for none. */
  protected clean(entry: RecordEntry): CleanTest | null {
    if (this.kind() !== 'thresholds') return null;
    const record = this.record();
    const threshold = entry as PatientRecord['thresholds'][number];
    const id = supersedingTest(record, threshold, this.today());
    const test = record['exercise-tests'].find((each) => each.id === id);
    return test ? { id: test.id, ...test.values } : null;
  }

  protected supersede(entry: RecordEntry, testId: string): void {
    void this.#chart.supersedeThreshold(entry.id, testId);
  }

  protected lift(entry: RecordEntry, reason: string): void {
    void this.#chart.liftRestriction(entry.id, reason);
  }

  protected closeFollowUp(entry: RecordEntry, done: string): void {
    void this.#chart.closeFollowUp(entry.id, done);
  }

  protected change(entry: RecordEntry): void {
    if (this.kind() === 'medications') {
      this.form.set(changedMedicationForm(entry as PatientRecord['medications'][number]));
    } else {
      this.form.set(supersedingForm(entry as PatientRecord['thresholds'][number]));
    }
  }

  protected closeForm(): void {
    this.form.set(null);
    document.getElementById(`${this.headingId()}-add`)?.focus();
  }

  protected enterInError(entry: RecordEntry): void {
    void this.#chart.enterInError(this.kind(), entry.id);
  }

  protected stop(entry: RecordEntry, stoppedOn: string): void {
    void this.#chart.stopMedication(entry as PatientRecord['medications'][number], stoppedOn);
  }

  protected retire(entry: RecordEntry, reason: string): void {
    void this.#chart.retireThreshold(entry.id, reason);
  }
}

function isCurrent(entry: RecordEntry): boolean {
  const { stoppedOn } = entry.values as { stoppedOn?: string | null };
  return !stoppedOn && entry.ended === null;
}
