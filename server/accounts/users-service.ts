import type { NewUser, Role, User, UserChange } from '@shared/contracts/accounts-contract';
import type { AppContext } from '../app-context';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import { enqueueMessage } from '../messages/messages-service';
import { endSessions } from './accounts-repository';
import type { Actor } from './actor';
import { revokeTokens } from './tokens-service';
import {
  findUser,
  insertUser,
  lockUser,
  otherAdministrators,
  replaceRoles,
  replaceSites,
  sitesExist,
  updateUser,
} from './users-repository';

async function knownUser(tx: Transaction, userId: string): Promise<User> {
  const user = await findUser(tx, userId);
  if (!user) throw fail('not-found');
  return user;
}

async function requireSites(tx: Transaction, siteIds: readonly string[]): Promise<void> {
  if (await sitesExist(tx, siteIds)) return;
  const error = { path: 'siteIds', code: 'custom', message: 'Choose from the program’s sites' };
  throw fail('invalid-request', { errors: [error] });
}

/** The job that sends it makes the link's token, since only its hash may be kept. */
async function sendInvitation(tx: Transaction, userId: string, now: Date): Promise<void> {
  const hour = now.toISOString().slice(0, 13);
  await enqueueMessage(tx, {
    kind: 'invitation',
    dedupeKey: `invitation:${userId}:${hour}`,
    userId,
    subject: { userId },
    dueAt: now,
  });
}

/** Makes an account without a password and invites its person to choose one. */
export async function inviteUser(
  tx: Transaction,
  { clock }: AppContext,
  actor: Actor,
  given: Omit<NewUser, 'roles'> & { readonly roles: readonly Role[] },
): Promise<User> {
  await requireSites(tx, given.siteIds);
  const userId = await insertUser(tx, { ...given, passwordHash: null, grantedBy: actor.id });
  await sendInvitation(tx, userId, clock.now());
  return knownUser(tx, userId);
}

/** Sends the invitation again, at most once an hour, to one who has not accepted it. */
export async function inviteAgain(
  tx: Transaction,
  { clock }: AppContext,
  userId: string,
): Promise<void> {
  const user = await knownUser(tx, userId);
  if (user.status !== 'invited') throw fail('illegal-transition');
  await sendInvitation(tx, userId, clock.now());
}

/** Two administrators who take the role from each other at once must not both succeed. */
const ADMINISTRATORS_LOCK = 736_201_129;

async function requireAdministratorLeft(
  tx: Transaction,
  userId: string,
  before: User,
  change: UserChange,
): Promise<void> {
  const demoted = change.roles !== undefined && !change.roles.includes('administrator');
  if (!before.roles.includes('administrator') || !(demoted || change.disabled)) return;
  await tx.connection.query('SELECT pg_advisory_xact_lock($1)', [ADMINISTRATORS_LOCK]);
  if ((await otherAdministrators(tx, userId)) > 0) return;
  const title = 'This is the only administrator. Make another one first.';
  throw fail('illegal-transition', { title });
}

/** Changes count from the person's next request; one who is disabled is signed out at once, and every link is void. */
export async function changeUser(
  tx: Transaction,
  { clock }: AppContext,
  actor: Actor,
  { userId, change }: { userId: string; change: UserChange },
): Promise<User> {
  const { roles, siteIds, disabled, ...columns } = change;
  await lockUser(tx, userId);
  const before = await knownUser(tx, userId);
  await requireAdministratorLeft(tx, userId, before, change);
  if (siteIds) await requireSites(tx, siteIds);
  const disabledAt = disabled ? clock.now() : null;
  await updateUser(tx, userId, { ...columns, ...(disabled !== undefined && { disabledAt }) });
  if (roles) await replaceRoles(tx, userId, roles, actor.id);
  if (siteIds) await replaceSites(tx, userId, siteIds);
  if (disabled) {
    await endSessions(tx, userId);
    await revokeTokens(tx, userId, clock.now());
  }
  return knownUser(tx, userId);
}

/** Signs a person out everywhere. */
export async function endUserSessions(tx: Transaction, userId: string): Promise<void> {
  await knownUser(tx, userId);
  await endSessions(tx, userId);
}
