import { afterAll, beforeAll, expect, it } from 'vitest';
import { defaultPolicy } from '@shared/clinical/prescribing';
import { createTestDatabase } from '../../test/database/test-database';
import { openDatabase } from './client';
import { policies } from './schema';

let test: Awaited<ReturnType<typeof createTestDatabase>>;

beforeAll(async () => {
  test = await createTestDatabase();
});
afterAll(() => test.drop());

it('starts a program with the published defaults as version 1', async () => {
  const database = openDatabase(test.url);
  const rows = await database.select().from(policies);
  await database.$client.end();
  expect(rows).toMatchObject([{ version: 1, content: JSON.parse(JSON.stringify(defaultPolicy)) }]);
});
