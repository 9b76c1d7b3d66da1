import pg from 'pg';
import type { TestApp } from './test-app';

/**
 * Takes a guard out of one spec's own database, as its owner: a test of what the guard prevents must then find it.
 * @param statements SQL
 */
export async function takeAway({ testDatabase }: TestApp, statements: string): Promise<void> {
  const owner = new pg.Client({ connectionString: testDatabase.ownerUrl });
  await owner.connect();
  try {
    await owner.query(statements);
  } finally {
    await owner.end();
  }
}
