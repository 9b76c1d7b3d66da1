import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { reasonWords } from '@shared/clinical/prescribing/can-lead';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing/answer';
import { Fact } from '../../ui/fact/fact';
import { Quantity } from '../../ui/quantity/quantity';
import {
  ceilingReason,
  metsFloor,
  metsText,
  percentText,
  rangeText,
} from '../../ui/words/prescription-words';

const sentence = (words: string): string => `${words.charAt(0).toUpperCase()}${words.slice(1)}.`;

/** What a range comes to: what leads, the ceiling with its reason, effort, work, and what the patient is told. */
@Component({
  selector: 'app-result-panel',
  imports: [Fact, Quantity],
  templateUrl: './result-panel.html',
  styleUrl: './result-panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ResultPanel {
  readonly answer = input.required<PrescriptionAnswer>();

  protected readonly rangeText = rangeText;
  protected readonly metsText = metsText;
  protected readonly workFloor = metsFloor;
  protected readonly reasons = computed(() =>
    this.answer().reasons.map((reason) => sentence(reasonWords[reason])),
  );
  protected readonly ceilingReason = computed(() => ceilingReason(this.answer()));

  /** Where the ceiling cuts: "It binds before 80 % of reserve (119) and allows 64 %." */
  protected readonly binding = computed(() => {
    const { ceiling, target, method, maximum, intensity, intensityAtCeiling, candidates } =
      this.answer();
    if (ceiling === null || target?.upper !== ceiling.value) return null;
    const own = candidates.find(
      (one) => one.method === method && one.maximum === (maximum?.method ?? null),
    );
    if (!own?.upper || own.upper <= ceiling.value) return null;
    const before =
      method === 'heart-rate-reserve'
        ? `${percentText(intensity.upper)} of reserve (${own.upper})`
        : `the upper end of ${own.upper}`;
    const allows =
      intensityAtCeiling === null
        ? ''
        : ` and allows ${Math.floor(intensityAtCeiling * 100)} % of reserve`;
    return `It binds before ${before}${allows}.`;
  });

  /** What the patient's page says. */
  protected readonly told = computed(() => {
    const { patientTarget, tenSecondCount, ceiling, perceivedExertion } = this.answer();
    const count = tenSecondCount && ` ${rangeText(tenSecondCount)} beats in 10 seconds.`;
    const stay = ceiling ? ` Stay under ${ceiling.value}.` : '';
    return patientTarget
      ? `${rangeText(patientTarget)} beats a minute.${count ?? ''}${stay}`
      : `Go by how it feels: ${rangeText(perceivedExertion)} on the effort scale.${stay}`;
  });
}
