import type { PoolClient } from 'pg';
import * as schema from '../database/schema';
import { recordAudit } from '../audit/audit-service';
import type { Database, Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import { accountRows } from './account-rows';
import { demoPassword } from './accounts';
import { applyCourses } from './apply-courses';
import { applyRanges, prescribedByPeople } from './apply-ranges';
import { applyMoney, applySessions } from './apply-sessions';
import { insertRows, updateUntouched } from './bulk';
import { anchorAt, clockAt } from './clock';
import { dayOf, isoOf } from './days';
import type { Day } from './days';
import { idAt } from './dice';
import { bookingDays, classDateRows, daysOfHistory, programRows } from './program';
import { emptyRecord } from './record-entries';
import type { RecordRows } from './record-entries';
import { noRows } from './rows';
import { applySteps } from './apply-steps';
import type { PeopleRows } from './rows';
import { tellStory } from './story';
import { storyChanges, withoutPatients } from './story-changes';
import type { StoryChanges } from './story-changes';

/** Raise it when the same day would be told otherwise: rows of another version are left as they are. */
export const storyVersion = '3';

const playLock = 736_201_128;
const classesAheadDays = bookingDays + 14;

interface LastPlay {
  readonly story: string;
  readonly firstDay: string;
  readonly playedTo: Date;
}

export type PlayOutcome = 'loaded' | 'played on' | 'up to date' | 'another version';

async function lastPlay(connection: PoolClient): Promise<LastPlay | null> {
  const { rows } = await connection.query<LastPlay>(
    `SELECT story, first_day::text AS "firstDay", played_to AS "playedTo"
       FROM demo_plays ORDER BY played_to DESC LIMIT 1`,
  );
  return rows[0] ?? null;
}

/** The program itself: accounts, sites, classes and what they cost. */
async function openProgram(
  connection: PoolClient,
  anchor: Day,
  passwordHash: string,
): Promise<void> {
  const program = programRows(anchor);
  const accounts = accountRows(anchor);
  const users = accounts.users.map((user) => ({ ...user, passwordHash }));
  await insertRows(connection, schema.sites, program.sites);
  await insertRows(connection, schema.users, users);
  await insertRows(connection, schema.userRoles, accounts.userRoles);
  await insertRows(connection, schema.userSites, accounts.userSites);
  await insertRows(connection, schema.priceItems, program.priceItems);
  await insertRows(connection, schema.classTemplates, program.classTemplates);
  await insertRows(connection, schema.closures, program.closures);
}

async function classDateIds(connection: PoolClient, from: Day): Promise<Map<string, string>> {
  const { rows } = await connection.query<{ key: string; id: string }>(
    `SELECT template_id || ' ' || local_date AS key, id FROM class_dates WHERE local_date >= $1`,
    [isoOf(from)],
  );
  return new Map(rows.map(({ key, id }) => [key, id]));
}

/** Entries of records whose courses and ranges are still the story's own. */
async function applyRecords(
  connection: PoolClient,
  changes: StoryChanges,
  theirs: ReadonlySet<string>,
): Promise<void> {
  const tables = Object.keys(emptyRecord()) as (keyof RecordRows)[];
  for (const table of tables) {
    const { added, changed } = changes[table];
    const ours = (row: { patientId: string }) => !theirs.has(row.patientId);
    const moved = changed.filter(({ after }) => ours(after));
    await updateUntouched<object>(connection, schema[table], moved);
    await insertRows(connection, schema[table], added.filter(ours));
  }
}

/** Whoever could not be added, since a person has given the record number to another. */
async function missingPatients(connection: PoolClient, told: PeopleRows): Promise<Set<string>> {
  const { rows } = await connection.query<{ id: string }>(
    'SELECT id FROM unnest($1::uuid[]) AS told (id) WHERE NOT EXISTS (SELECT FROM patients p WHERE p.id = told.id)',
    [told.patients.map(({ id }) => id)],
  );
  return new Set(rows.map(({ id }) => id));
}

async function applyPeople(
  connection: PoolClient,
  before: PeopleRows,
  after: PeopleRows,
  firstDayNeeded: Day,
): Promise<void> {
  const told = storyChanges(before, after);
  await insertRows(connection, schema.patients, told.patients.added);
  const changes = withoutPatients(told, await missingPatients(connection, after));
  const ids = await classDateIds(connection, firstDayNeeded);
  const courses = await applyCourses(connection, changes, before.enrollments, ids);
  const theirs = await prescribedByPeople(connection, before.prescriptions);
  for (const { id, patientId } of after.enrollments) {
    if (courses.touched.has(id)) theirs.add(patientId);
  }
  await applyRecords(connection, changes, theirs);
  await applyRanges(connection, changes.prescriptions, theirs);
  await applySessions(connection, changes, courses.appointments);
  await applyMoney(connection, changes, courses.appointments);
}

async function play(
  tx: Transaction,
  now: Date,
  hashPassword: (password: string) => Promise<string>,
): Promise<PlayOutcome> {
  const { connection } = tx;
  await connection.query('SELECT pg_advisory_xact_lock($1)', [playLock]);
  const last = await lastPlay(connection);
  if (last && last.story !== storyVersion) return 'another version';
  if (last && last.playedTo >= now) return 'up to date';
  const anchor = last ? dayOf(last.firstDay) : anchorAt(now);
  if (!last) await openProgram(connection, anchor, await hashPassword(demoPassword));
  const lastDay = last ? anchorAt(last.playedTo) : anchor;
  const firstDayNeeded = last ? lastDay - 2 : anchor - daysOfHistory;
  const firstMissing = last ? lastDay + classesAheadDays : firstDayNeeded;
  const dates = classDateRows(anchor, firstMissing, anchorAt(now) + classesAheadDays);
  await insertRows(connection, schema.classDates, dates);
  const before = last ? tellStory(clockAt(anchor, last.playedTo), last.playedTo) : noRows();
  const after = tellStory(clockAt(anchor, now), last?.playedTo);
  await applyPeople(connection, before, after, firstDayNeeded);
  await applySteps(tx, now);
  const id = idAt(now, 'play');
  const mark = { id, story: storyVersion, firstDay: isoOf(anchor), playedTo: now };
  await insertRows(connection, schema.demoPlays, [mark]);
  const nobody = { actorId: null, ip: null, sessionHash: null, at: now };
  await recordAudit(tx, nobody, [{ action: 'demo.played', objectType: 'demo', objectId: id }]);
  return last ? 'played on' : 'loaded';
}

/**
 * Loads the demonstration into an empty database, or plays it on from where it stood to now, in one transaction. What a
 * person has entered, changed or signed meanwhile stays as it is.
 */
export function playDemo(
  database: Database,
  now: Date,
  hashPassword: (password: string) => Promise<string>,
): Promise<PlayOutcome> {
  return inTransaction(database, (tx) => play(tx, now, hashPassword));
}
