import type { PoolClient } from 'pg';
import {
  charges,
  exerciseBouts,
  ledgerEntries,
  payments,
  sessionRecords,
  vitalSigns,
} from '../database/schema';
import { againstStanding, standingRanges } from './apply-ranges';
import { insertRows, updateUntouched } from './bulk';
import { workRow } from './work-rows';
import type { StoryChanges } from './story-changes';

function grouped<R>(rows: readonly R[], keyOf: (row: R) => string): Map<string, R[]> {
  const groups = new Map<string, R[]>();
  for (const row of rows) {
    const group = groups.get(keyOf(row));
    if (group) group.push(row);
    else groups.set(keyOf(row), [row]);
  }
  return groups;
}

/** Writes the records of visits that took place, unsigned, then their readings, then the signatures. */
export async function applySessions(
  connection: PoolClient,
  changes: StoryChanges,
  appointments: ReadonlySet<string>,
): Promise<void> {
  const records = changes.sessionRecords.added.filter(({ appointmentId }) =>
    appointments.has(appointmentId),
  );
  const ranges = await standingRanges(connection, [
    ...new Set(records.map(({ patientId }) => patientId)),
  ]);
  const byPatient = grouped(ranges, ({ patientId }) => patientId);
  const readingsOf = grouped(changes.vitalSigns.added, ({ sessionRecordId }) => sessionRecordId);
  const sessions = records.map((record) =>
    againstStanding(
      { record, readings: readingsOf.get(record.id) ?? [] },
      byPatient.get(record.patientId) ?? [],
    ),
  );
  const signed = sessions.map(({ record }) => record);
  const unsigned = signed.map((record) => ({
    ...record,
    signedAt: null,
    signedBy: null,
    exercised: null,
  }));
  await insertRows(connection, sessionRecords, unsigned);
  await insertRows(
    connection,
    vitalSigns,
    sessions.flatMap(({ readings }) => readings),
  );
  await insertRows(
    connection,
    exerciseBouts,
    sessions.flatMap(({ readings }) => workRow(readings) ?? []),
  );
  await updateUntouched(
    connection,
    sessionRecords,
    signed.map((after, each) => ({ before: unsigned[each] ?? after, after })),
  );
}

/** Charges of the appointments, and what was posted for them. */
export async function applyMoney(
  connection: PoolClient,
  changes: StoryChanges,
  appointments: ReadonlySet<string>,
): Promise<void> {
  const fresh = changes.charges.added.filter(({ appointmentId }) =>
    appointments.has(appointmentId ?? ''),
  );
  const moved = new Set([
    ...(await insertRows(connection, charges, fresh)),
    ...(await updateUntouched(connection, charges, changes.charges.changed)),
  ]);
  const ofMoved = ({ chargeId }: { chargeId?: string | null }) => moved.has(chargeId ?? '');
  await insertRows(connection, payments, changes.payments.added.filter(ofMoved));
  await insertRows(connection, ledgerEntries, changes.ledgerEntries.added.filter(ofMoved));
}
