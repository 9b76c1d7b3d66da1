import { sql, type SQL } from 'drizzle-orm';
import type { RangeInForce as RangeInShort } from '@shared/contracts/patients-contract';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { WithdrawalReason } from '@shared/clinical/withdrawal';
import type { Queryable } from '../database/client';
import { withdrawalOf } from '../patients/record-changes-queries';
import { standingOf, type RangeInForce } from './range-in-force';

interface RangeRow extends Record<string, unknown> {
  readonly patientId: string;
  readonly id: string;
  readonly status: 'active' | 'draft';
  readonly inputs: PrescriptionRequest;
  readonly result: PrescriptionAnswer;
  readonly activatedAt: Date | string | null;
  readonly withdrawn: WithdrawalReason[];
  readonly reviewDue: boolean | null;
}

/** Why the prescription `p` of the query around no longer holds, as an SQL array. */
export const withdrawalOfPrescription = withdrawalOf({
  patientId: sql`p.patient_id`,
  madeAt: sql`coalesce(p.changed_at, p.created_at)`,
  inputs: sql`p.inputs`,
});

async function rangeRows(
  db: Queryable,
  patientIds: readonly string[],
  now: Date,
  which: SQL,
): Promise<RangeRow[]> {
  if (patientIds.length === 0) return [];
  const { rows } = await db.execute<RangeRow>(sql`
    SELECT p.patient_id AS "patientId", p.id, p.status, p.inputs, p.result, p.activated_at AS "activatedAt",
           ${withdrawalOfPrescription} AS withdrawn,
           p.activated_at + make_interval(days => (
             SELECT (content ->> 'reviewDueDays')::int FROM policies ORDER BY version DESC LIMIT 1
           )) < ${now.toISOString()}::timestamptz AS "reviewDue"
      FROM prescriptions p
     WHERE p.patient_id = ANY(${sql.param([...patientIds])}::uuid[]) AND ${which}`);
  return rows;
}

function rangeOf({ patientId, id, inputs, result, activatedAt, withdrawn, reviewDue }: RangeRow) {
  return {
    ...standingOf(result, withdrawn.length > 0),
    patientId,
    prescriptionId: id,
    activatedAt: new Date(activatedAt ?? NaN),
    withdrawn,
    reviewDue: reviewDue === true,
    restingSeated: inputs.resting.seated,
    icd: inputs.devices.icd,
    inputs,
    result,
  } satisfies RangeInForce;
}

/** The ranges in force of any number of patients, by patient, in one statement. */
export async function rangesInForce(
  db: Queryable,
  patientIds: readonly string[],
  now: Date,
): Promise<ReadonlyMap<string, RangeInForce>> {
  const rows = await rangeRows(db, patientIds, now, sql`p.status = 'active'`);
  return new Map(rows.map((row) => [row.patientId, rangeOf(row)]));
}

/** @returns undefined while no range is in force */
export async function rangeInForce(
  db: Queryable,
  patientId: string,
  now: Date,
): Promise<RangeInForce | undefined> {
  return (await rangesInForce(db, [patientId], now)).get(patientId);
}

/** Where a patient's range stands, with what a list and a header say of it. */
export interface RangeState {
  /** Null when none is in force. A withdrawn one leads by effort, its ceiling stays. */
  readonly range: RangeInShort | null;
  readonly withdrawn: readonly WithdrawalReason[];
  /** The range is older than the policy's days of review; it stays in force. */
  readonly reviewDue: boolean;
  readonly awaitsPhysician: boolean;
}

const none: RangeState = { range: null, withdrawn: [], reviewDue: false, awaitsPhysician: false };

function inShort(row: RangeRow): Omit<RangeState, 'awaitsPhysician'> {
  const { prescriptionId, leadBy, target, ceiling, perceivedExertion, ...range } = rangeOf(row);
  const { lower, upper } = perceivedExertion;
  return {
    range: {
      prescriptionId,
      leadBy,
      target,
      ceiling: ceiling?.value ?? null,
      perceivedExertion: { lower, upper },
      since: range.activatedAt.toISOString(),
    },
    withdrawn: range.withdrawn,
    reviewDue: range.reviewDue,
  };
}

/** The state of each patient's range, by patient, in one statement. */
export async function rangesOf(
  db: Queryable,
  patientIds: readonly string[],
  now: Date,
): Promise<(patientId: string) => RangeState> {
  const which = sql`(p.status = 'active' OR p.awaiting IS NOT NULL)`;
  const states = new Map<string, RangeState>();
  for (const row of await rangeRows(db, patientIds, now, which)) {
    const state = states.get(row.patientId) ?? none;
    const more = row.status === 'active' ? inShort(row) : { awaitsPhysician: true };
    states.set(row.patientId, { ...state, ...more });
  }
  return (patientId) => states.get(patientId) ?? none;
}
