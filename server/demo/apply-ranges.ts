import { placeReading } from '@shared/clinical/placement';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import { bpm } from '@shared/units';
import type { PoolClient } from 'pg';
import { prescriptions } from '../database/schema';
import { insertRows, updateUntouched } from './bulk';
import type { RowOf } from './row-of';
import type { TableChanges } from './story-changes';

type Prescription = RowOf<'prescriptions'>;

/** Patients for whom a person has written, signed or ended a range: from then on their ranges are that person's. */
export async function prescribedByPeople(
  connection: PoolClient,
  told: readonly Prescription[],
): Promise<Set<string>> {
  const { rows } = await connection.query<{ patient_id: string }>(
    `SELECT DISTINCT p.patient_id
       FROM prescriptions p
       LEFT JOIN json_populate_recordset(null::prescriptions, $1::json) t ON t.id = p.id
      WHERE t.id IS NULL OR (t.status, t.version) IS DISTINCT FROM (p.status, p.version)`,
    [JSON.stringify(told.map(({ id, status, version }) => ({ id, status, version })))],
  );
  return new Set(rows.map((row) => row.patient_id));
}

/** Ends ranges before others begin: one is in force at a time. */
export async function applyRanges(
  connection: PoolClient,
  { added, changed }: TableChanges<Prescription>,
  theirs: ReadonlySet<string>,
): Promise<void> {
  const ours = changed.filter(({ after }) => !theirs.has(after.patientId));
  const begins = (row: Prescription) => row.status === 'active';
  await updateUntouched(
    connection,
    prescriptions,
    ours.filter(({ after }) => !begins(after)),
  );
  await updateUntouched(
    connection,
    prescriptions,
    ours.filter(({ after }) => begins(after)),
  );
  await insertRows(
    connection,
    prescriptions,
    added.filter((row) => !theirs.has(row.patientId)),
  );
}

interface SignedRange {
  readonly id: string;
  readonly patientId: string;
  readonly from: Date;
  readonly to: Date | null;
  readonly answer: PrescriptionAnswer;
}

/** The ranges that the database holds for some patients. */
export async function standingRanges(
  connection: PoolClient,
  patientIds: readonly string[],
): Promise<SignedRange[]> {
  const { rows } = await connection.query<SignedRange>(
    `SELECT id, patient_id AS "patientId", activated_at AS "from", ended_at AS "to", result AS answer
       FROM prescriptions WHERE patient_id = ANY($1) AND activated_at IS NOT NULL`,
    [patientIds],
  );
  return rows;
}

interface Session {
  readonly record: RowOf<'sessionRecords'>;
  readonly readings: readonly RowOf<'vitalSigns'>[];
}

/** Reads a session against the range that was really in force, which may be one that a person signed. */
export function againstStanding(session: Session, ranges: readonly SignedRange[]): Session {
  const { patientId, startedAt } = session.record;
  const range = ranges.find(
    ({ patientId: whose, from, to }) =>
      whose === patientId && from <= startedAt && (to === null || to > startedAt),
  );
  const prescriptionId = range?.id ?? null;
  if (prescriptionId === session.record.prescriptionId) return session;
  return {
    record: { ...session.record, prescriptionId },
    readings: session.readings.map((reading) => ({
      ...reading,
      prescriptionId,
      placement:
        range && typeof reading.heartRate === 'number'
          ? placeReading(reading.phase, bpm(reading.heartRate), range.answer)
          : null,
    })),
  };
}
