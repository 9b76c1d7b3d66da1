import { sql } from 'drizzle-orm';
import { check, index, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import type { Load, ProgressionProposal } from '@shared/clinical/progression/propose-progression';
import { users } from './accounts';
import { id, instant, madeAt } from './columns';
import { sessionRecords } from './floor';
import { patients } from './patients';
import { prescriptions } from './prescriptions';
import { policies } from './program';

/** The next step that the engine proposed after a signed session, and what a person made of it; decided once. */
export const progressionProposals = pgTable(
  'progression_proposals',
  {
    id: id(),
    sessionRecordId: uuid()
      .notNull()
      .references(() => sessionRecords.id),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    /** The range in force when it was proposed. */
    prescriptionId: uuid()
      .notNull()
      .references(() => prescriptions.id),
    proposal: jsonb().$type<ProgressionProposal>().notNull(),
    policyVersion: integer()
      .notNull()
      .references(() => policies.version),
    engineVersion: text().notNull(),
    madeAt: madeAt(),
    decision: text().$type<'accepted' | 'edited' | 'dismissed'>(),
    /** What the next session starts with; null where nothing was set. */
    decidedLoad: jsonb().$type<Load>(),
    decisionReason: text(),
    decidedAt: instant(),
    decidedBy: uuid().references(() => users.id),
  },
  (t) => [
    unique('progression_proposals_record').on(t.sessionRecordId),
    index('progression_proposals_patient').on(t.patientId, t.madeAt),
    index('progression_proposals_open')
      .on(t.madeAt)
      .where(sql`decision is null`),
    check(
      'progression_proposals_decision',
      sql`(${t.decision} is null and ${t.decidedAt} is null and ${t.decidedBy} is null and ${t.decidedLoad} is null)
        or (${t.decision} in ('accepted', 'edited', 'dismissed') and ${t.decidedAt} is not null and ${t.decidedBy} is not null)`,
    ),
    check(
      'progression_proposals_reason',
      sql`${t.decision} is distinct from 'dismissed' or ${t.decisionReason} is not null`,
    ),
  ],
);
