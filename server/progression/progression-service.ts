import { DateTime } from 'luxon';
import { metsOfSetting } from '@shared/clinical/progression/machine-setting';
import { mostWork } from '@shared/clinical/progression/most-work';
import { proposeProgression, type Load } from '@shared/clinical/progression/propose-progression';
import type { SessionFacts } from '@shared/clinical/progression/session-facts';
import { progressionVersion } from '@shared/clinical/progression/version';
import { settingOf, type DecisionRequest } from '@shared/contracts/progression-contract';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { Minutes } from '@shared/units';
import { requirePatientAccess } from '../accounts/access-service';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { fail, type Failure } from '../http/failure';
import { programPolicyInForce } from '../prescriptions/policy-queries';
import { findPrescription } from '../prescriptions/prescriptions-queries';
import { rangeInForce } from '../prescriptions/range-in-force-queries';
import { findProposal } from './progression-queries';
import {
  insertProposal,
  lastSessions,
  writeDecision,
  type SessionRow,
} from './progression-repository';

/** Enough for every rule that looks back. */
const sessionsRead = 8;

const daysBetween = (from: string, to: string): number =>
  Math.round(
    DateTime.fromISO(to, { zone: 'utc' }).diff(DateTime.fromISO(from, { zone: 'utc' }), 'days')
      .days,
  );

function factsOf(rows: readonly SessionRow[], prescriptionId: string): SessionFacts[] {
  const newest = rows[0]?.localDate ?? '';
  return rows.map(({ localDate, setting, minutes, shortBouts, doseMissed, readings, ...row }) => ({
    ...{ setting, minutes, shortBouts, doseMissed, readings },
    daysAgo: daysBetween(localDate, newest),
    underThisPrescription: row.prescriptionId === prescriptionId,
  }));
}

const weightOf = (inputs: unknown) => (inputs as PrescriptionRequest).patient.weightKg;

/**
 * Works out the next step after a session that was just signed and keeps it, once a record. A session without exercise, or a
 * patient without a range, has none.
 */
export async function proposeAfterSession(
  tx: Transaction,
  {
    recordId,
    patientId,
    now,
  }: { readonly recordId: string; readonly patientId: string; readonly now: Date },
): Promise<void> {
  const range = await rangeInForce(tx, patientId, now);
  const prescription = range && (await findPrescription(tx, range.prescriptionId));
  const rows = await lastSessions(tx, patientId, sessionsRead);
  if (!range || !prescription || rows[0]?.id !== recordId) return;
  const { prescribing, training } = await programPolicyInForce(tx.connection, now);
  const proposal = proposeProgression(
    {
      sessions: factsOf(rows, prescription.id),
      prescription: prescription.result,
      withdrawn: range.withdrawn.length > 0,
      weight: weightOf(prescription.inputs),
      equipment: prescribing.equipment,
    },
    training.progression,
  );
  await insertProposal(tx, {
    sessionRecordId: recordId,
    patientId,
    prescriptionId: prescription.id,
    proposal,
    policyVersion: prescribing.version,
    engineVersion: progressionVersion,
    now,
  });
}

/** What the edited load comes to, or what is wrong with it. @throws Failure `invalid-request` */
function editedLoad(
  { setting: given, minutes }: Extract<DecisionRequest, { decision: 'edited' }>,
  answer: PrescriptionAnswer,
  weight: PrescriptionRequest['patient']['weightKg'],
): Load {
  const setting = settingOf(given);
  const mets = metsOfSetting(setting, weight);
  const limit = mostWork(setting, answer);
  const refuse = (code: string, message: string) =>
    fail('invalid-request', { errors: [{ path: 'setting', code, message }] });
  if (limit !== Infinity && mets === null) {
    throw refuse(
      'equation-range',
      'The work of this setting cannot be told, so not held under the ceiling',
    );
  }
  if (mets !== null && mets > limit + 1e-9) {
    throw refuse(
      'over-ceiling',
      `Set at most ${(Math.floor(limit * 10) / 10).toFixed(1)} METs: the ceiling of the range`,
    );
  }
  return { setting, mets, minutes: minutes as Minutes | null };
}

const overtaken = () =>
  fail('stale-version', {
    title:
      'A later session, another range or a withdrawal has overtaken this proposal. Load the page again.',
  });

/**
 * A person accepts a proposal, sets another load under the ceilings, or dismisses it with a reason; once.
 * @returns whose it is, or `not-found`, `stale-version`, `invalid-request`
 */
export async function decideProposal(
  tx: Transaction,
  actor: Actor,
  id: string,
  request: DecisionRequest,
  now: Date,
): Promise<{ readonly patientId: string } | Failure> {
  const row = await findProposal(tx, id);
  if (!row) return fail('not-found');
  const { patientId } = row;
  await requirePatientAccess(tx, actor, patientId);
  if (actor.student) return fail('forbidden');
  const by = { userId: actor.id, now };
  if (request.decision === 'dismissed') {
    const { reason } = request;
    const first = await writeDecision(tx, id, { kind: 'dismissed', load: null, reason, ...by });
    return first ? { patientId } : overtaken();
  }
  const range = await rangeInForce(tx, patientId, now);
  if (!row.current || !range || range.withdrawn.length > 0) return overtaken();
  const prescription = await findPrescription(tx, row.prescriptionId);
  if (!prescription) return overtaken();
  const { proposal } = row;
  if (request.decision === 'accepted' && proposal.action === 'review' && proposal.to === null) {
    return fail('not-applicable', {
      title: 'This asks for a review first: see to it, then set a load or dismiss the proposal.',
    });
  }
  const decision =
    request.decision === 'accepted'
      ? { kind: 'accepted' as const, load: proposal.to ?? proposal.from, reason: null }
      : {
          kind: 'edited' as const,
          load: editedLoad(request, prescription.result, weightOf(prescription.inputs)),
          reason: request.reason,
        };
  return (await writeDecision(tx, id, { ...decision, ...by })) ? { patientId } : overtaken();
}
