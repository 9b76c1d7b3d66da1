import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { WithdrawalReason } from '@shared/clinical/withdrawal';

/** What of an answer holds while it is in force. */
export type Standing = Pick<
  PrescriptionAnswer,
  | 'leadBy'
  | 'target'
  | 'guide'
  | 'ceiling'
  | 'askLine'
  | 'perceivedExertion'
  | 'patientTarget'
  | 'tenSecondCount'
>;

/** The range in force of a patient, as it stands after what was entered since. Rates in bpm, effort on Borg 6–20. */
export interface RangeInForce extends Standing {
  readonly patientId: string;
  readonly prescriptionId: string;
  readonly activatedAt: Date;
  /** Why it is withdrawn; [] while it holds. */
  readonly withdrawn: readonly WithdrawalReason[];
  /** Older than the policy's days of review; it stays in force. */
  readonly reviewDue: boolean;
  readonly restingSeated: number;
  readonly icd: PrescriptionRequest['devices']['icd'];
}

/** The effort that leads where nothing else is known: rule 8, all else. */
const usualEffort = { lower: 11, upper: 13 };

/** What is left of a range: while it is withdrawn effort leads, no higher than usual, and the ceiling stays. */
export function standingOf(signed: Standing, isWithdrawn: boolean): Standing {
  if (!isWithdrawn) return signed;
  const { ceiling, perceivedExertion } = signed;
  return {
    leadBy: 'perceived-exertion',
    target: null,
    guide: null,
    ceiling,
    askLine: null,
    perceivedExertion: {
      scale: perceivedExertion.scale,
      lower: Math.min(perceivedExertion.lower, usualEffort.lower),
      upper: Math.min(perceivedExertion.upper, usualEffort.upper),
    },
    patientTarget: null,
    tenSecondCount: null,
  };
}
