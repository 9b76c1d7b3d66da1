import { randomBytes } from 'node:crypto';
import { inject } from 'vitest';
import { APP_ROLE, OWNER_ROLE } from '../../scripts/postgres/roles.mjs';
import { asSuperuser, roleUrl } from './template';

/** A database of one spec file's own: migrated, empty but for what migrations insert. */
export interface TestDatabase {
  /** As the server signs in: it owns nothing. */
  readonly url: string;
  /** As the migrations sign in. */
  readonly ownerUrl: string;
  /** Ends every connection and removes the database. */
  readonly drop: () => Promise<void>;
}

/**
 * Clones the template database. Call it in `beforeAll`, and `drop` in `afterAll`, after the pools are closed.
 * @throws when the vitest project has no `globalSetup` that starts the test server
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const { superuserUrl, template } = inject('testServer');
  const name = `plimsoll_spec_${randomBytes(8).toString('hex')}`;
  await asSuperuser(superuserUrl, async (client) => {
    await client.query(`CREATE DATABASE ${name} TEMPLATE ${template} OWNER ${OWNER_ROLE}`);
    await client.query(`GRANT CONNECT ON DATABASE ${name} TO ${APP_ROLE}`);
  });
  return {
    url: roleUrl(superuserUrl, APP_ROLE, name),
    ownerUrl: roleUrl(superuserUrl, OWNER_ROLE, name),
    drop: () =>
      asSuperuser(superuserUrl, async (client) => {
        await client.query(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`);
      }),
  };
}
