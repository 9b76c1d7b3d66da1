import { and, desc, eq, inArray, lt, or } from 'drizzle-orm';
import {
  messageKinds,
  undeliveredReasons,
  type Undelivered,
} from '@shared/contracts/messages-contract';
import { openRecords } from '../accounts/access-policy';
import type { Actor } from '../accounts/actor';
import type { Queryable } from '../database/client';
import { outbox, patients } from '../database/schema';

export interface UndeliveredFilter {
  readonly after?: readonly [dueAt: string, id: string] | undefined;
  readonly limit: number;
}

const earlierThan = ([dueAt, id]: readonly [string, string]) => {
  const at = new Date(dueAt);
  return or(lt(outbox.dueAt, at), and(eq(outbox.dueAt, at), lt(outbox.id, id)));
};

/** Messages to patients that reached nobody, newest first; one more than the limit tells whether there are more. */
export async function listUndelivered(
  tx: Queryable,
  actor: Actor,
  { after, limit }: UndeliveredFilter,
): Promise<Undelivered[]> {
  const rows = await tx
    .select({
      id: outbox.id,
      kind: outbox.kind,
      reason: outbox.lastError,
      dueAt: outbox.dueAt,
      patientId: patients.id,
      givenName: patients.givenName,
      familyName: patients.familyName,
      recordNumber: patients.recordNumber,
      phone: patients.phone,
    })
    .from(outbox)
    .innerJoin(patients, or(eq(patients.id, outbox.patientId), eq(patients.userId, outbox.userId)))
    .where(
      and(
        inArray(outbox.status, ['failed', 'cancelled']),
        inArray(outbox.lastError, [...undeliveredReasons]),
        inArray(outbox.kind, [...messageKinds]),
        openRecords(actor),
        after && earlierThan(after),
      ),
    )
    .orderBy(desc(outbox.dueAt), desc(outbox.id))
    .limit(limit + 1);
  return rows.map(({ givenName, familyName, kind, reason, dueAt, ...row }) => ({
    ...row,
    kind: kind as Undelivered['kind'],
    reason: reason as Undelivered['reason'],
    dueAt: dueAt.toISOString(),
    displayName: `${givenName} ${familyName}`,
  }));
}
