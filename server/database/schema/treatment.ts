import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  date,
  index,
  jsonb,
  pgEnum,
  pgTable,
  real,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import type { DosingTime, DrugFlag } from '@shared/clinical/drugs/drug';
import type { RestrictionKind } from '@shared/clinical/training/restrictions';
import type { PacingMode } from '@shared/contracts/record-treatment-contract';
import { users } from './accounts';
import { id, instant } from './columns';
import { attribution, endedWhole, ending, ofPatient } from './record-entry';

export const rateActingClass = pgEnum('rate_acting_class', [
  'beta-blocker',
  'ivabradine',
  'diltiazem-verapamil',
  'digoxin',
  'amiodarone-sotalol',
  'thyroid-hormone',
  'other',
]);

export const medications = pgTable(
  'medications',
  {
    id: id(),
    patientId: ofPatient(),
    name: text().notNull(),
    salt: text(),
    flags: text().array().$type<DrugFlag[]>().notNull().default([]),
    times: text().array().$type<DosingTime[]>().notNull().default([]),
    /** Null for a drug that does not act on the heart rate. */
    rateActing: rateActingClass(),
    dose: text().notNull(),
    schedule: text().notNull(),
    startedOn: date({ mode: 'string' }).notNull(),
    stoppedOn: date({ mode: 'string' }),
    /** Who wrote down the stop and when, where it was written after the entry. */
    stopRecordedAt: instant(),
    stopRecordedBy: uuid().references(() => users.id),
    /** A change of dose stops one entry and starts the next, which names it. */
    replaces: uuid().references((): AnyPgColumn => medications.id),
    ...attribution(),
  },
  (t) => [
    index('medications_patient').on(t.patientId, t.startedOn),
    check('medications_order', sql`${t.stoppedOn} >= ${t.startedOn}`),
    check(
      'medications_flags',
      sql`${t.flags} <@ array['anticoagulant', 'nitrate', 'glucose-lowering']`,
    ),
    check(
      'medications_times',
      sql`${t.times} <@ array['morning', 'noon', 'evening', 'bedtime', 'as-needed']`,
    ),
  ],
);

/** The list was gone through with the patient; before the first of these the rate-acting drugs are unknown. */
export const medicationReviews = pgTable(
  'medication_reviews',
  { id: id(), patientId: ofPatient(), ...attribution() },
  (t) => [index('medication_reviews_patient').on(t.patientId, t.recordedAt)],
);

export const icdStatus = pgEnum('icd_status', ['none', 'present', 'unknown']);

/** The devices as last checked; the latest entry counts, and none at all means unknown. */
export const cardiacDevices = pgTable(
  'cardiac_devices',
  {
    id: id(),
    patientId: ofPatient(),
    icdStatus: icdStatus().notNull(),
    icdZones: jsonb()
      .$type<{ rate: number; kind: 'monitor' | 'pacing' | 'shock' }[]>()
      .notNull()
      .default([]),
    pacemaker: boolean().notNull().default(false),
    pacingMode: text().$type<PacingMode>(),
    lowerRate: real(),
    upperTrackingRate: real(),
    upperSensorRate: real(),
    checkedOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('cardiac_devices_patient').on(t.patientId, t.checkedOn),
    check('cardiac_devices_tracking', sql`${t.upperTrackingRate} between 50 and 220`),
    check('cardiac_devices_lower', sql`${t.lowerRate} between 30 and 150`),
    check('cardiac_devices_sensor', sql`${t.upperSensorRate} between 50 and 220`),
    check(
      'cardiac_devices_order',
      sql`${t.lowerRate} is null or (${t.lowerRate} < coalesce(${t.upperTrackingRate}, 999) and ${t.lowerRate} < coalesce(${t.upperSensorRate}, 999))`,
    ),
    check(
      'cardiac_devices_paces',
      sql`${t.pacemaker} or (${t.pacingMode} is null and ${t.lowerRate} is null and ${t.upperSensorRate} is null)`,
    ),
    check(
      'cardiac_devices_zones',
      sql`${t.icdStatus} = 'present' or jsonb_array_length(${t.icdZones}) = 0`,
    ),
  ],
);

/** Ordered for one patient; lifted by a person, or over after its last day. */
export const restrictions = pgTable(
  'restrictions',
  {
    id: id(),
    patientId: ofPatient(),
    kind: text().$type<RestrictionKind>().notNull(),
    limit: real(),
    diastolic: real(),
    detail: text().notNull(),
    orderedBy: text().notNull(),
    orderedOn: date({ mode: 'string' }).notNull(),
    until: date({ mode: 'string' }),
    ...ending(),
    ...attribution(),
  },
  (t) => [
    index('restrictions_patient').on(t.patientId, t.orderedOn),
    check(
      'restrictions_kind',
      sql`${t.kind} in ('sternum', 'device-arm', 'joint', 'fall', 'lifting', 'oxygen', 'pressure', 'claudication')`,
    ),
    check('restrictions_order', sql`${t.until} >= ${t.orderedOn}`),
    check(
      'restrictions_limit',
      sql`(${t.kind} in ('lifting', 'oxygen', 'pressure')) = (${t.limit} is not null)`,
    ),
    check(
      'restrictions_pressure',
      sql`${t.diastolic} is null or (${t.kind} = 'pressure' and ${t.diastolic} < ${t.limit})`,
    ),
    check('restrictions_lifted_by_someone', endedWhole(t)),
  ],
);
