import { readingIntervals } from '@shared/clinical/reading-due';
import type { VitalSign } from '@shared/clinical/vital-sign-bounds';
import type { IconName } from '../../ui/icon/icon-names';
import type { Tone } from '../../ui/state-chip/state-chip';
import { type ReadingDraft, numberOf, rateOf } from '../reading-draft';
import { ceilingReason, rangeText } from '../visit/floor-words';
import { isPastAskLine } from '../visit/tile-view';
import { type Visit, placeOf } from '../visit/visit';

/** What a typed value means, beside its field; `advice` says what to do first. Nothing here keeps it from being saved. */
export interface Finding {
  readonly tone: Tone;
  readonly icon: IconName | null;
  readonly text: string;
  readonly advice: string | null;
}

const finding = (
  tone: Tone,
  text: string,
  icon: IconName | null = null,
  advice: string | null = null,
): Finding => ({ tone, icon, text, advice });

const localPolicy = 'Then follow your local policy and the orders for this patient.';

function ofRate(visit: Visit, draft: ReadingDraft): Finding | null {
  const rate = rateOf(draft);
  const { target, ceiling, askLine } = visit;
  const placement = placeOf(visit, draft.phase, rate);
  if (placement === 'over-ceiling' && ceiling) {
    const advice =
      `Over the ceiling of ${ceiling.value} (${ceilingReason(ceiling)}). First slow the work down and ask about symptoms. ` +
      `Recheck in ${readingIntervals.overCeiling} minutes. ${localPolicy}`;
    return finding('over', `over ${ceiling.value}`, null, advice);
  }
  if (draft.phase === 'exercise' && isPastAskLine(visit, rate)) {
    return finding(
      'due',
      `past ${askLine}`,
      'help',
      `No ceiling is known: ask how the patient feels. ${localPolicy}`,
    );
  }
  if (placement === null || target === null) return null;
  if (placement === 'in') return finding('in', 'in range');
  return finding('due', placement, placement === 'below' ? 'arrow-down' : 'arrow-up');
}

function ofEffort({ perceivedExertion: wanted }: Visit, draft: ReadingDraft): Finding | null {
  const effort = numberOf(draft, 'perceivedExertion');
  if (effort === null || effort < 6 || wanted === null || draft.phase !== 'exercise') return null;
  const asked = rangeText(wanted);
  if (effort > wanted.upper) return finding('due', `above ${asked}`, 'arrow-up');
  if (effort < wanted.lower) return finding('due', `below ${asked}`, 'arrow-down');
  return finding('in', `in ${asked}`);
}

function ofPressure({ pressureCeiling }: Visit, draft: ReadingDraft): Finding | null {
  if (pressureCeiling === null) return null;
  const over =
    (numberOf(draft, 'systolic') ?? 0) > pressureCeiling.systolic ||
    (numberOf(draft, 'diastolic') ?? 0) > pressureCeiling.diastolic;
  if (!over) return null;
  const limit = `${pressureCeiling.systolic}/${pressureCeiling.diastolic}`;
  return finding(
    'over',
    `over ${limit}`,
    null,
    `Pressure over ${limit}. First slow the work down and recheck. ${localPolicy}`,
  );
}

function ofOxygen({ oxygenFloor }: Visit, draft: ReadingDraft): Finding | null {
  const oxygen = numberOf(draft, 'oxygenSaturation');
  if (oxygenFloor === null || oxygen === null || oxygen < 50 || oxygen >= oxygenFloor) return null;
  return finding(
    'over',
    `under ${oxygenFloor} %`,
    null,
    `Oxygen under ${oxygenFloor} %. First stop the work and recheck the probe. ${localPolicy}`,
  );
}

export type Findings = Readonly<Partial<Record<VitalSign, Finding | null>>>;

/** What the values typed so far mean for this patient. */
export const findingsOf = (visit: Visit, draft: ReadingDraft): Findings => ({
  heartRate: ofRate(visit, draft),
  diastolic: ofPressure(visit, draft),
  perceivedExertion: ofEffort(visit, draft),
  oxygenSaturation: ofOxygen(visit, draft),
});
