import { sql } from 'drizzle-orm';
import {
  recordKinds,
  recordValues,
  type PatientRecord,
  type RecordEntry,
  type RecordKind,
} from '@shared/contracts/record-contract';
import type { Queryable } from '../database/client';
import { recordRegistry } from './record-registry';

/** An entry's row as JSON, its columns in snake case, and the names of those who wrote in it. */
interface EntryRow extends Record<string, unknown> {
  readonly kind: RecordKind;
  readonly row: Record<string, unknown>;
  readonly recordedBy: string;
  readonly enteredInErrorBy: string | null;
  readonly endedBy: string | null;
}

const columnOf = (field: string): string =>
  field.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);

const person = (id: unknown, displayName: string | null) =>
  displayName === null ? null : { id: id as string, displayName };

/** What the end of an entry is called; a threshold's row says it itself. */
const endNames: Partial<Record<RecordKind, string>> = {
  restrictions: 'lifted',
  questionnaires: 'closed',
};

function endOf({ kind, row, endedBy }: EntryRow): RecordEntry['ended'] {
  const by = person(row['ended_by'], endedBy);
  if (by === null) return null;
  const { ended_at: at, ended_reason: reason } = row;
  return { status: endNames[kind] ?? row['status'], at, by, reason } as RecordEntry['ended'];
}

function entryOf(found: EntryRow): RecordEntry {
  const { row } = found;
  const fields = Object.keys(recordValues[found.kind].shape);
  const values = Object.fromEntries(fields.map((field) => [field, row[columnOf(field)] ?? null]));
  return {
    id: row['id'] as string,
    values: values as RecordEntry['values'],
    recordedAt: row['recorded_at'] as string,
    recordedBy: { id: row['recorded_by'] as string, displayName: found.recordedBy },
    enteredInErrorAt: row['entered_in_error_at'] as string | null,
    enteredInErrorBy: person(row['entered_in_error_by'], found.enteredInErrorBy),
    ended: endOf(found),
  };
}

/** The date that an entry is of; an entry without one is of when it was recorded. */
export function dateOf(kind: RecordKind, entry: RecordEntry): string {
  const { dateField } = recordRegistry[kind];
  const value = dateField && (entry.values as Record<string, unknown>)[dateField];
  return typeof value === 'string' ? value : entry.recordedAt.slice(0, 10);
}

const later = (a: string, b: string): number => (a < b ? 1 : a > b ? -1 : 0);

function newestFirst(kind: RecordKind) {
  return (a: RecordEntry, b: RecordEntry): number =>
    later(dateOf(kind, a), dateOf(kind, b)) ||
    later(a.recordedAt, b.recordedAt) ||
    later(a.id, b.id);
}

/** The entries of some kinds with the names of those who wrote in them, in one statement. */
async function entryRows(
  db: Queryable,
  patientId: string,
  kinds: readonly RecordKind[],
  entryId: string | null,
): Promise<EntryRow[]> {
  const only = entryId === null ? sql`` : sql` AND entry.id = ${entryId}::uuid`;
  const parts = kinds.map(
    (kind) => sql`
      SELECT ${kind}::text AS kind, to_jsonb(entry) AS row
        FROM ${recordRegistry[kind].table} AS entry WHERE entry.patient_id = ${patientId}${only}`,
  );
  const { rows } = await db.execute<EntryRow>(sql`
    SELECT e.kind, e.row, writer.display_name AS "recordedBy", corrector.display_name AS "enteredInErrorBy",
           ender.display_name AS "endedBy"
      FROM (${sql.join(parts, sql` UNION ALL `)}) AS e
      JOIN users AS writer ON writer.id = (e.row ->> 'recorded_by')::uuid
      LEFT JOIN users AS corrector ON corrector.id = (e.row ->> 'entered_in_error_by')::uuid
      LEFT JOIN users AS ender
        ON ender.id = CASE WHEN e.kind IN ('thresholds', 'restrictions', 'questionnaires')
                          THEN (e.row ->> 'ended_by')::uuid END`);
  return rows;
}

/** All entries of all kinds, the newest of its date first; those entered in error too. */
export async function patientRecord(db: Queryable, patientId: string): Promise<PatientRecord> {
  const rows = await entryRows(db, patientId, recordKinds, null);
  const record = Object.fromEntries(
    recordKinds.map((kind) => {
      const entries = rows.filter((found) => found.kind === kind).map(entryOf);
      return [kind, entries.sort(newestFirst(kind))];
    }),
  );
  return record as unknown as PatientRecord;
}

/** One entry; undefined when the patient has none of that id and kind. */
export async function recordEntry(
  db: Queryable,
  patientId: string,
  kind: RecordKind,
  entryId: string,
): Promise<RecordEntry | undefined> {
  const [row] = await entryRows(db, patientId, [kind], entryId);
  return row && entryOf(row);
}
