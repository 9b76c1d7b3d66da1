import type { Request, Response } from 'express';
import type { AppContext } from '../app-context';
import { recordAudit } from '../audit/audit-service';
import type { Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import { cookieName } from '../http/cookies';
import type { Csrf } from '../http/csrf';
import { fail } from '../http/failure';
import { sourceOf } from '../http/request-origin';
import { endSession, renewSession } from '../http/session';
import { insertSession, sessionHash } from '../http/session-store';
import { findActor, storePasswordHash, type Credentials } from './accounts-repository';
import type { Actor } from './actor';
import type { Authenticate, SignInParts } from './credentials-service';
import { isOutdated, type PasswordHasher } from './password-hash';
import { forgiveTries } from './sign-in-throttle';

export interface AccountsParts extends SignInParts {
  readonly csrf: Csrf;
  readonly authenticate: Authenticate;
}

interface Exchange {
  readonly request: Request;
  readonly response: Response;
}

/** @throws Failure as `Authenticate` does; a person disabled meanwhile is refused like a wrong password */
export async function signIn(
  context: AppContext,
  parts: AccountsParts,
  { request, response }: Exchange,
): Promise<Actor> {
  const { database, clock } = context;
  const credentials = await parts.authenticate(request, response);
  const rehashed = await betterHash(parts.hasher, credentials, request);
  await renewSession(request);
  const actor = await inTransaction(database, async (tx) => {
    const found = await findActor(tx, credentials.id);
    if (!found) throw fail('wrong-credentials');
    if (rehashed) await storePasswordHash(tx, found.id, rehashed);
    await forgiveTries(tx, found.id);
    await insertSession(tx, request.sessionID, found, clock.now());
    const source = { ...sourceOf(request, clock), sessionHash: sessionHash(request.sessionID) };
    const event = { action: 'sign-in', objectType: 'user', objectId: found.id };
    await recordAudit(tx, { ...source, actorId: found.id }, [event]);
    return found;
  });
  request.actor = actor;
  parts.devices.remember(response, actor.id);
  parts.csrf.renewToken(request, response);
  return actor;
}

/** The password hashed anew, when the parameters have risen since. */
async function betterHash(
  hasher: PasswordHasher,
  { passwordHash }: Credentials,
  request: Request,
): Promise<string | null> {
  if (passwordHash === null || !isOutdated(passwordHash)) return null;
  return hasher.hash((request.body as { password: string }).password);
}

/** Ends the session in the transaction, and what this reply tells of it once that is committed. */
export async function signOut(
  tx: Transaction,
  { settings }: AppContext,
  csrf: Csrf,
  { request, response }: Exchange,
): Promise<void> {
  await tx.connection.query('DELETE FROM sessions WHERE sid = $1', [
    sessionHash(request.sessionID),
  ]);
  tx.afterCommit(async () => {
    await endSession(request);
    delete request.actor;
    const secure = settings.secureCookies;
    response.clearCookie(cookieName('sid', secure), { path: '/', secure });
    response.set('Clear-Site-Data', '"cache"');
    csrf.renewToken(request, response);
  });
}
