import type {
  ChangePatientRequest,
  Patient,
  PatientSearchResponse,
  registerPatientRequestSchema,
} from '@shared/contracts/patients-contract';
import { localDateAt } from '@shared/scheduling/wall-time';
import * as z from 'zod';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { constraintOf } from '../database/transaction';
import { decodeCursor, pageOf } from '../http/cursor';
import { fail } from '../http/failure';
import { rangesOf } from '../prescriptions/range-in-force-queries';
import { fieldFailure } from './field-failure';
import { isRegistrar, mayRead, ownFields } from './patients-policy';
import { searchPatients, type NamePosition } from './patient-search-queries';
import { coursesOf, latestRisk, patientById } from './patients-queries';
import { insertPatient, updatePatient } from './patients-repository';
import { presentListItem, presentPatient } from './present-patient';

interface Search {
  readonly q?: string | undefined;
  readonly cursor?: string | null | undefined;
  readonly limit: number;
}

// PostgreSQL's text holds no NUL. Names stand in this cursor, so it travels in a body, never in an address.
const name = z.string().regex(/^[^\0]*$/);
const position = z.tuple([name, name, z.uuid()]);

function positionOf(cursor: string | null | undefined): NamePosition | null {
  if (cursor === undefined || cursor === null) return null;
  const [familyName, givenName, id] = decodeCursor(position, cursor);
  return { familyName, givenName, id };
}

/** The local date in a zone, worked out once a zone. */
function datesIn(now: Date): (zone: string) => string {
  const known = new Map<string, string>();
  return (zone) => {
    const date = known.get(zone) ?? localDateAt(now, zone);
    known.set(zone, date);
    return date;
  };
}

/** A page of the patients that the caller may open; two statements whatever its length, three with ranges. */
export async function search(
  tx: Transaction,
  actor: Actor,
  { q, cursor, limit }: Search,
  now: Date,
): Promise<PatientSearchResponse> {
  const found = await searchPatients(tx, actor, { q, after: positionOf(cursor), limit });
  const { items, nextCursor } = pageOf(found, limit, ({ familyName, givenName, id }) => [
    familyName,
    givenName,
    id,
  ]);
  const todayIn = datesIn(now);
  const readsChart = mayRead(actor, 'chart');
  const rangeOf = readsChart
    ? await rangesOf(
        tx,
        items.map(({ id }) => id),
        now,
      )
    : () => null;
  return {
    items: items.map((item) =>
      presentListItem(item, rangeOf(item.id), todayIn(item.site.timeZone)),
    ),
    nextCursor,
  };
}

/** The head of a patient's page, as much of it as the caller may read. @throws Failure `not-found` */
export async function readPatient(
  tx: Transaction,
  actor: Actor,
  patientId: string,
  now: Date,
): Promise<Patient> {
  const patient = await patientById(tx, patientId);
  if (!patient) throw fail('not-found');
  const courses = await coursesOf(tx, patientId);
  if (!mayRead(actor, 'chart')) return presentPatient(patient, courses, null, now);
  const rangeOf = await rangesOf(tx, [patientId], now);
  const risk = (await latestRisk(tx, patientId)) ?? null;
  return presentPatient(patient, courses, { risk, range: rangeOf(patientId) }, now);
}

const recordNumberTaken = () =>
  fieldFailure('recordNumber', 'taken', 'Another patient has this record number');

function checkSite(actor: Actor, siteId: string | undefined): void {
  if (siteId === undefined || actor.siteIds.includes(siteId)) return;
  throw fieldFailure('siteId', 'not-yours', 'Choose one of your sites');
}

function checkBirthDate(birthDate: string | undefined, now: Date): void {
  if (birthDate === undefined) return;
  if (birthDate > '1900-01-01' && birthDate <= localDateAt(now, 'UTC')) return;
  throw fieldFailure('birthDate', 'impossible', 'Enter a date of birth from 1900 to today');
}

/** @throws Failure `invalid-request` when the number is taken, the site is not the caller's or the date is impossible */
export async function registerPatient(
  tx: Transaction,
  actor: Actor,
  given: z.output<typeof registerPatientRequestSchema>,
  now: Date,
): Promise<Patient> {
  checkSite(actor, given.siteId);
  checkBirthDate(given.birthDate, now);
  const id = await insertPatient(tx, given);
  if (id === undefined) throw recordNumberTaken();
  return readPatient(tx, actor, id, now);
}

/** @throws Failure `forbidden` for what a patient may not change, `stale-version`, `invalid-request` */
export async function changePatient(
  tx: Transaction,
  actor: Actor,
  patientId: string,
  { version, ...change }: ChangePatientRequest,
  now: Date,
): Promise<Patient> {
  const isOwn = (field: string): boolean => ownFields.includes(field);
  if (!isRegistrar(actor) && !Object.keys(change).every(isOwn)) throw fail('forbidden');
  checkSite(actor, change.siteId);
  checkBirthDate(change.birthDate, now);
  try {
    if (!(await updatePatient(tx, patientId, version, change))) throw fail('stale-version');
  } catch (error) {
    throw constraintOf(error) === 'patients_recordNumber_unique' ? recordNumberTaken() : error;
  }
  return readPatient(tx, actor, patientId, now);
}
