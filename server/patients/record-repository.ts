import { and, eq, isNull, lte, sql } from 'drizzle-orm';
import type { RecordKind } from '@shared/contracts/record-contract';
import type { Transaction } from '../database/client';
import { exerciseTests, medications, thresholds } from '../database/schema';
import { recordRegistry } from './record-registry';

/** Who writes, in whose record, when. */
export interface Scribe {
  readonly patientId: string;
  readonly userId: string;
  readonly now: Date;
}

/**
 * Adds an entry. The registry's tables have the contract's values as columns, which their common type cannot tell.
 * @returns false when the id is taken
 */
export async function insertEntry(
  tx: Transaction,
  kind: RecordKind,
  id: string,
  values: object,
  { patientId, userId, now }: Scribe,
): Promise<boolean> {
  const { table } = recordRegistry[kind];
  const row = { ...values, id, patientId, recordedAt: now, recordedBy: userId };
  const { rowCount } = await tx
    .insert(table)
    .values(row as never)
    .onConflictDoNothing();
  return rowCount === 1;
}

/** @returns false when there is no such entry, or it was marked already */
export async function markEnteredInError(
  tx: Transaction,
  kind: RecordKind,
  id: string,
  { patientId, userId, now }: Scribe,
): Promise<boolean> {
  const { table } = recordRegistry[kind];
  const { rowCount } = await tx.execute(sql`
    UPDATE ${table} SET entered_in_error_at = ${now.toISOString()}::timestamptz, entered_in_error_by = ${userId}::uuid
     WHERE id = ${id}::uuid AND patient_id = ${patientId}::uuid AND entered_in_error_at IS NULL`);
  return rowCount === 1;
}

interface ThresholdEnd {
  readonly status: 'superseded' | 'retired';
  readonly reason: string;
  /** The clean test that a person took for its end. */
  readonly byTestId?: string;
}

/** Ends an active threshold. @returns its kind and date, undefined when it binds no more or is another patient's */
export async function endThreshold(
  tx: Transaction,
  id: string,
  { status, reason, byTestId }: ThresholdEnd,
  { patientId, userId, now }: Scribe,
) {
  const [ended] = await tx
    .update(thresholds)
    .set({
      status,
      endedAt: now,
      endedBy: userId,
      endedReason: reason,
      supersededByTestId: byTestId ?? null,
    })
    .where(
      and(
        eq(thresholds.id, id),
        eq(thresholds.patientId, patientId),
        eq(thresholds.status, 'active'),
        isNull(thresholds.enteredInErrorAt),
      ),
    )
    .returning({ kind: thresholds.kind, foundOn: thresholds.foundOn });
  return ended;
}

/** Lets a threshold bind again whose successor was entered in error. */
export async function restoreThreshold(tx: Transaction, id: string): Promise<void> {
  await tx
    .update(thresholds)
    .set({ status: 'active', endedAt: null, endedBy: null, endedReason: null })
    .where(and(eq(thresholds.id, id), eq(thresholds.status, 'superseded')));
}

/** Lets the thresholds bind again that a test was taken to end, since that test was entered in error. */
export async function restoreThresholdsEndedBy(tx: Transaction, testId: string): Promise<void> {
  await tx
    .update(thresholds)
    .set({
      status: 'active',
      endedAt: null,
      endedBy: null,
      endedReason: null,
      supersededByTestId: null,
    })
    .where(eq(thresholds.supersededByTestId, testId));
}

/** Ends a restriction or a follow-up. @returns false when it has ended, was entered in error or is another patient's */
export async function endEntry(
  tx: Transaction,
  kind: 'restrictions' | 'questionnaires',
  id: string,
  reason: string,
  { patientId, userId, now }: Scribe,
): Promise<boolean> {
  const { table } = recordRegistry[kind];
  const { rowCount } = await tx.execute(sql`
    UPDATE ${table} SET ended_at = ${now.toISOString()}::timestamptz, ended_by = ${userId}::uuid, ended_reason = ${reason}
     WHERE id = ${id}::uuid AND patient_id = ${patientId}::uuid AND ended_at IS NULL AND entered_in_error_at IS NULL`);
  return rowCount === 1;
}

/** @returns false when there is none running that began by then */
export async function stopMedication(
  tx: Transaction,
  id: string,
  stoppedOn: string,
  { patientId, userId, now }: Scribe,
): Promise<boolean> {
  const stopped = await tx
    .update(medications)
    .set({ stoppedOn, stopRecordedAt: now, stopRecordedBy: userId })
    .where(
      and(
        eq(medications.id, id),
        eq(medications.patientId, patientId),
        isNull(medications.stoppedOn),
        isNull(medications.enteredInErrorAt),
        lte(medications.startedOn, stoppedOn),
      ),
    )
    .returning({ id: medications.id });
  return stopped.length === 1;
}

/** Takes a stop back. @returns false when there is no such entry of the patient */
export async function resumeMedication(
  tx: Transaction,
  id: string,
  { patientId }: Pick<Scribe, 'patientId'>,
): Promise<boolean> {
  const resumed = await tx
    .update(medications)
    .set({ stoppedOn: null, stopRecordedAt: null, stopRecordedBy: null })
    .where(
      and(
        eq(medications.id, id),
        eq(medications.patientId, patientId),
        isNull(medications.enteredInErrorAt),
      ),
    )
    .returning({ id: medications.id });
  return resumed.length === 1;
}

/** Whether the test is the patient's, and stands. */
export async function hasTest(
  tx: Transaction,
  patientId: string,
  testId: string,
): Promise<boolean> {
  const found = await tx
    .select({ id: exerciseTests.id })
    .from(exerciseTests)
    .where(
      and(
        eq(exerciseTests.id, testId),
        eq(exerciseTests.patientId, patientId),
        isNull(exerciseTests.enteredInErrorAt),
      ),
    );
  return found.length === 1;
}
