import type { RiskLevel } from '@shared/clinical/prescribing/request';
import { withdrawalWords } from '@shared/clinical/withdrawal';
import type { Worksheet } from '@shared/contracts/prescriptions-worksheet-contract';
import { diagnosisWords, riskWords } from '../../ui/words/clinical-words';
import { formatLocalDate } from '../../ui/words/dates';

/** Whom a range is for, in one line below the name. */
export const detailText = ({ patient, course }: Worksheet, risk: RiskLevel | undefined): string =>
  [
    `${patient.ageYears}`,
    `born ${formatLocalDate(patient.birthDate)}`,
    patient.recordNumber,
    course && `${course.attended} of ${course.planned} sessions`,
    course && `${diagnosisWords[course.diagnosis]}, ${formatLocalDate(course.eventOn)}`,
    risk && riskWords[risk],
  ]
    .filter(Boolean)
    .join(' · ');

/** Why the range in force is withdrawn, null while it holds or none is in force. */
export function withdrawnText({ inForce }: Worksheet): string | null {
  const reasons = inForce?.withdrawn ?? [];
  return reasons.length > 0 ? reasons.map((reason) => withdrawalWords[reason]).join('; ') : null;
}
