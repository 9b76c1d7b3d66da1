import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { RangeFlag } from '@shared/clinical/range-flags';
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
  /** A dose was missed: effort leads today alone. */
  readonly effortToday: boolean;
  /** Someone has to look at it; it stays in force. */
  readonly reviewDue: boolean;
  /** Each cause that touches it, the oldest first. */
  readonly flags: readonly RangeFlag[];
  readonly restingSeated: number;
  readonly icd: PrescriptionRequest['devices']['icd'];
}

/** The effort that leads where nothing else is known: rule 8, all else. */
const usualEffort = { lower: 11, upper: 13 };

/** What is left of a range: while it is withdrawn, or today's dose was missed, effort leads, no higher than usual, and the ceiling stays. */
export function standingOf(signed: Standing, effortLeads: boolean): Standing {
  if (!effortLeads) return signed;
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
