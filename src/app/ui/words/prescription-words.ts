import type {
  Ceiling,
  Limit,
  LimitKind,
  PrescriptionAnswer,
  Workload,
} from '@shared/clinical/prescribing/answer';
import type { MaximumMethod, Method } from '@shared/clinical/prescribing/request';
import { powerText, stepText, treadmillText } from './machine-words';

// What people read of a worked-out range.

export const methodWords: Readonly<Record<Method, string>> = {
  'heart-rate-reserve': 'Heart-rate reserve',
  'percent-of-peak': 'Percent of peak',
  'observed-work': 'Observed work',
  'resting-plus': 'Resting rate plus',
  'perceived-exertion': 'Effort (RPE)',
};

export const maximumWords: Readonly<Record<MaximumMethod, string>> = {
  measured: 'measured peak',
  fox: '220 − age (Fox)',
  tanaka: 'Tanaka',
  gellish: 'Gellish',
  nes: 'Nes',
  gulati: 'Gulati (women)',
  brawner: 'Brawner (beta blocker)',
  keteyian: 'Keteyian (heart failure)',
};

export const limitWords: Readonly<Record<LimitKind, string>> = {
  ischemia: 'ischemia',
  angina: 'angina',
  arrhythmia: 'arrhythmia',
  'blood-pressure': 'the blood pressure response',
  symptom: 'the symptom',
  icd: 'the lowest ICD zone',
  tracking: 'the upper tracking rate',
};

/** "10 below ischemia at 118". */
export const limitReason = ({ kind, margin, threshold }: Limit): string =>
  `${margin} below ${limitWords[kind]} at ${threshold}`;

interface WithCeiling {
  readonly ceiling: Ceiling | null;
  readonly limits: readonly Limit[];
}

/** Why the ceiling stands where it does, '' when there is none. */
export function ceilingReason({ ceiling, limits }: WithCeiling): string {
  if (ceiling === null) return '';
  const binding = limits.filter(({ value }) => value === ceiling.value);
  return [...new Set(binding.map(limitReason))].join(', ');
}

export const rangeText = ({ lower, upper }: { lower: number; upper: number }): string =>
  `${lower}–${upper}`;

/** Work to a tenth, never above what it is. */
export const metsFloor = (mets: number): string => (Math.floor(mets * 10 + 1e-6) / 10).toFixed(1);

/** A range of work to a tenth, rounded inward. */
export const metsText = ({ lower, upper }: { lower: number; upper: number }): string =>
  `${(Math.ceil(lower * 10 - 1e-6) / 10).toFixed(1)}–${metsFloor(upper)}`;

export const percentText = (fraction: number): string =>
  `${Number((fraction * 100).toFixed(1))}\u00a0%`;

export const percentRange = ({ lower, upper }: { lower: number; upper: number }): string =>
  `${Number((lower * 100).toFixed(1))}–${percentText(upper)}`;

export const modalityWords: Readonly<Record<Workload['modality'], string>> = {
  'treadmill-walk': 'Treadmill',
  cycle: 'Cycle',
  arm: 'Arm ergometer',
  step: 'Step',
  stepper: 'Recumbent stepper',
};

/** The setting of a machine; null where the equation gives none. */
export function settingText(workload: Workload): string | null {
  switch (workload.modality) {
    case 'treadmill-walk': {
      const { speedMph, gradePercent } = workload;
      if (speedMph === null) return null;
      return treadmillText(speedMph, gradePercent ?? 0);
    }
    case 'cycle':
    case 'arm':
      return workload.powerWatts === null ? null : powerText(workload.powerWatts);
    case 'step': {
      const { stepHeightMeters, stepsPerMinute } = workload;
      if (stepsPerMinute === null || stepHeightMeters === null) return null;
      return stepText(stepHeightMeters, stepsPerMinute);
    }
    case 'stepper':
      return workload.mets === null ? null : `${metsFloor(workload.mets)} METs`;
  }
}

/** What leads, in short: "91–108 bpm", or "Effort 11–13". */
export function leadText({
  target,
  perceivedExertion,
}: Pick<PrescriptionAnswer, 'target' | 'perceivedExertion'>): string {
  return target ? `${rangeText(target)} bpm` : `Effort ${rangeText(perceivedExertion)}`;
}
