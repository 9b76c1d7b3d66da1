import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  date,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  text,
  time,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { id, instant, instantRange, madeAt } from './columns';

export const sites = pgTable('sites', {
  id: id(),
  name: text().notNull().unique(),
  /** IANA zone; wall times of the site are kept local and become instants by it. */
  timeZone: text().notNull(),
  address: text().notNull(),
  phone: text().notNull(),
  version: integer().notNull().default(1),
  createdAt: madeAt(),
});

/** Local dates on which a site holds no class. */
export const closures = pgTable(
  'closures',
  {
    id: id(),
    siteId: uuid()
      .notNull()
      .references(() => sites.id),
    localDate: date({ mode: 'string' }).notNull(),
    reason: text().notNull(),
  },
  (t) => [unique('closures_site_date').on(t.siteId, t.localDate)],
);

/** What patients pay themselves. Money is an integer of minor units beside its ISO 4217 code. */
export const priceItems = pgTable(
  'price_items',
  {
    id: id(),
    name: text().notNull(),
    amountMinor: bigint({ mode: 'number' }).notNull(),
    currency: text().notNull(),
    active: boolean().notNull().default(true),
    createdAt: madeAt(),
  },
  (t) => [
    check('price_items_amount', sql`${t.amountMinor} > 0`),
    check('price_items_currency', sql`${t.currency} ~ '^[A-Z]{3}$'`),
  ],
);

export const classKind = pgEnum('class_kind', ['exercise', 'orientation', 'education']);

/** A recurring group session: an RFC 5545 rule on local dates of its site. */
export const classTemplates = pgTable(
  'class_templates',
  {
    id: id(),
    siteId: uuid()
      .notNull()
      .references(() => sites.id),
    name: text().notNull(),
    kind: classKind().notNull().default('exercise'),
    /** RRULE value, e.g. FREQ=WEEKLY;BYDAY=MO,WE,FR */
    recurrence: text().notNull(),
    startsOn: date({ mode: 'string' }).notNull(),
    endsOn: date({ mode: 'string' }),
    localStart: time().notNull(),
    durationMinutes: integer().notNull(),
    capacity: integer().notNull(),
    monitoredPlaces: integer().notNull(),
    /** Set for a class that patients pay themselves. */
    priceItemId: uuid().references(() => priceItems.id),
    version: integer().notNull().default(1),
    createdAt: madeAt(),
  },
  (t) => [
    index('class_templates_site').on(t.siteId),
    check('class_templates_duration', sql`${t.durationMinutes} between 10 and 240`),
    check('class_templates_capacity', sql`${t.capacity} between 1 and 60`),
    check('class_templates_monitored', sql`${t.monitoredPlaces} between 0 and ${t.capacity}`),
  ],
);

export const classDateStatus = pgEnum('class_date_status', ['scheduled', 'closed', 'cancelled']);

/** One occurrence of a class. The counters are kept by a trigger on appointments; the checks are the last word. */
export const classDates = pgTable(
  'class_dates',
  {
    id: id(),
    templateId: uuid()
      .notNull()
      .references(() => classTemplates.id),
    siteId: uuid()
      .notNull()
      .references(() => sites.id),
    localDate: date({ mode: 'string' }).notNull(),
    startsAt: instant().notNull(),
    endsAt: instant().notNull(),
    during: instantRange()
      .notNull()
      .generatedAlwaysAs(sql`tstzrange(starts_at, ends_at)`),
    capacity: integer().notNull(),
    booked: integer().notNull().default(0),
    monitoredCapacity: integer().notNull(),
    monitoredBooked: integer().notNull().default(0),
    status: classDateStatus().notNull().default('scheduled'),
    version: integer().notNull().default(1),
    createdAt: madeAt(),
  },
  (t) => [
    unique('class_dates_template_date').on(t.templateId, t.localDate),
    index('class_dates_site_starts').on(t.siteId, t.startsAt),
    index('class_dates_starts').on(t.startsAt),
    check('class_dates_order', sql`${t.endsAt} > ${t.startsAt}`),
    check('class_dates_places', sql`${t.booked} between 0 and ${t.capacity}`),
    check('class_dates_monitors', sql`${t.monitoredBooked} between 0 and ${t.monitoredCapacity}`),
  ],
);

/**
 * The program's policy, a row a version, written once; version 1 holds the published defaults. Triggers keep every number
 * within its bounds, and refuse changes.
 */
export const policies = pgTable(
  'policies',
  {
    version: integer().primaryKey(),
    /** What ranges are worked out by. */
    content: jsonb().$type<unknown>().notNull(),
    /** The other numbers by subject; one that is missing counts with its published default. */
    training: jsonb()
      .$type<unknown>()
      .notNull()
      .default(sql`'{}'::jsonb`),
    effectiveFrom: madeAt(),
    /** A user; null for the published defaults. */
    createdBy: uuid(),
    note: text().notNull(),
  },
  (t) => [check('policies_version', sql`${t.version} >= 1`)],
);
