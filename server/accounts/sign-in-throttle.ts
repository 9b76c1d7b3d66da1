import { createHash } from 'node:crypto';
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import type { Pool } from 'pg';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';

/** NIST SP 800-63B-4, 3.2.2: no more than 100 consecutive failures on one account. */
const MOST_FAILURES = 100;
const FREE_FAILURES = 5;
const LONGEST_WAIT_SECONDS = 15 * 60;
const TRIES_A_MINUTE = 100;

/** Whose tries are counted together. */
export type Tries =
  { readonly userId: string; readonly deviceId: string | null } | { readonly unknownEmail: string };

/** Addresses that have no account are counted too, so that waiting tells nothing; only their hash is kept. */
export function keyOf(tries: Tries): string {
  if ('unknownEmail' in tries) {
    const email = tries.unknownEmail.toLowerCase();
    return `unknown:${createHash('sha256').update(email).digest('base64url')}`;
  }
  const { userId, deviceId } = tries;
  return deviceId ? `known:${userId}:${deviceId}` : `account:${userId}`;
}

/**
 * Counts a try as failed before it is made, so that many at once gain nothing: five in a row are free, then each is
 * followed by a wait that doubles from 1 s to 15 min. The count stands until `forgiveTries`.
 * @throws Failure `too-many-requests` while the wait lasts, or after 100 in a row
 */
export async function takeTry(pool: Pool, tries: Tries, now: Date): Promise<void> {
  const key = keyOf(tries);
  const taken = await pool.query(
    `INSERT INTO rate_limits AS r (key, points, expire) VALUES ($1, 1, $2)
     ON CONFLICT (key) DO UPDATE SET points = r.points + 1,
       expire = $2 + CASE WHEN r.points + 1 < $3 THEN 0
                          ELSE least($4 * 1000, 1000 * 2 ^ (r.points + 1 - $3))::bigint END
       WHERE r.expire <= $2 AND r.points < $5`,
    [key, now.getTime(), FREE_FAILURES, LONGEST_WAIT_SECONDS, MOST_FAILURES],
  );
  if (taken.rowCount === 1) return;
  const { rows } = await pool.query<{ expire: string; points: number }>(
    'SELECT expire, points FROM rate_limits WHERE key = $1',
    [key],
  );
  const [row] = rows;
  const left = (Number(row?.expire ?? 0) - now.getTime()) / 1000;
  const locked = (row?.points ?? 0) >= MOST_FAILURES;
  throw tooMany(locked ? LONGEST_WAIT_SECONDS : Math.max(1, left), tries);
}

/** After the right password, or a new one: the account starts afresh, on every device. */
export async function forgiveTries(tx: Transaction, userId: string): Promise<void> {
  await tx.connection.query('DELETE FROM rate_limits WHERE key = $1 OR starts_with(key, $2)', [
    `account:${userId}`,
    `known:${userId}:`,
  ]);
}

function tooMany(retryAfterSeconds: number, tries: Tries | null) {
  const objectId = tries && 'userId' in tries ? tries.userId : null;
  return fail('too-many-requests', {
    retryAfterSeconds,
    record: {
      action: 'try.throttled',
      objectType: 'user',
      objectId,
      outcome: 'refused',
      details: { by: tries ? 'account' : 'address' },
    },
  });
}

/** @throws Failure `too-many-requests` after 100 calls a minute from one address, over all processes */
export type AddressLimit = (ip: string) => Promise<void>;

export function createAddressLimit(pool: Pool): AddressLimit {
  const limiter = new RateLimiterPostgres({
    storeClient: pool,
    storeType: 'pool',
    tableName: 'rate_limits',
    tableCreated: true,
    clearExpiredByTimeout: false,
    keyPrefix: 'address',
    points: TRIES_A_MINUTE,
    duration: 60,
  });
  return async (ip) => {
    try {
      await limiter.consume(ip);
    } catch (refusal) {
      if (refusal instanceof RateLimiterRes) throw tooMany(refusal.msBeforeNext / 1000, null);
      throw refusal;
    }
  };
}
