import { fillPlaceholders, type SQL } from 'drizzle-orm';
import { PgDialect } from 'drizzle-orm/pg-core';
import type { QueryResultRow } from 'pg';
import type { Transaction } from './client';

const dialect = new PgDialect({ casing: 'snake_case' });

/**
 * A statement in Drizzle's parts, with `sql.placeholder` for its values: its text is made once. Rows come as the driver
 * reads them.
 * @param name a connection plans it once under this name; null: anew for each call, by its values
 */
export function statement<Row extends QueryResultRow>(name: string | null, query: SQL) {
  const { sql: text, params } = dialect.sqlToQuery(query);
  return async (
    { connection }: Pick<Transaction, 'connection'>,
    given: Readonly<Record<string, unknown>>,
  ): Promise<Row[]> => {
    const values = fillPlaceholders(params, { ...given });
    const { rows } = await connection.query<Row>({ ...(name && { name }), text, values });
    return rows;
  };
}
