import type { Transaction } from '../database/client';
import type { Actor } from './actor';
import { ACTOR_COLUMNS } from './actor-columns';
import type { Pool } from 'pg';

/** What a password is checked against. */
export interface Credentials {
  readonly id: string;
  readonly passwordHash: string | null;
  readonly disabled: boolean;
}

/** @param email compared without case */
export async function findCredentials(
  connection: Pool | Transaction['connection'],
  email: string,
): Promise<Credentials | undefined> {
  const { rows } = await connection.query<Credentials>({
    name: 'find-credentials',
    text: `SELECT id, password_hash AS "passwordHash", disabled_at IS NOT NULL AS disabled
             FROM users WHERE lower(email) = lower($1)`,
    values: [email],
  });
  return rows[0];
}

/** @returns undefined when there is no such account, or it is disabled */
export async function findActor(tx: Transaction, userId: string): Promise<Actor | undefined> {
  const { rows } = await tx.connection.query<Actor>(
    `SELECT ${ACTOR_COLUMNS} FROM users u WHERE u.id = $1 AND u.disabled_at IS NULL`,
    [userId],
  );
  return rows[0];
}

export async function storePasswordHash(
  tx: Transaction,
  userId: string,
  passwordHash: string,
): Promise<void> {
  await tx.connection.query('UPDATE users SET password_hash = $2 WHERE id = $1', [
    userId,
    passwordHash,
  ]);
}

/** @param keptHash the session that goes on, by its hash; null ends all */
export async function endSessions(
  tx: Transaction,
  userId: string,
  keptHash: string | null = null,
): Promise<void> {
  await tx.connection.query('DELETE FROM sessions WHERE user_id = $1 AND sid IS DISTINCT FROM $2', [
    userId,
    keptHash,
  ]);
}

/** Names that a guesser of this person's password would try. */
export async function namesAround(tx: Transaction, userId: string | null): Promise<string[]> {
  const { rows } = await tx.connection.query<{ name: string }>(
    `SELECT name FROM sites
      UNION ALL SELECT display_name::text FROM users WHERE id = $1
      UNION ALL SELECT email FROM users WHERE id = $1`,
    [userId],
  );
  return rows.map((row) => row.name);
}
