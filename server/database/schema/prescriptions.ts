import { sql } from 'drizzle-orm';
import {
  check,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  text,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { id, instant, madeAt } from './columns';
import { enrollments, patients } from './patients';
import { policies } from './program';

/** FHIR R4 request status. */
export const prescriptionStatus = pgEnum('prescription_status', [
  'draft',
  'active',
  'completed',
  'revoked',
  'entered-in-error',
]);

/**
 * A range with all that it rests on. Once signed, a trigger lets nothing change but a physician's
 * signature and the end of its life; recomputing it from `inputs` gives the same numbers.
 */
export const prescriptions = pgTable(
  'prescriptions',
  {
    id: id(),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    enrollmentId: uuid()
      .notNull()
      .references(() => enrollments.id),
    status: prescriptionStatus().notNull().default('draft'),
    version: integer().notNull().default(1),
    inputs: jsonb().$type<unknown>().notNull(),
    result: jsonb().$type<unknown>().notNull(),
    policyVersion: integer()
      .notNull()
      .references(() => policies.version),
    engineVersion: text().notNull(),
    supersedes: uuid().references((): AnyPgColumn => prescriptions.id),
    /** Who must still sign before the range enters into force. */
    awaiting: text().$type<'physician'>(),
    createdAt: madeAt(),
    createdBy: uuid()
      .notNull()
      .references(() => users.id),
    /** When the inputs of the draft were last changed; null: they are as first written. */
    changedAt: instant(),
    signedAt: instant(),
    signedBy: uuid().references(() => users.id),
    physicianSignedAt: instant(),
    physicianSignedBy: uuid().references(() => users.id),
    /** When the range entered into force and when it left it. */
    activatedAt: instant(),
    endedAt: instant(),
  },
  (t) => [
    index('prescriptions_patient').on(t.patientId, t.createdAt),
    index('prescriptions_awaiting')
      .on(t.awaiting)
      .where(sql`awaiting is not null`),
    uniqueIndex('prescriptions_one_active')
      .on(t.patientId)
      .where(sql`status = 'active'`),
    check(
      'prescriptions_signature_whole',
      sql`(${t.signedAt} is null) = (${t.signedBy} is null) and (${t.physicianSignedAt} is null) = (${t.physicianSignedBy} is null)`,
    ),
    check(
      'prescriptions_active_is_signed',
      sql`${t.status} <> 'active' or ${t.signedAt} is not null`,
    ),
    check('prescriptions_awaiting_physician', sql`${t.awaiting} is null or ${t.status} = 'draft'`),
  ],
);
