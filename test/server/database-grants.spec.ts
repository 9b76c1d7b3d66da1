import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { quickAddJob, runOnce } from 'graphile-worker';
import { appendOnlyTables } from '../../server/database/grants';
import { migrateDatabase } from '../../server/database/migrate';
import { createTestDatabase, type TestDatabase } from '../database/test-database';

const FORBIDDEN = '42501';

describe('what the app role may do', () => {
  let database: TestDatabase;
  let app: pg.Pool;

  beforeAll(async () => {
    database = await createTestDatabase();
    app = new pg.Pool({ connectionString: database.url });
  });
  afterAll(async () => {
    await app.end();
    await database.drop();
  });

  it.each(appendOnlyTables)(
    'reads %s, and can neither change, remove nor empty it',
    async (table) => {
      await expect(app.query(`SELECT count(*) FROM ${table}`)).resolves.toBeDefined();
      for (const statement of [`DELETE FROM ${table}`, `TRUNCATE ${table}`]) {
        await expect(app.query(statement)).rejects.toMatchObject({ code: FORBIDDEN });
      }
      const update = await app.query<{ may: boolean }>(
        `SELECT has_table_privilege($1, 'UPDATE') OR has_any_column_privilege($1, 'UPDATE') AS may`,
        [table],
      );
      expect(update.rows[0]?.may).toBe(false);
    },
  );

  it('has no more after the grants are given again, by several at once', async () => {
    await Promise.all([1, 2, 3].map(() => migrateDatabase(database.ownerUrl)));
    await expect(app.query('DELETE FROM audit_events')).rejects.toMatchObject({ code: FORBIDDEN });
  });

  it('owns nothing and can make no table', async () => {
    await expect(app.query('CREATE TABLE intruder (id int)')).rejects.toMatchObject({
      code: FORBIDDEN,
    });
    const owned = await app.query(`SELECT FROM pg_tables WHERE tableowner = current_user`);
    expect(owned.rowCount).toBe(0);
  });

  it('adds and runs jobs in the queue', async () => {
    const done: unknown[] = [];
    await quickAddJob({ connectionString: database.url }, 'probe', { number: 7 });
    await runOnce({
      connectionString: database.url,
      taskList: { probe: (payload) => void done.push(payload) },
      noHandleSignals: true,
    });
    expect(done).toEqual([{ number: 7 }]);
  });
});
