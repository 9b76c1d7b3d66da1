import type { Load, ProgressionProposal } from '@shared/clinical/progression/propose-progression';
import type { NextStart, Proposal } from '@shared/contracts/progression-contract';
import type { Transaction } from '../database/client';

interface ProposalRow {
  readonly id: string;
  readonly sessionRecordId: string;
  readonly patientId: string;
  readonly prescriptionId: string;
  readonly localDate: string;
  readonly proposal: ProgressionProposal;
  readonly policyVersion: number;
  readonly engineVersion: string;
  readonly madeAt: Date;
  readonly decision: 'accepted' | 'edited' | 'dismissed' | null;
  readonly decidedLoad: Load | null;
  readonly decisionReason: string | null;
  readonly decidedAt: Date | null;
  readonly decidedBy: string | null;
  /** The latest of its patient, under the range that is in force. */
  readonly current: boolean;
}

const PROPOSAL = `
  SELECT g.id, g.session_record_id AS "sessionRecordId", g.patient_id AS "patientId", g.prescription_id AS "prescriptionId",
         a.local_date::text AS "localDate", g.proposal, g.policy_version AS "policyVersion",
         g.engine_version AS "engineVersion", g.made_at AS "madeAt", g.decision, g.decided_load AS "decidedLoad",
         g.decision_reason AS "decisionReason", g.decided_at AS "decidedAt", u.display_name AS "decidedBy",
         p.status = 'active' AND NOT EXISTS (
           SELECT FROM progression_proposals l WHERE l.patient_id = g.patient_id AND l.made_at > g.made_at) AS current
    FROM progression_proposals g
    JOIN session_records r ON r.id = g.session_record_id
    JOIN appointments a ON a.id = r.appointment_id
    JOIN prescriptions p ON p.id = g.prescription_id
    LEFT JOIN users u ON u.id = g.decided_by`;

/** @returns undefined when there is none */
export async function findProposal(tx: Transaction, id: string): Promise<ProposalRow | undefined> {
  const { rows } = await tx.connection.query<ProposalRow>({
    name: 'find-progression-proposal',
    text: `${PROPOSAL} WHERE g.id = $1`,
    values: [id],
  });
  return rows[0];
}

export async function latestProposal(
  tx: Transaction,
  patientId: string,
): Promise<ProposalRow | undefined> {
  const { rows } = await tx.connection.query<ProposalRow>({
    name: 'latest-progression-proposal',
    text: `${PROPOSAL} WHERE g.patient_id = $1 ORDER BY g.made_at DESC LIMIT 1`,
    values: [patientId],
  });
  return rows[0];
}

/** @param holds false while the range in force is withdrawn */
export function presentProposal(row: ProposalRow, holds: boolean): Proposal {
  const { id, sessionRecordId, localDate, proposal, policyVersion, engineVersion, decision } = row;
  return {
    ...{ id, sessionRecordId, localDate, policyVersion, engineVersion },
    action: proposal.action,
    reasons: [...proposal.reasons],
    from: proposal.from,
    to: proposal.to,
    madeAt: row.madeAt.toISOString(),
    decision: decision && {
      kind: decision,
      load: row.decidedLoad,
      reason: row.decisionReason,
      by: row.decidedBy ?? '',
      at: row.decidedAt?.toISOString() ?? '',
    },
    stands: row.current && holds,
  };
}

interface StartRow {
  readonly patientId: string;
  readonly prescriptionId: string;
  readonly last: Load | null;
  readonly decision: ProposalRow['decision'];
  readonly decided: Load | null;
  readonly by: string | null;
  readonly at: Date | null;
}

/**
 * What each patient's next session starts with: what was decided after the last one, else what the last one was.
 * @returns by patient; the range it was decided under must still lead, or the last session counts
 */
export async function nextStarts(
  tx: Transaction,
  patientIds: readonly string[],
): Promise<(patientId: string, leadingRangeId: string | null) => NextStart | null> {
  const { rows } = await tx.connection.query<StartRow>({
    name: 'next-starts',
    text: `
      SELECT DISTINCT ON (g.patient_id) g.patient_id AS "patientId", g.prescription_id AS "prescriptionId",
             g.proposal -> 'from' AS last, g.decision, g.decided_load AS decided, u.display_name AS by, g.decided_at AS at
        FROM progression_proposals g LEFT JOIN users u ON u.id = g.decided_by
       WHERE g.patient_id = ANY($1::uuid[])
       ORDER BY g.patient_id, g.made_at DESC`,
    values: [patientIds],
  });
  const byPatient = new Map(rows.map((row) => [row.patientId, row]));
  return (patientId, leadingRangeId) => {
    const row = byPatient.get(patientId);
    if (!row) return null;
    const { decision, decided, last, by, at } = row;
    const isDecided = decision === 'accepted' || decision === 'edited';
    if (isDecided && decided !== null && row.prescriptionId === leadingRangeId) {
      return { load: decided, from: decision, by, at: at?.toISOString() ?? null };
    }
    return last && { load: last, from: 'last-session', by: null, at: null };
  };
}
