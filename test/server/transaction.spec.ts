import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { openDatabase, type Database } from '../../server/database/client';
import { suppressions } from '../../server/database/schema';
import { constraintOf, inTransaction } from '../../server/database/transaction';
import { addJob } from '../../server/jobs/job';
import { createTestDatabase, type TestDatabase } from '../database/test-database';

describe('one transaction', () => {
  let testDatabase: TestDatabase;
  let database: Database;

  beforeAll(async () => {
    testDatabase = await createTestDatabase();
    database = openDatabase(testDatabase.url, { max: 5 });
  });
  afterAll(async () => {
    await database.$client.end();
    await testDatabase.drop();
  });

  const add = (address: string) => ({ address, reason: 'spec' });
  const count = (address: string) =>
    database.$count(suppressions, eq(suppressions.address, address));

  it('keeps all or nothing, and jobs with it', async () => {
    const failing = inTransaction(database, async (tx) => {
      await tx.insert(suppressions).values(add('nothing'));
      await addJob(tx, 'probe', { a: 1 });
      throw new Error('stop');
    });
    await expect(failing).rejects.toThrow('stop');
    expect(await count('nothing')).toBe(0);
    const jobs = () => database.$client.query('SELECT 1 FROM graphile_worker.jobs');
    expect((await jobs()).rowCount).toBe(0);
    await inTransaction(database, async (tx) => {
      await tx.insert(suppressions).values(add('all'));
      await addJob(tx, 'probe', { a: 1 }, { jobKey: 'one' });
      await addJob(tx, 'probe', { a: 2 }, { jobKey: 'one' });
    });
    expect([await count('all'), (await jobs()).rowCount]).toEqual([1, 1]);
  });

  it('runs effects after the commit, once, and none after a rollback', async () => {
    const effect = vi.fn();
    await inTransaction(database, async (tx) => {
      tx.afterCommit(async () => effect(await count('effect')));
      await tx.insert(suppressions).values(add('effect'));
      expect(effect).not.toHaveBeenCalled();
    });
    expect(effect.mock.calls).toEqual([[1]]);
    const failing = inTransaction(database, (tx) => {
      tx.afterCommit(effect);
      return Promise.reject(new Error('stop'));
    });
    await expect(failing).rejects.toThrow('stop');
    expect(effect).toHaveBeenCalledTimes(1);
  });

  it('does not do committed work again when an effect fails like a deadlock', async () => {
    const work = vi.fn();
    const deadlocked = () =>
      inTransaction(database, async (tx) => {
        work();
        tx.afterCommit(async () => {
          await database.$client.query(`DO $$ BEGIN RAISE deadlock_detected; END $$`);
        });
        await tx.insert(suppressions).values(add('effect that fails'));
      });
    await expect(deadlocked()).rejects.toMatchObject({ code: '40P01' });
    expect(work).toHaveBeenCalledTimes(1);
    expect(await count('effect that fails')).toBe(1);
  });

  it('ends a real deadlock by doing one of the two again', async () => {
    await inTransaction(database, (tx) =>
      tx
        .insert(suppressions)
        .values([add('left'), add('right')])
        .then(() => undefined),
    );
    let attempts = 0;
    let met = 0;
    let bothAreIn: () => void = () => undefined;
    const together = new Promise<void>((resolve) => (bothAreIn = resolve));
    const lock = (first: string, then: string) =>
      inTransaction(database, async (tx) => {
        attempts += 1;
        const touch = (address: string) =>
          tx.update(suppressions).set({ reason: first }).where(eq(suppressions.address, address));
        await touch(first);
        if ((met += 1) === 2) bothAreIn();
        await together;
        await touch(then);
      });
    await Promise.all([lock('left', 'right'), lock('right', 'left')]);
    expect(attempts).toBe(3);
  });

  it('gives up after three more tries', async () => {
    const work = vi.fn();
    const never = inTransaction(database, async (tx) => {
      work();
      await tx.connection.query(`DO $$ BEGIN RAISE serialization_failure; END $$`);
    });
    await expect(never).rejects.toMatchObject({ code: '40001' });
    expect(work).toHaveBeenCalledTimes(4);
  });

  it('tells which constraint refused', async () => {
    const twice = inTransaction(database, (tx) =>
      tx.insert(suppressions).values([add('twin'), add('twin')]),
    ).catch((error: unknown) => constraintOf(error));
    expect(await twice).toBe('suppressions_pkey');
    expect(constraintOf(new Error('another'))).toBeUndefined();
  });

  it('leaves the pool whole when connections are cut in the middle', async () => {
    for (let n = 0; n < 8; n += 1) {
      const cut = inTransaction(database, async (tx) => {
        await tx.connection.query('SELECT pg_terminate_backend(pg_backend_pid())');
      });
      await expect(cut).rejects.toThrow();
    }
    await inTransaction(database, async (tx) => {
      await tx.insert(suppressions).values(add('afterwards'));
    });
    expect(await count('afterwards')).toBe(1);
    expect(database.$client.waitingCount).toBe(0);
  });
});
