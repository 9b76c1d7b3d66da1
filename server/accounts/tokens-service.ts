import { v7 as uuidv7 } from 'uuid';
import { setPasswordPath } from '@shared/contracts/accounts-contract';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import { hashOfToken, newToken } from '../http/secret-token';

export type TokenPurpose = 'password-reset' | 'invitation' | 'first-administrator';

const HOUR = 60 * 60_000;
const LIFETIME: Readonly<Record<TokenPurpose, number>> = {
  'password-reset': HOUR,
  invitation: 72 * HOUR,
  'first-administrator': 24 * HOUR,
};

/**
 * Makes a secret for one use, of which only the hash is kept: what is returned can be sent, and never read again.
 * @returns 256 random bits in base64url
 */
export async function issueToken(
  tx: Transaction,
  purpose: TokenPurpose,
  userId: string | null,
  now: Date,
): Promise<string> {
  const token = newToken();
  await tx.connection.query(
    `INSERT INTO user_tokens (id, purpose, user_id, token_hash, expires_at, created_at)
     VALUES ($1, $2, $3, $4, $5, $6)`,
    [
      uuidv7(),
      purpose,
      userId,
      hashOfToken(token),
      new Date(now.getTime() + LIFETIME[purpose]),
      now,
    ],
  );
  return token;
}

interface UsedToken {
  readonly purpose: TokenPurpose;
  readonly userId: string | null;
}

/** The page that takes the token; it stands in the fragment, which no server and no log sees. */
export const passwordLink = (origin: string, token: string): string =>
  `${origin}${setPasswordPath}#token=${token}`;

/** Makes a link for one use, to be sent at once. */
export async function issueLink(
  tx: Transaction,
  asked: {
    readonly purpose: TokenPurpose;
    readonly userId: string;
    readonly origin: string;
    readonly now: Date;
  },
): Promise<{ readonly link: string; readonly expiresAt: Date }> {
  const { purpose, userId, origin, now } = asked;
  const token = await issueToken(tx, purpose, userId, now);
  return {
    link: passwordLink(origin, token),
    expiresAt: new Date(now.getTime() + LIFETIME[purpose]),
  };
}

/**
 * Uses a token up, together with all others of its person: of several calls at once only one has it.
 * @throws Failure `link-expired` when it was used, has expired, is for something else, or never was
 */
export async function consumeToken(
  tx: Transaction,
  token: string,
  purposes: readonly TokenPurpose[],
  now: Date,
): Promise<UsedToken> {
  const { rows } = await tx.connection.query<UsedToken>(
    `UPDATE user_tokens SET used_at = $3
      WHERE token_hash = $1 AND purpose::text = ANY ($2) AND used_at IS NULL AND expires_at > $3
      RETURNING purpose, user_id AS "userId"`,
    [hashOfToken(token), purposes, now],
  );
  const [used] = rows;
  if (!used) {
    const record = { action: 'token.refused', objectType: 'token', outcome: 'refused' } as const;
    throw fail('link-expired', { record });
  }
  if (used.userId) await revokeTokens(tx, used.userId, now);
  return used;
}

/** Voids every link that the person still holds. */
export async function revokeTokens(tx: Transaction, userId: string, now: Date): Promise<void> {
  await tx.connection.query(
    'UPDATE user_tokens SET used_at = $2 WHERE user_id = $1 AND used_at IS NULL',
    [userId, now],
  );
}
