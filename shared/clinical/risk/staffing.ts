import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';
import type { RiskLevel } from '../prescribing/request';

/** How many patients one trained person looks after. No ratio stands in U.S. federal rules: the program sets its own. */
export const staffingNumbers = {
  patientsEach: {
    label: 'Patients to one trained person',
    unit: '',
    lowest: 3,
    highest: 15,
    default: 5,
    source: 'UK: BACR 1995, SIGN 57, ACPICR 2003; AACVPR about 5 with ECG, from memory',
  },
  highRiskEach: {
    label: 'Patients at high or unknown risk to one trained person',
    unit: '',
    lowest: 1,
    highest: 5,
    default: 3,
    source: 'UK and AACVPR, 1 to 3; from memory',
  },
  leastStaff: {
    label: 'Trained people present at least',
    unit: '',
    lowest: 1,
    highest: 4,
    default: 2,
    source: 'UK: at least two present; BACR 1995, SIGN 57, ACPICR 2003',
  },
} as const satisfies PolicyNumbers;

export type StaffingPolicy = PolicyValues<typeof staffingNumbers>;
export const defaultStaffing: StaffingPolicy = defaultsOf(staffingNumbers);

/** Trained people that a class needs, by the risk of each patient in it; 0 for an empty class. Unknown risk counts as high. */
export function staffNeeded(
  risks: readonly RiskLevel[],
  { patientsEach, highRiskEach, leastStaff }: StaffingPolicy,
): number {
  if (risks.length === 0) return 0;
  const high = risks.filter((risk) => risk === 'high' || risk === 'unknown').length;
  const people = high / highRiskEach + (risks.length - high) / patientsEach;
  // A sum of thirds and fifths may miss a whole number by noise.
  return Math.max(leastStaff, Math.ceil(people - 1e-9));
}
