import { getTableColumns, getTableName } from 'drizzle-orm';
import { toSnakeCase } from 'drizzle-orm/casing';
import type { PgTable } from 'drizzle-orm/pg-core';
import type { PoolClient } from 'pg';

// Thousands of rows go in as one JSON text a table: the table's own row type reads it, so that no types are told twice.

const rowsAtOnce = 5_000;
const quoted = (names: readonly string[], prefix = '') =>
  names.map((name) => `${prefix}"${name}"`).join(', ');

/** The columns of these rows; a key that is no column of the table is left out. */
function columnsOf(table: PgTable, rows: readonly object[]): string[] {
  const known = Object.keys(getTableColumns(table));
  const given = new Set(rows.flatMap((row) => Object.keys(row)));
  return known.filter((key) => given.has(key)).map(toSnakeCase);
}

const inSnakeCase = (row: object) =>
  Object.fromEntries(
    Object.entries(row).map(([key, value]) => [toSnakeCase(key), value as unknown]),
  );

const asJson = (rows: readonly object[]) => JSON.stringify(rows.map(inSnakeCase));

/**
 * Adds rows, of each of which the same keys are given. One that a unique or exclusion constraint refuses is left out.
 * @returns the ids of the rows added; [] of a table without ids
 */
export async function insertRows(
  connection: PoolClient,
  table: PgTable,
  rows: readonly object[],
): Promise<Set<string>> {
  const columns = columnsOf(table, rows.slice(0, 1));
  const name = getTableName(table);
  const returning = columns.includes('id') ? 'RETURNING id' : '';
  const added = new Set<string>();
  for (let from = 0; from < rows.length; from += rowsAtOnce) {
    const answer = await connection.query<{ id: string }>(
      `INSERT INTO "${name}" (${quoted(columns)})
       SELECT ${quoted(columns)} FROM json_populate_recordset(null::"${name}", $1::json)
       ON CONFLICT DO NOTHING ${returning}`,
      [asJson(rows.slice(from, from + rowsAtOnce))],
    );
    for (const { id } of answer.rows) added.add(id);
  }
  return added;
}

/** A row as the story last told it, and as it tells it now. */
export interface Change<R> {
  readonly before: R;
  readonly after: R;
}

/** The columns in which any of these rows has changed. */
function changedColumns(table: PgTable, changes: readonly Change<object>[]): string[] {
  const differs = ({ before, after }: Change<object>) =>
    Object.keys(after).filter(
      (key) =>
        JSON.stringify(after[key as keyof typeof after]) !==
        JSON.stringify(before[key as keyof typeof before]),
    );
  const keys = new Set(changes.flatMap(differs));
  return columnsOf(table, [Object.fromEntries([...keys].map((key) => [key, null]))]);
}

/**
 * Changes rows that still stand as they were last told: what a person has changed since stays theirs.
 * @param condition a further one on the row `t`
 * @returns the ids of the rows changed
 */
export async function updateUntouched<R extends object>(
  connection: PoolClient,
  table: PgTable,
  changes: readonly Change<R>[],
  condition = 'true',
): Promise<Set<string>> {
  const columns = changedColumns(table, changes);
  if (columns.length === 0) return new Set();
  const name = getTableName(table);
  const { rows } = await connection.query<{ id: string }>(
    `UPDATE "${name}" t SET (${quoted(columns)}) = ROW(${quoted(columns, 'a.')})
       FROM json_to_recordset($1::json) AS pair("before" json, "after" json),
            json_populate_record(null::"${name}", pair."before") b,
            json_populate_record(null::"${name}", pair."after") a
      WHERE t.id = a.id AND ${condition}
        AND (${quoted(columns, 't.')}) IS NOT DISTINCT FROM (${quoted(columns, 'b.')})
      RETURNING t.id`,
    [
      JSON.stringify(
        changes.map(({ before, after }) => ({
          before: inSnakeCase(before),
          after: inSnakeCase(after),
        })),
      ),
    ],
  );
  return new Set(rows.map(({ id }) => id));
}
