import { integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { madeAt } from './columns';

/** What the program decides for itself, a row a setting; who changed it and when is in the audit. */
export const programSettings = pgTable('program_settings', {
  key: text().primaryKey(),
  value: jsonb().$type<unknown>().notNull(),
  version: integer().notNull().default(1),
  changedAt: madeAt(),
  changedBy: uuid().references(() => users.id),
});
