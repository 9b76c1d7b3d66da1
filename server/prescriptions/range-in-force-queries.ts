import { sql } from 'drizzle-orm';
import type { RangeInForce } from '@shared/contracts/patients-contract';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { Queryable } from '../database/client';
import { withdrawalOf, type WithdrawalReason } from '../patients/record-changes-queries';

/** Where a patient's range stands, with what a list and a header say of it. */
export interface RangeState {
  /** Null when none is in force. A withdrawn one leads by effort, its ceiling stays. */
  readonly range: RangeInForce | null;
  readonly withdrawn: readonly WithdrawalReason[];
  /** The range is older than the policy's days of review; it stays in force. */
  readonly reviewDue: boolean;
  readonly awaitsPhysician: boolean;
}

interface RangeRow extends Record<string, unknown> {
  readonly patientId: string;
  readonly id: string;
  readonly status: 'active' | 'draft';
  readonly result: PrescriptionAnswer;
  readonly activatedAt: Date | string | null;
  readonly withdrawn: WithdrawalReason[];
  readonly reviewDue: boolean;
}

function rangeOf({ id, result, activatedAt, withdrawn }: RangeRow): RangeInForce | null {
  if (activatedAt === null) return null;
  const isWithdrawn = withdrawn.length > 0;
  return {
    prescriptionId: id,
    leadBy: isWithdrawn ? 'perceived-exertion' : result.leadBy,
    target: isWithdrawn ? null : result.target,
    ceiling: result.ceiling?.value ?? null,
    perceivedExertion: {
      lower: result.perceivedExertion.lower,
      upper: result.perceivedExertion.upper,
    },
    since: new Date(activatedAt).toISOString(),
  };
}

const none: RangeState = { range: null, withdrawn: [], reviewDue: false, awaitsPhysician: false };

/** The state of each patient's range, by patient, in one statement. */
export async function rangesOf(
  db: Queryable,
  patientIds: readonly string[],
  now: Date,
): Promise<(patientId: string) => RangeState> {
  const { rows } = await db.execute<RangeRow>(sql`
    SELECT p.patient_id AS "patientId", p.id, p.status, p.result, p.activated_at AS "activatedAt",
           ${withdrawalOf({ patientId: sql`p.patient_id`, madeAt: sql`p.created_at`, inputs: sql`p.inputs` })} AS withdrawn,
           p.activated_at + make_interval(days => (
             SELECT (content ->> 'reviewDueDays')::int FROM policies ORDER BY version DESC LIMIT 1
           )) < ${now.toISOString()}::timestamptz AS "reviewDue"
      FROM prescriptions p
     WHERE p.patient_id = ANY(${sql.param([...patientIds])}::uuid[])
       AND (p.status = 'active' OR p.awaiting IS NOT NULL)`);
  const states = new Map<string, RangeState>();
  for (const row of rows) {
    const state = states.get(row.patientId) ?? none;
    states.set(
      row.patientId,
      row.status === 'active'
        ? { ...state, range: rangeOf(row), withdrawn: row.withdrawn, reviewDue: row.reviewDue }
        : { ...state, awaitsPhysician: true },
    );
  }
  return (patientId) => states.get(patientId) ?? none;
}
