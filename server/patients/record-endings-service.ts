import { objectionsTo } from '@shared/clinical/thresholds/threshold-proposal';
import type { RecordEntry } from '@shared/contracts/record-contract';
import { fail } from '../http/failure';
import { fieldFailure } from './field-failure';
import { patientDates } from './patients-queries';
import { patientRecord } from './record-queries';
import { endEntry, endThreshold } from './record-repository';
import { existing, scribeOf, type RecordCall } from './record-service';

/** A physician's word that a threshold binds no more. @throws Failure `not-found`, `stale-version` when it has ended already */
export async function retireThreshold(
  call: RecordCall,
  entryId: string,
  reason: string,
): Promise<RecordEntry> {
  await existing(call, 'thresholds', entryId);
  const ended = await endThreshold(call.tx, entryId, { status: 'retired', reason }, scribeOf(call));
  if (!ended) throw fail('stale-version');
  return existing(call, 'thresholds', entryId);
}

/**
 * A person's word that a later clean test takes a threshold's place. The test is held against the rule again, as the record stands.
 * @throws Failure `not-found`, `stale-version` when it has ended already, `invalid-request` with why the test does not show it
 */
export async function supersedeByTest(
  call: RecordCall,
  entryId: string,
  testId: string,
): Promise<RecordEntry> {
  const record = await patientRecord(call.tx, call.patientId);
  const threshold = record.thresholds.find(({ id }) => id === entryId);
  if (!threshold) throw fail('not-found');
  const test = record['exercise-tests'].find(
    ({ id, enteredInErrorAt }) => id === testId && enteredInErrorAt === null,
  );
  if (!test) throw fieldFailure('exerciseTestId', 'unknown', 'Choose a test of this patient');
  const { today } = await patientDates(call.tx, call.patientId, call.now);
  const [why] = objectionsTo(record, threshold, test, today);
  if (why !== undefined) throw fieldFailure('exerciseTestId', 'not-clean', why);
  const reason = `Clean test of ${test.values.performedOn}, to ${test.values.peakHeartRate} bpm`;
  const end = { status: 'superseded', reason, byTestId: testId } as const;
  if (!(await endThreshold(call.tx, entryId, end, scribeOf(call)))) throw fail('stale-version');
  return existing(call, 'thresholds', entryId);
}

async function end(
  call: RecordCall,
  kind: 'restrictions' | 'questionnaires',
  entryId: string,
  reason: string,
): Promise<RecordEntry> {
  if (!(await endEntry(call.tx, kind, entryId, reason, scribeOf(call))))
    throw fail('stale-version');
  return existing(call, kind, entryId);
}

/** An order that holds no more. @throws Failure `not-found`, `stale-version` when it was lifted already */
export async function liftRestriction(
  call: RecordCall,
  entryId: string,
  reason: string,
): Promise<RecordEntry> {
  await existing(call, 'restrictions', entryId);
  return end(call, 'restrictions', entryId, reason);
}

/**
 * Somebody spoke with a patient who told of thoughts of self-harm: what was done.
 * @throws Failure `not-found` also where there is nothing to follow up, `stale-version` when it was closed already
 */
export async function closeFollowUp(
  call: RecordCall,
  entryId: string,
  done: string,
): Promise<RecordEntry> {
  const entry = await existing(call, 'questionnaires', entryId);
  const { instrument, answers } = (entry as RecordEntry<'questionnaires'>).values;
  if (instrument !== 'phq-9' || Number(answers[8] ?? 0) === 0) throw fail('not-found');
  return end(call, 'questionnaires', entryId, done);
}
