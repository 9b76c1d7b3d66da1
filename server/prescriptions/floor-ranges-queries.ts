import { sql } from 'drizzle-orm';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { Bpm } from '@shared/units';
import type { WithdrawalReason } from '@shared/clinical/withdrawal';
import type { Transaction } from '../database/client';
import { statement } from '../database/statement';
import { withdrawalOfPrescription } from './range-in-force-queries';

/** What the floor needs of a result; the rest (candidates, workloads …) is most of its bulk. */
type FloorAnswer = Pick<
  PrescriptionAnswer,
  | 'leadBy'
  | 'target'
  | 'guide'
  | 'ceiling'
  | 'askLine'
  | 'perceivedExertion'
  | 'pressureCeiling'
  | 'oxygenFloor'
>;

/** A range that is in force, or that a visit was begun with. */
export interface FloorRange {
  readonly id: string;
  readonly patientId: string;
  readonly active: boolean;
  readonly answer: FloorAnswer;
  readonly restingHeartRate: Bpm | null;
  readonly rhythm: string | null;
  /** Why it would lead no more now; of a range in force alone. */
  readonly withdrawn: readonly WithdrawalReason[];
}

const COLUMNS = sql`
  p.id, p.patient_id AS "patientId", p.status = 'active' AS active,
  jsonb_build_object(
    'leadBy', p.result -> 'leadBy', 'target', p.result -> 'target', 'guide', p.result -> 'guide',
    'ceiling', p.result -> 'ceiling', 'askLine', p.result -> 'askLine',
    'perceivedExertion', p.result -> 'perceivedExertion',
    'pressureCeiling', p.result -> 'pressureCeiling', 'oxygenFloor', p.result -> 'oxygenFloor') AS answer,
  (p.inputs #>> '{resting,seated}')::float AS "restingHeartRate", p.inputs ->> 'rhythm' AS rhythm,
  CASE WHEN p.status = 'active'
    THEN ${withdrawalOfPrescription}
    ELSE '{}' END AS withdrawn`;

const readRanges = statement<FloorRange>(
  'floor-ranges',
  sql`
    SELECT ${COLUMNS} FROM prescriptions p
     WHERE (p.status = 'active' AND p.patient_id = ANY(${sql.placeholder('patientIds')}::uuid[]))
        OR p.id = ANY(${sql.placeholder('rangeIds')}::uuid[])`,
);

/** The ranges in force of these patients, and these ranges whether or not they still are; in one statement. */
export function floorRanges(
  tx: Transaction,
  wanted: { readonly patientIds: readonly string[]; readonly rangeIds: readonly string[] },
): Promise<FloorRange[]> {
  return readRanges(tx, wanted);
}

const at = sql`${sql.placeholder('at')}::timestamptz`;
const readRangeAt = statement<FloorRange>(
  'floor-range-at',
  sql`
    SELECT ${COLUMNS} FROM prescriptions p
     WHERE p.patient_id = ${sql.placeholder('patientId')}
       AND (p.status = 'active' OR (p.activated_at <= ${at} AND p.ended_at > ${at} AND p.status = 'completed'))
     ORDER BY p.activated_at <= ${at} DESC, p.activated_at
     LIMIT 1`,
);

/** The range that was in force at an instant, else the one that is now; undefined without either. */
export async function floorRangeAt(
  tx: Transaction,
  patientId: string,
  instant: Date,
): Promise<FloorRange | undefined> {
  return (await readRangeAt(tx, { patientId, at: instant }))[0];
}
