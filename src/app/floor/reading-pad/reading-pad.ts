import {
  ChangeDetectionStrategy,
  Component,
  computed,
  input,
  model,
  output,
  signal,
  viewChildren,
} from '@angular/core';
import { symptomCodes, type SymptomCode } from '@shared/contracts/floor-contract';
import { type VitalPhase, type VitalSign, vitalPhases } from '@shared/clinical/vital-sign-bounds';
import { Icon } from '../../ui/icon/icon';
import {
  type ReadingDraft,
  erased,
  faultsOf,
  nextField,
  pressed,
  typed,
  withSymptom,
} from '../reading-draft';
import { phaseWords, symptomText, symptomWords } from '../visit/floor-words';
import { type Visit, currentReadings, lastWith } from '../visit/visit';
import { FindingChip } from './finding-chip';
import { findingsOf } from './findings';
import { PadField } from './pad-field';

let pads = 0;

/** The fields of a reading and the number pad beside them; a keyboard works as well: digits, Enter for the next field. */
@Component({
  selector: 'app-reading-pad',
  imports: [FindingChip, Icon, PadField],
  templateUrl: './reading-pad.html',
  styleUrl: './reading-pad.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReadingPad {
  readonly visit = input.required<Visit>();
  readonly draft = model.required<ReadingDraft>();
  /** The last field was left. */
  readonly finished = output();

  protected readonly id = `pad-${(pads += 1)}`;
  protected readonly phases = vitalPhases;
  protected readonly phaseWords = phaseWords;
  protected readonly symptoms = symptomCodes;
  protected readonly symptomWords = symptomWords;
  protected readonly keys = ['1', '2', '3', '4', '5', '6', '7', '8', '9'] as const;
  protected readonly more = signal(false);
  private readonly boxes = viewChildren(PadField);

  protected readonly faults = computed(() => faultsOf(this.draft()));
  protected readonly findings = computed(() => findingsOf(this.visit(), this.draft()));
  protected readonly advice = computed(() =>
    Object.values(this.findings()).flatMap((finding) => finding?.advice ?? []),
  );
  protected readonly asked = computed(() => {
    const { symptoms } = this.draft();
    return symptoms === null ? 'not asked' : symptoms.map(symptomText).join(', ');
  });
  protected readonly before = computed<Readonly<Record<VitalSign, number | null>>>(() => {
    const current = currentReadings(this.visit().readings);
    const last = (sign: Exclude<VitalSign, 'diastolic'>) => lastWith(current, sign)?.[sign] ?? null;
    return {
      heartRate: last('heartRate'),
      systolic: last('systolic'),
      diastolic: lastWith(current, 'systolic')?.diastolic ?? null,
      perceivedExertion: last('perceivedExertion'),
      oxygenSaturation: last('oxygenSaturation'),
    };
  });

  protected choose(phase: VitalPhase): void {
    this.draft.update((draft) => ({ ...draft, phase }));
  }

  protected type(field: VitalSign, text: string): void {
    this.draft.update((draft) => typed(draft, field, text));
  }

  protected activate(active: VitalSign): void {
    if (this.draft().active !== active) this.draft.update((draft) => ({ ...draft, active }));
  }

  protected press(digit: string): void {
    this.draft.update((draft) => pressed(draft, digit));
  }

  protected erase(): void {
    this.draft.update(erased);
  }

  protected next(): void {
    this.draft.update(nextField);
    if (this.draft().active === null) this.finished.emit();
    else this.focus();
  }

  protected toggle(code: SymptomCode): void {
    this.draft.update((draft) => withSymptom(draft, code));
  }

  protected note(event: Event): void {
    const note = (event.target as HTMLTextAreaElement).value;
    this.draft.update((draft) => ({ ...draft, note }));
  }

  /** Puts the focus where the next digit goes. */
  focus(): void {
    const { active } = this.draft();
    this.boxes()
      .find((box) => box.field() === active)
      ?.focus();
  }
}
