import { randomUUID } from 'node:crypto';
import type { Role } from '@shared/contracts/accounts-contract';
import type { Database } from '../../server/database/client';
import { patients, sites, userRoles, users, userSites } from '../../server/database/schema';

const some = (prefix: string): string => `${prefix}-${randomUUID().slice(0, 8)}`;

type NewSite = typeof sites.$inferInsert;
type NewUser = typeof users.$inferInsert;
type NewPatient = typeof patients.$inferInsert;

async function one<T>(rows: PromiseLike<T[]>): Promise<T> {
  const [row] = await rows;
  if (!row) throw new Error('A builder made no row');
  return row;
}

export const buildSite = (database: Database, given: Partial<NewSite> = {}) =>
  one(
    database
      .insert(sites)
      .values({
        name: some('Site'),
        timeZone: 'America/New_York',
        address: '1 Wharf Road',
        phone: '555-0100',
        ...given,
      })
      .returning(),
  );

export type BuiltUser = typeof users.$inferSelect & {
  readonly roles: readonly Role[];
  readonly siteIds: readonly string[];
};

export interface UserOptions extends Partial<NewUser> {
  readonly roles?: readonly Role[];
  readonly siteIds?: readonly string[];
}

/** An account without a password unless `passwordHash` is given; `agentFor` needs none. */
export async function buildUser(database: Database, given: UserOptions = {}): Promise<BuiltUser> {
  const { roles = ['nurse'], siteIds = [], ...columns } = given;
  const user = await one(
    database
      .insert(users)
      .values({
        email: `${some('person')}@clinic.example`,
        displayName: some('Person'),
        ...columns,
      })
      .returning(),
  );
  if (roles.length > 0) {
    await database.insert(userRoles).values(roles.map((role) => ({ userId: user.id, role })));
  }
  if (siteIds.length > 0) {
    await database.insert(userSites).values(siteIds.map((siteId) => ({ userId: user.id, siteId })));
  }
  return { ...user, roles, siteIds };
}

/** A patient at the given site, without an account unless `userId` is given. */
export const buildPatient = (
  database: Database,
  given: Partial<NewPatient> & { readonly siteId: string },
) =>
  one(
    database
      .insert(patients)
      .values({
        recordNumber: some('HL'),
        familyName: some('Family'),
        givenName: 'Given',
        birthDate: '1961-04-17',
        sexAtBirth: 'female',
        ...given,
      })
      .returning(),
  );

/** A patient together with the account that is theirs. */
export async function buildPatientWithAccount(
  database: Database,
  given: Partial<NewPatient> & { readonly siteId: string },
) {
  const user = await buildUser(database, { roles: ['patient'] });
  const patient = await buildPatient(database, { ...given, userId: user.id });
  return { user, patient };
}
