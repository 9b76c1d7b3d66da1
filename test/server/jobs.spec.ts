import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { featureJobs } from '../../server/features';
import { addJob, job } from '../../server/jobs/job';
import { startWorker } from '../../server/jobs/worker';
import { inTransaction } from '../../server/database/transaction';
import { buildUser } from '../builders/people';
import { runJobs } from '../builders/run-jobs';
import { createTestApp, type TestApp } from '../builders/test-app';
import { hours } from '../builders/test-clock';

describe('jobs', () => {
  let house: TestApp;

  beforeAll(async () => {
    house = await createTestApp();
  });
  afterAll(() => house.close());

  const rows = async (text: string, values: unknown[] = []) =>
    (await house.context.database.$client.query(text, values)).rows;
  const add = (name: string, payload: Record<string, unknown>) =>
    inTransaction(house.context.database, (tx) => addJob(tx, name, payload));
  async function until(what: () => boolean): Promise<void> {
    const end = Date.now() + 10_000;
    while (!what() && Date.now() < end) await new Promise((resolve) => setTimeout(resolve, 20));
    expect(what()).toBe(true);
  }

  it('run soon after the commit, once, whichever worker takes them, and stop only when done', async () => {
    const done: number[] = [];
    const count = job({
      name: 'count',
      payload: z.object({ n: z.int() }),
      run: async ({ n }) => {
        await new Promise((resolve) => setTimeout(resolve, 20));
        done.push(n);
      },
    });
    const workers = [
      await startWorker([count], house.context),
      await startWorker([count], house.context),
    ];
    const numbers = Array.from({ length: 20 }, (_, n) => n);
    await Promise.all(numbers.map((n) => add('count', { n })));
    await until(() => done.length === 20);
    expect([...done].sort((a, b) => a - b)).toEqual(numbers);
    for (let n = 20; n < 30; n += 1) await add('count', { n });
    await Promise.all(workers.map((worker) => worker.stop()));
    // What was begun is done and written down as done; the rest waits for another worker.
    const left = await rows(
      `SELECT attempts FROM graphile_worker.jobs WHERE task_identifier = 'count'`,
    );
    expect(done.length + left.length).toBe(30);
    expect(left.filter((row) => row.attempts > 0)).toEqual([]);
  });

  it('are tried again when they fail, and say so without what they were given', async () => {
    const failing = job({
      name: 'failing',
      payload: z.object({ secret: z.string() }),
      run: () => Promise.reject(new Error('no luck')),
    });
    const worker = await startWorker([failing], house.context);
    await add('failing', { secret: 'hush' });
    await until(() => house.logged().some((line) => line['job'] === 'failing'));
    await worker.stop();
    const [left] = await rows(
      `SELECT attempts, last_error FROM graphile_worker.jobs WHERE task_identifier = 'failing'`,
    );
    expect(left).toMatchObject({ attempts: 1, last_error: expect.stringContaining('no luck') });
    expect(JSON.stringify(house.logged())).not.toContain('hush');
  });

  it('have names of their own and schedules that the queue understands', async () => {
    const names = featureJobs.map((each) => each.name);
    expect(new Set(names).size).toBe(names.length);
    const worker = await startWorker(featureJobs, house.context);
    await worker.stop();
  });

  it('clear what has expired, and keep counting wrong passwords of real accounts', async () => {
    const { database } = house.context;
    const user = await buildUser(database);
    const now = house.clock.now();
    const old = new Date(now.getTime() - hours(24 * 31));
    await rows(
      `INSERT INTO sessions (sid, sess, expire, user_id) VALUES ('old', '{}', $1, $3), ('live', '{}', $2, $3)`,
      [old, new Date(now.getTime() + hours(1)), user.id],
    );
    await rows(
      `INSERT INTO user_tokens (id, purpose, user_id, token_hash, expires_at)
       VALUES (gen_random_uuid(), 'invitation', $2, 'a', $1), (gen_random_uuid(), 'invitation', $2, 'b', now() + interval '1 day')`,
      [old, user.id],
    );
    await rows(
      `INSERT INTO idempotency_keys (user_id, key, route, request_hash, status, response, created_at)
       VALUES ($2, 'old', '', '', 200, '{}', $1), ($2, 'new', '', '', 200, '{}', $3)`,
      [old, user.id, now],
    );
    await rows(
      `INSERT INTO rate_limits (key, points, expire)
       VALUES ('account:x', 7, $1), ('known:x:y', 7, $1), ('unknown:x', 7, $1), ('address:x', 7, $1)`,
      [old.getTime()],
    );
    await add('clear-expired-accounts', {});
    await runJobs(house, ['clear-expired-accounts']);
    expect(await rows('SELECT sid FROM sessions')).toEqual([{ sid: 'live' }]);
    expect(await rows('SELECT token_hash FROM user_tokens')).toHaveLength(1);
    expect(await rows('SELECT key FROM idempotency_keys')).toEqual([{ key: 'new' }]);
    const kept = await rows('SELECT key FROM rate_limits ORDER BY key');
    expect(kept).toEqual([{ key: 'account:x' }, { key: 'known:x:y' }]);
  });
});
