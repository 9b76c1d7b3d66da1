import type { RiskLevel } from '@shared/clinical/prescribing/request';
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
