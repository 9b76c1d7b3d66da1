import { timePosition } from '@shared/contracts/fields';
import type { VitalsHistory } from '@shared/contracts/vitals-history-contract';
import type { Queryable } from '../database/client';
import { vitalsHistory } from '../floor/vital-signs-queries';
import { decodeCursor, pageOf } from '../http/cursor';

interface Page {
  readonly cursor?: string | undefined;
  readonly limit: number;
}

/** Where a list of sessions goes on: instant and id of the last, nothing that names anybody. */
function positionOf(cursor: string | undefined) {
  if (cursor === undefined) return null;
  const [startedAt, id] = decodeCursor(timePosition, cursor);
  return { startedAt: new Date(startedAt), id };
}

/** A page of a patient's sessions with their readings. @throws Failure `invalid-request` for a foreign cursor */
export async function readVitals(
  db: Queryable,
  patientId: string,
  { cursor, limit }: Page,
): Promise<VitalsHistory> {
  const found = await vitalsHistory(db, patientId, { after: positionOf(cursor), limit });
  return pageOf(found, limit, ({ startedAt, sessionRecordId }) => [startedAt, sessionRecordId]);
}
