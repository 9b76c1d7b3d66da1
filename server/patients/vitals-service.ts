import { timePosition } from '@shared/contracts/fields';
import type { VitalsHistory } from '@shared/contracts/vitals-history-contract';
import type { Queryable } from '../database/client';
import { vitalsHistory } from '../floor/vital-signs-queries';
import { fieldFailure } from './field-failure';

interface Page {
  readonly cursor?: string | undefined;
  readonly limit: number;
}

/** Where a list of sessions goes on: instant and id of the last, nothing that names anybody. */

function positionOf(cursor: string | undefined) {
  if (cursor === undefined) return null;
  const parts = Buffer.from(cursor, 'base64url').toString().split(' ');
  const { data } = timePosition.safeParse(parts);
  if (!data) throw fieldFailure('cursor', 'invalid', 'Start the list again');
  return { startedAt: new Date(data[0]), id: data[1] };
}

/** A page of a patient's sessions with their readings. @throws Failure `invalid-request` for a foreign cursor */
export async function readVitals(
  db: Queryable,
  patientId: string,
  { cursor, limit }: Page,
): Promise<VitalsHistory> {
  const found = await vitalsHistory(db, patientId, { after: positionOf(cursor), limit });
  const items = found.slice(0, limit);
  const last = items.at(-1);
  const nextCursor =
    found.length > limit && last
      ? Buffer.from(`${last.startedAt} ${last.sessionRecordId}`).toString('base64url')
      : null;
  return { items, nextCursor };
}
