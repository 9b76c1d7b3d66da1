import { customType, timestamp, uuid } from 'drizzle-orm/pg-core';
import { v7 as uuidv7 } from 'uuid';

/** A UUIDv7 primary key: sorts by time and can be made on either side of the wire. */
export const id = () =>
  uuid()
    .primaryKey()
    .$defaultFn(() => uuidv7());

/** An instant; local wall times are kept as local date + time + IANA zone instead. */
export const instant = () => timestamp({ withTimezone: true, mode: 'date' });

/** The instant a row was made, by the database's clock. */
export const madeAt = () => instant().notNull().defaultNow();

/** A half-open range of instants; reads back in PostgreSQL's text form. */
export const instantRange = customType<{ data: string }>({ dataType: () => 'tstzrange' });

/** A person's name, sorted as people sort names, in any language. */
export const nameText = customType<{ data: string }>({
  dataType: () => 'text collate "und-x-icu"',
});
