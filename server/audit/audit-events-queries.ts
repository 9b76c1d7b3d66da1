import type { PoolClient } from 'pg';
import type { AuditEvent, AuditQuery } from '@shared/contracts/audit-contract';

interface EventRow extends Omit<AuditEvent, 'at' | 'actor' | 'patient'> {
  readonly sequence: string;
  readonly at: Date;
  readonly actorId: string | null;
  readonly actorName: string | null;
  readonly patientId: string | null;
  readonly recordNumber: string | null;
}

/** The filtered page is cut first, so that names are looked up for what is shown alone. */
const PAGE = `
  WITH page AS (
    SELECT * FROM audit_events e
     WHERE ($1::bigint IS NULL OR e.sequence < $1)
       AND ($2::uuid IS NULL OR e.actor_id = $2)
       AND ($3::uuid IS NULL OR e.patient_id = $3)
       AND ($4::text IS NULL OR starts_with(e.action, $4))
       AND ($6::timestamptz IS NULL OR e.at >= $6)
       AND ($7::timestamptz IS NULL OR e.at < $7)
     ORDER BY e.sequence DESC LIMIT $5)
  SELECT page.sequence, page.id, page.at, page.action, page.outcome, page.ip, page.details,
         page.object_type AS "objectType", page.object_id AS "objectId",
         page.actor_id AS "actorId", u.display_name AS "actorName",
         page.patient_id AS "patientId", p.record_number AS "recordNumber"
    FROM page LEFT JOIN users u ON u.id = page.actor_id LEFT JOIN patients p ON p.id = page.patient_id
   ORDER BY page.sequence DESC`;

export type ListedEvent = AuditEvent & { readonly sequence: number };

function present(row: EventRow): ListedEvent {
  const { at, sequence, actorId, actorName, patientId, recordNumber, ...rest } = row;
  return {
    ...rest,
    sequence: Number(sequence),
    at: at.toISOString(),
    actor: actorId === null ? null : { id: actorId, displayName: actorName ?? 'Account removed' },
    patient: patientId === null ? null : { id: patientId, recordNumber },
  };
}

/** Instants, the first inclusive, the second exclusive; null where the span is open. */
export interface AuditSpan {
  readonly from: Date | null;
  readonly to: Date | null;
}

/**
 * Events of the audit, the newest first.
 * @param before the sequence to go on below, null from the newest
 */
export async function listAuditEvents(
  client: Pick<PoolClient, 'query'>,
  { actorId, patientId, action }: Pick<AuditQuery, 'actorId' | 'patientId' | 'action'>,
  {
    limit,
    before,
    span,
  }: { readonly limit: number; readonly before: number | null; readonly span: AuditSpan },
): Promise<ListedEvent[]> {
  const { rows } = await client.query<EventRow>(PAGE, [
    before,
    actorId ?? null,
    patientId ?? null,
    action ?? null,
    limit,
    span.from,
    span.to,
  ]);
  return rows.map(present);
}
