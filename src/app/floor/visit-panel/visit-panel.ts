import type { ElementRef } from '@angular/core';
import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  output,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Icon } from '../../ui/icon/icon';
import { RangeFlags } from '../../ui/range-flags/range-flags';
import { ArrivalStep } from '../arrival-step/arrival-step';
import { CorrectionStep } from '../correction-step/correction-step';
import { EntryQueue } from '../entry-queue/entry-queue';
import { clockText } from '../floor-time';
import { IdentityStep } from '../identity-step/identity-step';
import { ReadingStep } from '../reading-step/reading-step';
import { ReadingsList } from '../readings-list/readings-list';
import { SignStep } from '../sign-step/sign-step';
import { WorkStep } from '../work-step/work-step';
import { ceilingReason, flagWords, rangeText } from '../visit/floor-words';
import type { Visit, VisitReading } from '../visit/visit';

type Step = 'arrival' | 'identity' | 'readings' | 'done';

/** One patient's visit: who it is, what they are to keep to, and the next thing to do. */
@Component({
  selector: 'app-visit-panel',
  imports: [
    ArrivalStep,
    CorrectionStep,
    Icon,
    IdentityStep,
    MatButton,
    RangeFlags,
    ReadingStep,
    ReadingsList,
    SignStep,
    WorkStep,
  ],
  templateUrl: './visit-panel.html',
  styleUrl: './visit-panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VisitPanel {
  protected readonly queue = inject(EntryQueue);
  readonly visit = input.required<Visit>();
  readonly classDateId = input.required<string>();
  readonly timeZone = input.required<string>();
  /** Nurses and physiologists write; others read. */
  readonly canWrite = input.required<boolean>();
  readonly closed = output();

  private readonly heading = viewChild.required<ElementRef<HTMLElement>>('heading');
  private readonly entry = viewChild(ReadingStep);
  readonly #appointmentId = computed(() => this.visit().appointmentId);

  /** Another patient begins anew. */
  protected readonly correcting = linkedSignal<string, VisitReading | null>({
    source: this.#appointmentId,
    computation: () => null,
  });
  protected readonly signing = linkedSignal({
    source: this.#appointmentId,
    computation: () => false,
  });

  protected readonly step = computed<Step>(() => {
    const { status, record, recordId } = this.visit();
    if (status === 'fulfilled' || record?.signedAt) return 'done';
    if (status !== 'checked-in') return 'arrival';
    return recordId === null ? 'identity' : 'readings';
  });

  protected readonly range = computed(() => {
    const { leadBy, target, guide, perceivedExertion, ceiling, askLine } = this.visit();
    if (leadBy === null || perceivedExertion === null)
      return 'No range in force: ask the physician.';
    const effort = `effort ${rangeText(perceivedExertion)}`;
    return [
      target ? `Range ${rangeText(target)}, ${effort}` : `Go by ${effort}`,
      guide ? `guide ${rangeText(guide)}` : null,
      ceiling ? `ceiling ${ceiling.value} (${ceilingReason(ceiling)})` : 'no ceiling known',
      askLine === null ? null : `ask at ${askLine}`,
    ]
      .filter((text) => text !== null)
      .join(' · ');
  });

  protected readonly notes = computed(() => {
    const { icd, flags, monitored } = this.visit();
    const rate = icd.lowestRate === null ? 'zones unknown' : `acts from ${icd.lowestRate}`;
    return [
      icd.status === 'present' ? `ICD, ${rate}` : null,
      icd.status === 'unknown' ? 'ICD not known: ask' : null,
      ...flags.map((flag) => flagWords[flag]),
      monitored ? null : 'not monitored',
    ].filter((text) => text !== null);
  });

  protected readonly signed = computed(() => {
    const { record } = this.visit();
    if (!record?.signedAt) return 'This visit is done.';
    return `Signed ${clockText(record.signedAt, this.timeZone())} by ${record.signedBy}.`;
  });

  /** Puts the focus where the next entry goes, else on the name. */
  focus(): void {
    const entry = this.entry();
    if (entry) entry.focus();
    else this.heading().nativeElement.focus();
  }
}
