import { sql } from 'drizzle-orm';
import { text, uuid } from 'drizzle-orm/pg-core';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { instant, madeAt } from './columns';
import { patients } from './patients';

/** Who wrote an entry of the record and when; an entry is corrected by a later one, never overwritten. */
export const attribution = () => ({
  recordedAt: madeAt(),
  recordedBy: uuid()
    .notNull()
    .references(() => users.id),
  enteredInErrorAt: instant(),
  enteredInErrorBy: uuid().references(() => users.id),
});

/** Who ended what an entry says, when and why; null while it holds. */
export const ending = () => ({
  endedAt: instant(),
  endedBy: uuid().references(() => users.id),
  endedReason: text(),
});

/** An end has its instant, its person and its reason, or nothing. */
export const endedWhole = (t: Record<'endedAt' | 'endedBy' | 'endedReason', AnyPgColumn>) =>
  sql`num_nulls(${t.endedAt}, ${t.endedBy}, ${t.endedReason}) in (0, 3)`;

export const ofPatient = () =>
  uuid()
    .notNull()
    .references(() => patients.id);
