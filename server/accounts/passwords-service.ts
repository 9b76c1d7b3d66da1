import type { Request } from 'express';
import type { ChangePasswordRequest } from '@shared/contracts/accounts-contract';
import type { AppContext } from '../app-context';
import { recordAudit } from '../audit/audit-service';
import type { Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import { fail } from '../http/failure';
import { sourceOf } from '../http/request-origin';
import { sessionHash } from '../http/session-store';
import { addJob } from '../jobs/job';
import {
  endSessions,
  findActor,
  findCredentials,
  namesAround,
  storePasswordHash,
} from './accounts-repository';
import type { Actor } from './actor';
import type { SignInParts } from './credentials-service';
import type { PasswordHasher } from './password-hash';
import { normalizePassword, passwordAdvice, passwordFault } from './password-rule';
import { forgiveTries, takeTry } from './sign-in-throttle';
import { consumeToken } from './tokens-service';

/**
 * The same work for every address: a job is added either way, and finds out whom to write to.
 * @returns the account's id, for the audit alone
 */
export async function askForReset(tx: Transaction, email: string): Promise<string | null> {
  const found = await findCredentials(tx.connection, email);
  const userId = found && !found.disabled ? found.id : null;
  await addJob(tx, 'offer-password-reset', { userId });
  return userId;
}

/** @throws Failure `invalid-request` on the field when the rule refuses the password */
export async function hashNew(
  tx: Transaction,
  hasher: PasswordHasher,
  given: { field: string; password: string; userId: string | null; about?: readonly string[] },
): Promise<string> {
  const password = normalizePassword(given.password);
  const names = await namesAround(tx, given.userId);
  const fault = passwordFault(password, [...names, ...(given.about ?? [])]);
  if (fault) {
    const error = { path: given.field, code: fault, message: passwordAdvice[fault] };
    throw fail('invalid-request', { errors: [error] });
  }
  return hasher.hash(password);
}

/** A new password ends every session, void every link and forgives every try. */
async function replacePassword(
  tx: Transaction,
  userId: string,
  hash: string,
  keptSession: string | null,
): Promise<void> {
  await storePasswordHash(tx, userId, hash);
  await endSessions(tx, userId, keptSession);
  await forgiveTries(tx, userId);
}

/** @returns whose password was set, and what the link was for */
export async function setPassword(
  tx: Transaction,
  { clock }: AppContext,
  hasher: PasswordHasher,
  { token, password }: { token: string; password: string },
): Promise<{ userId: string; purpose: string }> {
  const purposes = ['password-reset', 'invitation'] as const;
  const { userId, purpose } = await consumeToken(tx, token, purposes, clock.now());
  if (!userId || !(await findActor(tx, userId))) throw fail('link-expired');
  const hash = await hashNew(tx, hasher, { field: 'password', password, userId });
  await replacePassword(tx, userId, hash, null);
  return { userId, purpose };
}

/** @throws Failure `wrong-password`, counted like a failed sign-in */
export async function changePassword(
  context: AppContext,
  { hasher, devices }: SignInParts,
  actor: Actor,
  { request, change }: { request: Request; change: ChangePasswordRequest },
): Promise<void> {
  const { database, clock } = context;
  const pool = database.$client;
  const tries = { userId: actor.id, deviceId: devices.read(request, actor.id) };
  await takeTry(pool, tries, clock.now());
  const found = await findCredentials(pool, actor.email);
  const event = { action: 'password.changed', objectType: 'user', objectId: actor.id } as const;
  if (!(await hasher.verify(found?.passwordHash ?? null, change.currentPassword))) {
    throw fail('wrong-password', { record: { ...event, outcome: 'failure' } });
  }
  await inTransaction(database, async (tx) => {
    const given = { field: 'newPassword', password: change.newPassword, userId: actor.id };
    const hash = await hashNew(tx, hasher, given);
    await replacePassword(tx, actor.id, hash, sessionHash(request.sessionID));
    await recordAudit(tx, sourceOf(request, clock), [event]);
  });
}
