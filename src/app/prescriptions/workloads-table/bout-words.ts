import type { PrescriptionAnswer } from '@shared/clinical/prescribing/answer';
import {
  defaultIntermittentPolicy,
  firstBouts,
  intermittentNumbers,
} from '@shared/clinical/training/intermittent';

const lowCapacity = (): string => {
  const { bouts, minutesEach, restMinutes } = firstBouts(null, defaultIntermittentPolicy);
  return (
    `Low capacity: begin with intermittent bouts, by the published default ${bouts} of ${minutesEach} minutes ` +
    `with ${restMinutes} minutes of rest between. ${intermittentNumbers.boutMinutes.source}.`
  );
};

/** What a range says of bouts: intermittent ones for low capacity, and where intervals are forbidden. */
export function boutWords({
  cautions,
  oxygenFloor,
  reasons,
}: Pick<PrescriptionAnswer, 'cautions' | 'oxygenFloor' | 'reasons'>): string[] {
  return [
    ...(cautions.some(({ code }) => code === 'low-capacity') ? [lowCapacity()] : []),
    // Only pulmonary hypertension sets a floor of oxygen.
    ...(oxygenFloor === null ? [] : ['No intervals: pulmonary hypertension.']),
    ...(reasons.includes('assist-device')
      ? ['No intervals: assist device, effort stays at 11–13.']
      : []),
    ...(cautions.some(({ severity }) => severity === 'stop')
      ? ['No intervals until the caution that says stop is settled.']
      : []),
  ];
}
