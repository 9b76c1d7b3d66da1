import {
  firstAdministratorPath,
  type FirstAdministratorRequest,
} from '@shared/contracts/accounts-contract';
import type { AppContext } from '../app-context';
import type { Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import { fail } from '../http/failure';
import type { PasswordHasher } from './password-hash';
import { hashNew } from './passwords-service';
import { consumeToken, issueToken } from './tokens-service';
import { countUsers, insertUser } from './users-repository';

/** One at a time may ask whether nobody is there yet. */
const FIRST_ADMINISTRATOR_LOCK = 736_201_128;

/** @throws Failure `link-expired` when the link was used, or someone has an account already */
export async function createFirstAdministrator(
  tx: Transaction,
  { clock }: AppContext,
  hasher: PasswordHasher,
  { token, password, email, displayName }: FirstAdministratorRequest,
): Promise<string> {
  await tx.connection.query('SELECT pg_advisory_xact_lock($1)', [FIRST_ADMINISTRATOR_LOCK]);
  if ((await countUsers(tx)) > 0) {
    const title = 'Someone has an account already. Ask an administrator to invite you.';
    throw fail('link-expired', { title });
  }
  await consumeToken(tx, token, ['first-administrator'], clock.now());
  const about = [email, displayName];
  const passwordHash = await hashNew(tx, hasher, {
    field: 'password',
    password,
    userId: null,
    about,
  });
  return insertUser(tx, {
    email,
    displayName,
    passwordHash,
    roles: ['administrator'],
    siteIds: [],
    medicalDirector: false,
    student: false,
    grantedBy: null,
  });
}

/**
 * What an empty program prints at its start.
 * @returns a link that makes the first administrator, once, within a day; null when someone has an account
 */
export const offerFirstAdministrator = ({
  database,
  clock,
  settings,
}: AppContext): Promise<string | null> =>
  inTransaction(database, async (tx) => {
    if ((await countUsers(tx)) > 0) return null;
    const token = await issueToken(tx, 'first-administrator', null, clock.now());
    return `${settings.origin}${firstAdministratorPath}#token=${token}`;
  });
