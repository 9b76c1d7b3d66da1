import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { symptomCodes, type SymptomCode } from '@shared/contracts/floor-contract';
import { v7 as uuidv7 } from 'uuid';
import { EntryQueue } from '../entry-queue/entry-queue';
import { clockText } from '../floor-time';
import { type ReadingDraft, canSave, emptyDraft, padFields, valuesOf } from '../reading-draft';
import { ReadingPad } from '../reading-pad/reading-pad';
import type { Visit, VisitReading } from '../visit/visit';

const reasons = ['Typed wrong', 'Read again', 'Another patient’s', 'Other'] as const;
type Reason = (typeof reasons)[number];

const isSymptomCode = (code: string): code is SymptomCode =>
  (symptomCodes as readonly string[]).includes(code);

/** A draft that holds what a reading holds. */
function draftOf(reading: VisitReading): ReadingDraft {
  const empty = emptyDraft(reading.phase);
  const digits = padFields.map((field) => [field, String(reading[field] ?? '')] as const);
  const symptoms = reading.symptoms.filter(isSymptomCode);
  return {
    ...empty,
    digits: { ...empty.digits, ...Object.fromEntries(digits) },
    symptoms: symptoms.length > 0 ? symptoms : null,
    note: reading.note ?? '',
  };
}

/** Corrects a reading: both stay, with the reason. One that was another patient's is struck out. */
@Component({
  selector: 'app-correction-step',
  imports: [MatButton, ReadingPad],
  templateUrl: './correction-step.html',
  styleUrl: './correction-step.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CorrectionStep {
  readonly #queue = inject(EntryQueue);
  readonly visit = input.required<Visit>();
  readonly reading = input.required<VisitReading>();
  readonly classDateId = input.required<string>();
  readonly timeZone = input.required<string>();
  readonly closed = output();

  protected readonly reasons = reasons;
  protected readonly reason = signal<Reason | null>(null);
  protected readonly ownWords = signal('');
  protected readonly draft = linkedSignal(() => draftOf(this.reading()));
  protected readonly time = computed(() => clockText(this.reading().measuredAt, this.timeZone()));
  protected readonly strikesOut = computed(() => this.reason() === 'Another patient’s');

  readonly #why = computed(() => {
    const reason = this.reason();
    return reason === 'Other' ? this.ownWords().trim() : reason;
  });
  protected readonly canSave = computed(
    () => !!this.#why() && (this.strikesOut() || canSave(this.draft())),
  );

  protected readWords(event: Event): void {
    this.ownWords.set((event.target as HTMLInputElement).value);
  }

  protected save(): void {
    const reason = this.#why();
    if (!reason || !this.canSave()) return;
    const { id: originalId, measuredAt, phase: phaseBefore } = this.reading();
    const id = uuidv7();
    const phase = this.strikesOut() ? phaseBefore : this.draft().phase;
    const values = this.strikesOut() ? { enteredInError: true } : valuesOf(this.draft());
    this.#queue.add({
      kind: 'amendment',
      id,
      originalId,
      appointmentId: this.visit().appointmentId,
      classDateId: this.classDateId(),
      body: { id, reason, phase, measuredAt, ...values },
    });
    this.closed.emit();
  }
}
