import { pgTable, text, date } from 'drizzle-orm/pg-core';
import { id, instant, madeAt } from './columns';

/** How far the demonstration has been played, a row a play; empty in a real program. */
export const demoPlays = pgTable('demo_plays', {
  id: id(),
  /** What tells the story; another version's rows cannot be played on. */
  story: text().notNull(),
  /** The program's local date of the first play, from which all of it follows. */
  firstDay: date({ mode: 'string' }).notNull(),
  playedTo: instant().notNull(),
  playedAt: madeAt(),
});
