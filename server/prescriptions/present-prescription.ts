import type { PrescriptionAnswer, PrescriptionPolicy } from '@shared/clinical/prescribing';
import { withdrawalReasonsOf } from '@shared/clinical/range-flags';
import { physicianCausesOf } from '@shared/clinical/plan-limits';
import type { prescriptionSchema } from '@shared/contracts/prescription-record-contract';
import {
  taskKinds,
  type AwaitingItem,
  type PrescribingTasks,
} from '@shared/contracts/prescriptions-waiting-contract';
import type * as z from 'zod';
import { presentFlag } from '../patients/record-changes-queries';
import { withAge } from './patient-columns';
import type { PrescriptionRow } from './prescriptions-queries';
import type { RangeState } from './range-in-force-queries';
import type { AwaitingRow, TaskRow } from './waiting-queries';

const iso = (at: Date | string): string => new Date(at).toISOString();
const isoOrNull = (at: Date | string | null): string | null => (at === null ? null : iso(at));

export const presentPrescription = ({
  enrollmentId: _,
  ...row
}: PrescriptionRow): z.input<typeof prescriptionSchema> => ({
  ...row,
  createdAt: iso(row.createdAt),
  changedAt: isoOrNull(row.changedAt),
  signedAt: isoOrNull(row.signedAt),
  physicianSignedAt: isoOrNull(row.physicianSignedAt),
  activatedAt: isoOrNull(row.activatedAt),
  endedAt: isoOrNull(row.endedAt),
});

/** What of an answer is read before signing. */
function glanceOf(result: PrescriptionAnswer): AwaitingItem['result'] {
  const { leadBy, method, maximum, target, guide, ceiling, askLine, limits, intensity } = result;
  const { perceivedExertion, pressureCeiling, oxygenFloor, reasons, cautions } = result;
  return {
    leadBy,
    method,
    maximum,
    target,
    guide,
    ceiling: ceiling && { ...ceiling, bindingLimits: [...ceiling.bindingLimits] },
    askLine,
    limits: [...limits],
    intensity,
    perceivedExertion,
    pressureCeiling,
    oxygenFloor,
    reasons: [...reasons],
    cautions: [...cautions],
  };
}

/** @param range where the patient's range stands now */
export function presentAwaiting(
  row: AwaitingRow,
  range: RangeState,
  policy: PrescriptionPolicy,
  now: Date,
): AwaitingItem {
  const { id, version, course, inputs, result, first, flags, signedAt, signedBy } = row;
  const proposal = { inputs, result, first, student: row.byStudent };
  return {
    id,
    version,
    patient: withAge(row.patient, now),
    course,
    risk: inputs.risk,
    restingSeated: inputs.resting.seated,
    result: glanceOf(result),
    causes: physicianCausesOf(proposal, policy),
    outdated: withdrawalReasonsOf(flags.map(presentFlag)),
    signedAt: iso(signedAt),
    signedBy,
    inForce: range.range,
  };
}

/** Every kind, in the order of urgency, also those of which there is nothing to do. */
export function presentTasks(rows: readonly TaskRow[], now: Date): PrescribingTasks {
  const groups = taskKinds.map((kind) => {
    const ofKind = rows.filter((row) => row.kind === kind);
    const items = ofKind.map(({ patient, prescriptionId, since, by, step, flags }) => ({
      patient: withAge(patient, now),
      prescriptionId,
      since: isoOrNull(since),
      by,
      step,
      flags: flags.map(presentFlag),
    }));
    return { kind, total: ofKind[0]?.total ?? 0, items };
  });
  return { groups };
}
