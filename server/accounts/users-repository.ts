import { and, eq, inArray, sql } from 'drizzle-orm';
import type { Role, User } from '@shared/contracts/accounts-contract';
import type { Queryable, Transaction } from '../database/client';
import { sites, userRoles, users, userSites } from '../database/schema';

export interface UserToInsert {
  readonly email: string;
  readonly displayName: string;
  readonly passwordHash: string | null;
  readonly roles: readonly Role[];
  readonly siteIds: readonly string[];
  readonly medicalDirector: boolean;
  readonly student: boolean;
  readonly grantedBy: string | null;
}

const userColumns = {
  id: users.id,
  email: users.email,
  displayName: users.displayName,
  medicalDirector: users.medicalDirector,
  student: users.student,
  status: sql<User['status']>`CASE WHEN ${users.disabledAt} IS NOT NULL THEN 'disabled'
    WHEN ${users.passwordHash} IS NULL THEN 'invited' ELSE 'active' END`,
  roles: sql<
    Role[]
  >`ARRAY(SELECT r.role::text FROM user_roles r WHERE r.user_id = ${users.id} ORDER BY r.role)`,
  siteIds: sql<
    string[]
  >`ARRAY(SELECT v.site_id::text FROM user_sites v WHERE v.user_id = ${users.id} ORDER BY 1)`,
};

const isPatient = sql`EXISTS (SELECT 1 FROM user_roles r WHERE r.user_id = ${users.id} AND r.role = 'patient')`;

/** A member of staff who is a patient as well is on both lists. */
const belongsTo = {
  staff: sql`(NOT ${isPatient} OR EXISTS (SELECT 1 FROM user_roles r WHERE r.user_id = ${users.id} AND r.role <> 'patient'))`,
  patients: isPatient,
};

export interface UsersPage {
  readonly limit: number;
  /** Name and id of the row before, null from the start. */
  readonly after: readonly [string, string] | null;
  readonly who?: keyof typeof belongsTo | undefined;
}

export const listUsers = (db: Queryable, { limit, after, who }: UsersPage): Promise<User[]> =>
  db
    .select(userColumns)
    .from(users)
    .where(
      and(
        after
          ? sql`(${users.displayName}, ${users.id}) > (${after[0]}, ${after[1]}::uuid)`
          : undefined,
        who && belongsTo[who],
      ),
    )
    .orderBy(users.displayName, users.id)
    .limit(limit);

export async function findUser(db: Queryable, userId: string): Promise<User | undefined> {
  const [user] = await db.select(userColumns).from(users).where(eq(users.id, userId));
  return user;
}

export async function countUsers(db: Queryable): Promise<number> {
  return db.$count(users);
}

/** @throws on constraint `users_email_unique` */
export async function insertUser(tx: Transaction, given: UserToInsert): Promise<string> {
  const { roles, siteIds, grantedBy, ...columns } = given;
  const [made] = await tx.insert(users).values(columns).returning({ id: users.id });
  if (!made) throw new Error('An account was not made');
  await replaceRoles(tx, made.id, roles, grantedBy);
  await replaceSites(tx, made.id, siteIds);
  return made.id;
}

/** Locks the account, so that two administrators change it one after the other. */
export async function lockUser(tx: Transaction, userId: string): Promise<void> {
  await tx.select({ id: users.id }).from(users).where(eq(users.id, userId)).for('no key update');
}

export async function updateUser(
  tx: Transaction,
  userId: string,
  change: Partial<typeof users.$inferInsert>,
): Promise<void> {
  if (Object.keys(change).length === 0) return;
  await tx.update(users).set(change).where(eq(users.id, userId));
}

export async function replaceRoles(
  tx: Transaction,
  userId: string,
  roles: readonly Role[],
  grantedBy: string | null,
): Promise<void> {
  await tx.delete(userRoles).where(eq(userRoles.userId, userId));
  const rows = [...new Set(roles)].map((role) => ({ userId, role, grantedBy }));
  if (rows.length > 0) await tx.insert(userRoles).values(rows);
}

/** @throws on constraint `user_sites_site_id_sites_id_fk` when there is no such site */
export async function replaceSites(
  tx: Transaction,
  userId: string,
  siteIds: readonly string[],
): Promise<void> {
  await tx.delete(userSites).where(eq(userSites.userId, userId));
  const rows = [...new Set(siteIds)].map((siteId) => ({ userId, siteId }));
  if (rows.length > 0) await tx.insert(userSites).values(rows);
}

/** Who else could still manage accounts if this person could not. */
export async function otherAdministrators(tx: Transaction, userId: string): Promise<number> {
  const { rows } = await tx.connection.query<{ count: number }>(
    `SELECT count(*)::int AS count FROM users u JOIN user_roles r ON r.user_id = u.id
      WHERE r.role = 'administrator' AND u.disabled_at IS NULL AND u.password_hash IS NOT NULL AND u.id <> $1`,
    [userId],
  );
  return rows[0]?.count ?? 0;
}

export const sitesExist = async (tx: Transaction, siteIds: readonly string[]): Promise<boolean> =>
  siteIds.length === 0 ||
  (await tx.$count(sites, inArray(sites.id, [...siteIds]))) === new Set(siteIds).size;
