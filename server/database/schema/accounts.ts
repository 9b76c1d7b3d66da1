import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  customType,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  primaryKey,
  text,
  timestamp,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { id, instant, madeAt, nameText } from './columns';
import { sites } from './program';

const bytes = customType<{ data: Buffer }>({ dataType: () => 'bytea' });

export const role = pgEnum('role', [
  'patient',
  'nurse',
  'exercise-physiologist',
  'physician',
  'front-desk',
  'director',
  'administrator',
]);

export const users = pgTable(
  'users',
  {
    id: id(),
    email: text().notNull(),
    displayName: nameText().notNull(),
    /** argon2id in PHC form; null until an invitation is accepted. */
    passwordHash: text(),
    medicalDirector: boolean().notNull().default(false),
    student: boolean().notNull().default(false),
    disabledAt: instant(),
    createdAt: madeAt(),
  },
  (t) => [uniqueIndex('users_email_unique').on(sql`lower(${t.email})`)],
);

export const userRoles = pgTable(
  'user_roles',
  {
    userId: uuid()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    role: role().notNull(),
    grantedAt: madeAt(),
    grantedBy: uuid().references(() => users.id),
  },
  (t) => [primaryKey({ columns: [t.userId, t.role] })],
);

/** The sites whose patients a member of staff may see. */
export const userSites = pgTable(
  'user_sites',
  {
    userId: uuid()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    siteId: uuid()
      .notNull()
      .references(() => sites.id, { onDelete: 'cascade' }),
  },
  (t) => [primaryKey({ columns: [t.userId, t.siteId] })],
);

export const tokenPurpose = pgEnum('token_purpose', [
  'password-reset',
  'invitation',
  'first-administrator',
]);

/** Single-use secrets sent by e-mail; only their SHA-256 is kept. */
export const userTokens = pgTable(
  'user_tokens',
  {
    id: id(),
    purpose: tokenPurpose().notNull(),
    userId: uuid().references(() => users.id, { onDelete: 'cascade' }),
    tokenHash: bytes().notNull(),
    expiresAt: instant().notNull(),
    usedAt: instant(),
    createdAt: madeAt(),
  },
  (t) => [
    uniqueIndex('user_tokens_hash_unique').on(t.tokenHash),
    index('user_tokens_user').on(t.userId, t.purpose),
  ],
);

/** The table of connect-pg-simple, with the user beside it so that an account's sessions can be ended. */
export const sessions = pgTable(
  'sessions',
  {
    sid: text().primaryKey(),
    sess: jsonb().notNull(),
    expire: timestamp({ withTimezone: true, mode: 'date' }).notNull(),
    userId: uuid().references(() => users.id, { onDelete: 'cascade' }),
    createdAt: madeAt(),
  },
  (t) => [index('sessions_expire').on(t.expire), index('sessions_user').on(t.userId)],
);

/** The table of rate-limiter-flexible: points spent by key until `expire` (ms since the epoch). */
export const rateLimits = pgTable('rate_limits', {
  key: text().primaryKey(),
  points: integer().notNull().default(0),
  expire: bigint({ mode: 'number' }),
});

export const auditOutcome = pgEnum('audit_outcome', ['success', 'refused', 'failure']);

/** Who did what to which record; append-only, written in the transaction that it tells of. */
export const auditEvents = pgTable(
  'audit_events',
  {
    /** Order of arrival, for sealing; the id is what other rows quote. */
    sequence: bigint({ mode: 'number' }).notNull().generatedAlwaysAsIdentity(),
    id: id(),
    at: madeAt(),
    actorId: uuid(),
    action: text().notNull(),
    objectType: text().notNull(),
    objectId: text(),
    patientId: uuid(),
    ip: text(),
    sessionHash: text(),
    outcome: auditOutcome().notNull().default('success'),
    details: jsonb().$type<Record<string, unknown>>(),
  },
  (t) => [
    uniqueIndex('audit_events_sequence').on(t.sequence),
    index('audit_events_patient').on(t.patientId, t.at),
    index('audit_events_at').on(t.at),
    index('audit_events_actor').on(t.actorId, t.at),
  ],
);

/** A seal over a closed range of audit events, chained to the seal before. */
export const auditSeals = pgTable(
  'audit_seals',
  {
    id: id(),
    fromSequence: bigint({ mode: 'number' }).notNull(),
    toSequence: bigint({ mode: 'number' }).notNull(),
    digest: text().notNull(),
    previousDigest: text(),
    sealedAt: madeAt(),
  },
  (t) => [
    uniqueIndex('audit_seals_from').on(t.fromSequence),
    check('audit_seals_range', sql`${t.toSequence} >= ${t.fromSequence}`),
  ],
);

/** Answers kept for 24 hours so that a repeated request is answered, not done again. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    userId: uuid()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    key: text().notNull(),
    route: text().notNull(),
    requestHash: text().notNull(),
    status: integer().notNull(),
    response: jsonb().$type<unknown>().notNull(),
    createdAt: madeAt(),
  },
  (t) => [
    primaryKey({ columns: [t.userId, t.key] }),
    index('idempotency_keys_created').on(t.createdAt),
    check('idempotency_keys_length', sql`char_length(${t.key}) between 1 and 255`),
  ],
);
