import { isSameSetting, type MachineSetting } from '@shared/clinical/progression/machine-setting';
import { settingOf, type Bout, type BoutRequest } from '@shared/contracts/progression-contract';
import { requirePatientAccess } from '../accounts/access-service';
import type { Transaction } from '../database/client';
import { fail, type Failure } from '../http/failure';
import { lockRecord } from './floor-repository';
import type { FloorCall, Written } from './floor-service';

interface BoutRow extends Omit<Bout, 'receivedAt' | 'setting'> {
  readonly setting: MachineSetting;
  readonly patientId: string;
  readonly receivedAt: Date;
}

async function findBout(tx: Transaction, id: string): Promise<BoutRow | undefined> {
  const { rows } = await tx.connection.query<BoutRow>({
    name: 'find-exercise-bout',
    text: `
      SELECT b.id, b.session_record_id AS "sessionRecordId", b.patient_id AS "patientId", b.setting, b.minutes,
             b.short_bouts AS "shortBouts", b.received_at AS "receivedAt", u.display_name AS "recordedBy"
        FROM exercise_bouts b JOIN users u ON u.id = b.recorded_by WHERE b.id = $1`,
    values: [id],
  });
  return rows[0];
}

const isSame = (row: BoutRow, { sessionRecordId, setting, minutes, shortBouts }: BoutRequest) =>
  row.sessionRecordId === sessionRecordId &&
  row.minutes === minutes &&
  row.shortBouts === shortBouts &&
  isSameSetting(row.setting, settingOf(setting));

export const presentBout = ({ patientId: _, receivedAt, ...bout }: BoutRow): Bout => ({
  ...bout,
  receivedAt: receivedAt.toISOString(),
});

/**
 * Stores how a machine was set during a visit; the latest of a record counts, and none is changed.
 * @returns the stored row, or `not-found`, `already-recorded`, `record-signed`, `not-checked-in`
 */
export async function recordBout(
  { tx, actor, now }: FloorCall,
  id: string,
  request: BoutRequest,
): Promise<Written<BoutRow> | Failure> {
  const record = await lockRecord(tx, request.sessionRecordId, 'share');
  if (!record) return fail('not-found');
  await requirePatientAccess(tx, actor, record.patientId);
  const isOpen = record.signedAt === null && record.appointmentStatus === 'checked-in';
  const { rowCount } = isOpen
    ? await tx.connection.query({
        name: 'insert-exercise-bout',
        text: `
          INSERT INTO exercise_bouts (id, session_record_id, patient_id, setting, minutes, short_bouts, received_at, recorded_by)
          VALUES ($1, $2, $3, $4, $5, $6, $7, $8) ON CONFLICT (id) DO NOTHING`,
        values: [
          id,
          record.id,
          record.patientId,
          JSON.stringify(request.setting),
          request.minutes,
          request.shortBouts,
          now,
          actor.id,
        ],
      })
    : { rowCount: 0 };
  const row = await findBout(tx, id);
  if (row) {
    if (rowCount === 1) return { first: true, row };
    return isSame(row, request) ? { first: false, row } : fail('already-recorded');
  }
  return fail(record.signedAt === null ? 'not-checked-in' : 'record-signed');
}
