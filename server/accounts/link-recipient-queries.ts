import type { Transaction } from '../database/client';

/** Whom a link to choose a password is sent to. */
export interface LinkRecipient {
  readonly id: string;
  readonly email: string;
  /** A patient's given name; null for others, of whose names only the whole is known. */
  readonly firstName: string | null;
  readonly hasPassword: boolean;
}

/** @returns undefined when there is no such account, or it is disabled */
export async function findUserForLink(
  tx: Transaction,
  userId: string,
): Promise<LinkRecipient | undefined> {
  const { rows } = await tx.connection.query<LinkRecipient>(
    `SELECT u.id, u.email, p.given_name AS "firstName", u.password_hash IS NOT NULL AS "hasPassword"
       FROM users u LEFT JOIN patients p ON p.user_id = u.id
      WHERE u.id = $1 AND u.disabled_at IS NULL`,
    [userId],
  );
  return rows[0];
}
