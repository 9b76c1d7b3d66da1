import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import { mayOpenRecord, type RecordOwner } from './access-policy';
import type { Actor } from './actor';

/**
 * Lets the call go on only when the actor may open the patient's record.
 * @throws Failure `not-found`, the same whether there is no such record or it is not theirs
 */
export async function requirePatientAccess(
  tx: Transaction,
  actor: Actor,
  patientId: string,
): Promise<void> {
  const { rows } = await tx.connection.query<RecordOwner>({
    name: 'record-owner',
    text: 'SELECT site_id AS "siteId", user_id AS "userId" FROM patients WHERE id = $1',
    values: [patientId],
  });
  const [record] = rows;
  if (!record) throw fail('not-found');
  if (mayOpenRecord(actor, record)) return;
  const refusal = { action: 'record.refused', objectType: 'patient', objectId: patientId };
  throw fail('not-found', { record: { ...refusal, patientId, outcome: 'refused' } });
}
