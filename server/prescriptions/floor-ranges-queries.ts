import { sql } from 'drizzle-orm';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { Bpm } from '@shared/units';
import { isTodayFlag, withdrawalReasonsOf, type RangeFlag } from '@shared/clinical/range-flags';
import type { Transaction } from '../database/client';
import { statement } from '../database/statement';
import { presentFlag, type RawFlag } from '../patients/record-changes-queries';
import { flagsOfPrescription } from './range-in-force-queries';

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
  /** Why it does not lead now: why it is withdrawn, or that today's dose was missed; of a range in force alone. */
  readonly withdrawn: readonly string[];
  readonly flags: readonly RangeFlag[];
}

type FloorRow = Omit<FloorRange, 'withdrawn' | 'flags'> & { readonly flags: RawFlag[] };

/** Of a visit that began when the day's dose was missed; such a range leads again tomorrow. */
export const doseMissed = 'dose-missed';

function withFlags({ flags: raw, ...row }: FloorRow): FloorRange {
  const flags = raw.map(presentFlag);
  const today = flags.some(isTodayFlag) ? [doseMissed] : [];
  return { ...row, flags, withdrawn: [...withdrawalReasonsOf(flags), ...today] };
}

const at = sql`${sql.placeholder('at')}::timestamptz`;

const COLUMNS = sql`
  p.id, p.patient_id AS "patientId", p.status = 'active' AS active,
  jsonb_build_object(
    'leadBy', p.result -> 'leadBy', 'target', p.result -> 'target', 'guide', p.result -> 'guide',
    'ceiling', p.result -> 'ceiling', 'askLine', p.result -> 'askLine',
    'perceivedExertion', p.result -> 'perceivedExertion',
    'pressureCeiling', p.result -> 'pressureCeiling', 'oxygenFloor', p.result -> 'oxygenFloor') AS answer,
  (p.inputs #>> '{resting,seated}')::float AS "restingHeartRate", p.inputs ->> 'rhythm' AS rhythm,
  CASE WHEN p.status = 'active'
    THEN ${flagsOfPrescription(at)}
    ELSE '[]' END AS flags`;

const readRanges = statement<FloorRow>(
  'floor-ranges',
  sql`
    SELECT ${COLUMNS} FROM prescriptions p
     WHERE (p.status = 'active' AND p.patient_id = ANY(${sql.placeholder('patientIds')}::uuid[]))
        OR p.id = ANY(${sql.placeholder('rangeIds')}::uuid[])`,
);

/** The ranges in force of these patients, and these ranges whether or not they still are; in one statement. */
export async function floorRanges(
  tx: Transaction,
  wanted: { readonly patientIds: readonly string[]; readonly rangeIds: readonly string[] },
  now: Date,
): Promise<FloorRange[]> {
  return (await readRanges(tx, { ...wanted, at: now })).map(withFlags);
}

const readRangeAt = statement<FloorRow>(
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
  const [row] = await readRangeAt(tx, { patientId, at: instant });
  return row && withFlags(row);
}
