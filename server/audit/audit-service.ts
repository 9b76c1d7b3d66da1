import type { Pool, PoolClient } from 'pg';
import { v7 as uuidv7 } from 'uuid';
import type { Database, Transaction } from '../database/client';

export interface AuditEntry {
  /** What was done, as in `prescription.signed`. */
  readonly action: string;
  readonly objectType: string;
  readonly objectId?: string | null;
  readonly patientId?: string | null;
  readonly outcome?: 'success' | 'refused' | 'failure';
  /** Ids and codes alone: never a name, an address, a reading or a secret. */
  readonly details?: Readonly<Record<string, unknown>>;
}

/** Who did it, from where and when; a job has no actor, address or session. */
export interface AuditSource {
  readonly actorId: string | null;
  readonly ip: string | null;
  readonly sessionHash: string | null;
  readonly at: Date;
}

/** One statement for any number of events, prepared once a connection: every read of a record pays for it. */
const INSERT = {
  name: 'record-audit',
  text: `
    INSERT INTO audit_events
      (id, at, actor_id, action, object_type, object_id, patient_id, ip, session_hash, outcome, details)
    SELECT e.id, $2, $3, e.action, e."objectType", e."objectId", e."patientId", $4, $5, e.outcome, e.details
      FROM jsonb_to_recordset($1) AS e(id uuid, action text, "objectType" text, "objectId" text, "patientId" uuid,
        outcome audit_outcome, details jsonb)`,
};

async function insert(
  connection: Pool | PoolClient,
  source: AuditSource,
  entries: readonly AuditEntry[],
): Promise<void> {
  if (entries.length === 0) return;
  const rows = entries.map((entry) => ({ id: uuidv7(), outcome: 'success', ...entry }));
  await connection.query({
    ...INSERT,
    values: [JSON.stringify(rows), source.at, source.actorId, source.ip, source.sessionHash],
  });
}

/** Writes events in the transaction that they tell of. */
export const recordAudit = (
  tx: Transaction,
  source: AuditSource,
  entries: readonly AuditEntry[],
): Promise<void> => insert(tx.connection, source, entries);

/** Writes events that stand alone: refusals and failures, of which nothing else was kept. */
export const recordAuditAlone = (
  database: Database,
  source: AuditSource,
  entries: readonly AuditEntry[],
): Promise<void> => insert(database.$client, source, entries);

/** The source of what a job does. */
export const jobSource = (at: Date): AuditSource => ({
  actorId: null,
  ip: null,
  sessionHash: null,
  at,
});
